import { groupDigits } from '../../../shared/engine/digits'
import { ANNEAL_DEFAULTS } from '../../../shared/engine/sampling/annealing-schedule'
import { Z_95 } from '../../../shared/engine/readout/intervals'
import type { ScanPoint } from '../../../shared/schemas/scans'
import type { App } from '../../app'
import { findEmbeddingOfJob } from '../../database/repositories/embeddings'
import type { ScanRow } from '../../database/repositories/scans'
import { findScanOfJob, updateScan } from '../../database/repositories/scans'
import { knownOptimum } from '../../services/known-optimum'
import type { Bench } from '../../services/programming'
import { loadBench, programmeBench, requireProgrammed } from '../../services/programming'
import { proportion } from '../../services/proportion'
import { atStrength } from '../../services/scans'
import { signed, signOf } from '../../services/sense'
import type { StrengthFigures } from '../../workers/tasks/scan-strength'
import type { JobContext, JobKindHandler } from '../kind'

/** Thrown while saving, it also takes back what was written. */
const DELETED = 'the run sheet or its embedding was deleted meanwhile'

/** Rehearses a run sheet at several strengths over the worker threads; each point is kept as soon as it is there. */
export const scanJob: JobKindHandler = {
  async run(app, context) {
    const row = await findScanOfJob(app.db, context.job.subjectId)
    const embedding = row && (await findEmbeddingOfJob(app.db, row.embeddingId))
    if (!row || !embedding) throw new Error(DELETED)
    const started = performance.now()
    const points = await measure(app, context, row, await loadBench(app, embedding))
    const seconds = (performance.now() - started) / 1000
    const all = row.made.strengths.length
    const cancelled = points.length < all
    const words = `${groupDigits(points.length)} of ${groupDigits(all)} strengths`
    return {
      status: cancelled ? 'cancelled' : 'done',
      message: cancelled ? `cancelled; ${words} were measured and are kept` : words,
      async save(tx) {
        const reason = cancelled ? `Cancelled after ${words}.` : null
        const status = points.length > 0 ? 'ready' : 'cancelled'
        if (!(await updateScan(tx, row.id, { status, points, seconds, reason }))) throw new Error(DELETED)
      },
    }
  },
  async abandon(tx, job, status, reason) {
    await updateScan(tx, job.subjectId, { status, reason })
  },
}

/** Energies up to this one are the reference optimum of the version that is programmed. */
async function referenceOf(app: App, bench: Bench): Promise<number | null> {
  const known = await knownOptimum(app, bench)
  return known && known.energy + known.tolerance
}

async function measure(app: App, context: JobContext, row: ScanRow, bench: Bench): Promise<ScanPoint[]> {
  const { strengths, reads, sweeps, temperature = ANNEAL_DEFAULTS.temperature, controlError, seed } = row.made
  const { h: sigmaH, J: sigmaJ } = bench.machine.sheet.controlError
  const reference = await referenceOf(app, bench)
  // Points of an earlier attempt stand: the same strength, reads and seed give the same figures.
  const points = [...row.points]
  const readsDone = new Map(points.map((point) => [point.strength, reads]))
  const tell = (): void => {
    const sum = [...readsDone.values()].reduce((total, done) => total + done, 0)
    const words = `${points.length} of ${strengths.length} strengths measured`
    context.report(sum / (reads * strengths.length), words, { points: points.length, reads: sum })
  }
  const measureOne = async (strength: number): Promise<void> => {
    const programmed = requireProgrammed(programmeBench(bench, atStrength(row.settings, strength)))
    const begun = performance.now()
    const figures = await app.compute.run(
      'scanStrength',
      {
        programmed,
        ising: bench.ising,
        reads,
        gauges: row.settings.gauges,
        gaugeSeed: row.settings.seed,
        error: controlError ? { sigmaH, sigmaJ } : null,
        sweeps,
        temperature,
        seed,
        reference,
      },
      {
        signal: context.signal,
        unbegun: null,
        onProgress: (progress) => {
          readsDone.set(strength, progress.readsDone)
          tell()
        },
      },
    )
    if (!figures) return
    const seconds = (performance.now() - begun) / 1000
    points.push(pointOf({ strength, scale: programmed.scale, seconds }, figures, bench))
    points.sort((a, b) => a.strength - b.strength)
    tell()
    await updateScan(app.db, row.id, { points })
  }
  await Promise.all(strengths.filter((strength) => !readsDone.has(strength)).map(measureOne))
  return points
}

function pointOf(
  at: Pick<ScanPoint, 'strength' | 'scale' | 'seconds'>,
  { reads, brokenChains, readsWithBreak, energy, best, successes }: StrengthFigures,
  { problem }: Bench,
): ScanPoint {
  const sign = signOf(problem.sense)
  const half = Z_95 * brokenChains.standardError
  return {
    ...at,
    reads,
    brokenChains: {
      mean: brokenChains.mean,
      low: Math.max(0, brokenChains.mean - half),
      high: Math.min(1, brokenChains.mean + half),
    },
    readsWithBreak: proportion(readsWithBreak, reads),
    energy: { mean: signed(sign, energy.mean), standardError: energy.standardError, best: signed(sign, best) },
    success: successes === null ? null : proportion(successes, reads),
  }
}
