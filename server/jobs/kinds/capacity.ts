import { groupDigits } from '../../../shared/engine/digits'
import { CHAIN_LENGTH_GRID, median, sizesAt } from '../../../shared/engine/embedding/chain-lengths'
import { geometryOf } from '../../../shared/engine/machine/geometry'
import type { CapacityResult, ChainLengthPoint } from '../../../shared/schemas/machines'
import type { App } from '../../app'
import type { CapacityRow } from '../../database/repositories/capacity-measurements'
import { findCapacity, updateCapacity } from '../../database/repositories/capacity-measurements'
import { machineCapacity } from '../../services/machine-capacity'
import { calibratedMachine } from '../../services/machine-graphs'
import { shareArrays } from '../../workers/shared-arrays'
import type { MeasureChainsInput } from '../../workers/tasks/measure-chains'
import type { JobContext, JobKindHandler } from '../kind'

/** Thrown while saving, it also takes back what was written. */
const DELETED = 'the machine was deleted meanwhile'

/** Embeds random problems of growing size at each density; every point is kept as soon as it is there. */
export const capacityJob: JobKindHandler = {
  async run(app, context) {
    const row = await findCapacity(app.db, context.job.subjectId)
    if (!row) throw new Error(DELETED)
    const began = performance.now()
    const before = row.seconds ?? 0
    const seconds = (): number => before + (performance.now() - began) / 1000
    const result = await measure(app, context, row, seconds)
    const { points } = result
    const cancelled = context.signal.aborted
    return {
      status: cancelled ? 'cancelled' : 'done',
      message: `${groupDigits(points.length)} points${cancelled ? '; stopped early, they are kept' : ''}`,
      async save(tx) {
        const kept = await updateCapacity(tx, row.id, {
          status: points.length > 0 ? 'measured' : 'cancelled',
          result,
          seconds: seconds(),
          reason: cancelled ? 'Stopped before all sizes and densities were measured.' : null,
        })
        if (!kept) throw new Error(DELETED)
      },
    }
  },
  /** Points that were kept before count, even where the rest failed. */
  async abandon(tx, job, status, reason) {
    const row = await findCapacity(tx, job.subjectId)
    const hasPoints = (row?.result?.points.length ?? 0) > 0
    await updateCapacity(tx, job.subjectId, { status: hasPoints ? 'measured' : status, reason })
  },
}

/** A place of the grid. */
interface Place {
  variables: number
  density: number
}

/** What is left to be measured at a density after the points that are there; nothing once none was found. */
function leftAt(density: number, workingQubits: number, points: readonly ChainLengthPoint[]): number[] {
  const measured = points.filter((point) => point.density === density)
  if (measured.some(({ found }) => found === 0)) return []
  return sizesAt(density, workingQubits).filter((n) => measured.every(({ variables }) => variables !== n))
}

async function measure(
  app: App,
  context: JobContext,
  row: CapacityRow,
  seconds: () => number,
): Promise<CapacityResult> {
  const { machineId, settings } = row
  const machine = await calibratedMachine(app, row, machineId, row.calibration)
  const actor = { workspaceId: row.workspaceId, userId: row.createdBy }
  const { calibration: _, ...complete } = await machineCapacity(app, actor, machineId, row.calibration)
  const { graph, usable, fabric } = machine
  const shared = shareArrays({ machine: graph, usable, ...geometryOf(fabric) })
  const points: ChainLengthPoint[] = [...(row.result?.points ?? [])]
  const { densities } = CHAIN_LENGTH_GRID
  for (const [d, density] of densities.entries()) {
    const left = leftAt(density, machine.calibration.qubits, points)
    for (const [k, variables] of left.entries()) {
      const words = `${groupDigits(variables)} variables at density ${density}`
      context.report((d + k / left.length) / densities.length, words, { variables, density, points: points.length })
      const point = await pointAt(app, context.signal, { variables, density }, { machine: shared, ...settings })
      if (!point) return { complete, points }
      points.push(point)
      await updateCapacity(app.db, row.id, { result: { complete, points }, seconds: seconds() })
      if (point.found === 0) break
    }
  }
  return { complete, points }
}

type Given = Pick<MeasureChainsInput, 'machine' | 'seed' | 'timeLimitSeconds'> & { problems: number }

/** Measures one size at one density; null when it was asked to stop meanwhile. */
async function pointAt(
  app: App,
  signal: AbortSignal,
  place: Place,
  { problems, ...given }: Given,
): Promise<ChainLengthPoint | null> {
  const began = performance.now()
  const outcomes = await Promise.all(
    Array.from({ length: problems }, (_, problem) =>
      app.compute.run(
        'measureChains',
        { ...given, ...place, problem },
        { signal, unbegun: { found: null, cancelled: true } },
      ),
    ),
  )
  if (outcomes.some(({ cancelled }) => cancelled)) return null
  const found = outcomes.flatMap((outcome) => outcome.found ?? [])
  const longest = found.map((one) => one.longest)
  return {
    ...place,
    problems,
    found: found.length,
    longestChain:
      found.length > 0 ? { median: median(longest), least: Math.min(...longest), most: Math.max(...longest) } : null,
    medianQubits: found.length > 0 ? median(found.map(({ qubits }) => qubits)) : null,
    seconds: (performance.now() - began) / 1000,
  }
}
