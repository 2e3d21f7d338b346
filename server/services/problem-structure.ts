import { convertForm } from '../../shared/engine/problem/convert'
import { placesOf } from '../../shared/engine/graph/cuthill-mckee'
import type { Sparsity } from '../../shared/engine/problem/sparsity'
import { packArrays } from '../../shared/packed-arrays'
import type {
  MachinePrecision,
  SparsityMeta,
  SparsityQuery,
  StructureDetailsView,
} from '../../shared/schemas/structure'
import { SPARSITY_LIMITS } from '../../shared/schemas/structure'
import type { Actor, App } from '../app'
import { findCalibration, listMachines } from '../database/repositories/machines'
import type { ProblemRow } from '../database/repositories/problems'
import type { StructureDetailsOutput } from '../workers/tasks/structure-details'
import type { ProblemData } from './problem-data'
import { problemData, problemRow } from './problems'
import { Recent } from './recent'
import { signed, signOf } from './sense'

const MOST_MACHINES = 200

type Sheet = Omit<MachinePrecision, 'scale' | 'coefficients' | 'fieldsUnder' | 'interactionsUnder'> & {
  ranges: NonNullable<Awaited<ReturnType<typeof findCalibration>>>['sheet']['ranges']
}

/** Ranges and control errors of the workspace's machines, as their sheets say now. */
async function sheetsOf(app: App, actor: Actor): Promise<Sheet[]> {
  const sheets: Sheet[] = []
  for (const { machine } of await listMachines(app.db, actor.workspaceId, MOST_MACHINES, 0)) {
    const calibration = await findCalibration(app.db, machine.id, machine.calibration)
    if (!calibration) continue
    const { ranges, controlError } = calibration.sheet
    sheets.push({
      machineId: machine.id,
      machine: machine.name,
      calibration: machine.calibration,
      sigmaH: controlError.h,
      sigmaJ: controlError.J,
      ranges,
    })
  }
  return sheets
}

/** By what it is worked out from: coefficients, and calibrations, which never change. */
const reports = new Recent<Promise<StructureDetailsOutput>>(32)

/** What takes longer to find out than an upload should: bounds, balance, symmetries, and precision on each machine. */
export async function structureDetailsOf(
  app: App,
  actor: Actor,
  id: string,
  version?: number,
): Promise<StructureDetailsView> {
  const row = await problemRow(app, actor, id, version)
  const sheets = await sheetsOf(app, actor)
  const key = [row.fingerprint, ...sheets.map(({ machineId, calibration }) => `${machineId} ${calibration}`)].join(' ')
  const report = reports.get(key, async () => {
    const { form, problem } = await problemData(app, row)
    return app.compute.run('structureDetails', { problem, form, machines: sheets })
  })
  try {
    return detailsView(app, row, sheets, await report)
  } catch (error) {
    reports.drop(key, report)
    throw error
  }
}

function detailsView(app: App, row: ProblemRow, sheets: Sheet[], output: StructureDetailsOutput): StructureDetailsView {
  const { details, precision, seconds } = output
  const inSense = (signs: StructureDetailsView['fields']) =>
    row.sense === 'min' ? signs : { ...signs, negative: signs.positive, positive: signs.negative }
  return {
    ...details,
    variables: row.variables,
    interactions: row.interactions,
    componentSizes: [...details.componentSizes],
    fields: inSense(details.fields),
    couplings: inSense(details.couplings),
    machines: sheets.map(({ ranges: _ranges, ...sheet }, m) => ({ ...sheet, ...precision[m]! })),
    fingerprint: row.fingerprint,
    seconds,
    version: app.version,
  }
}

/** Labels by place, unless they would make the answer large. */
function labelsByPlace(labels: readonly string[], order: Uint32Array): string[] | null {
  if (labels.length > SPARSITY_LIMITS.bins) return null
  const bytes = labels.reduce((sum, label) => sum + Buffer.byteLength(label), 0)
  return bytes > SPARSITY_LIMITS.labelBytes ? null : Array.from(order, (v) => labels[v]!)
}

/** Coefficients by place, in the problem's own sense, of a problem small enough to be drawn cell by cell. */
function cellsOf(row: ProblemRow, { form: from, problem }: ProblemData, form: 'qubo' | 'ising', order: Uint32Array) {
  const { linear, rows, cols, values } = convertForm(problem, from, form)
  const sign = signOf(row.sense)
  const places = placesOf(order)
  const placed = (list: Uint32Array) => Uint8Array.from(list, (v) => places[v]!)
  return {
    rows: placed(rows),
    cols: placed(cols),
    values: values.map((value) => signed(sign, value)),
    linear: Float64Array.from(order, (v) => signed(sign, linear[v]!)),
  }
}

/** The pattern of the interactions as a raster of counts, of small problems cell by cell; see `SparsityMeta`. */
export async function sparsityPicture(app: App, actor: Actor, id: string, query: SparsityQuery): Promise<Uint8Array> {
  const row = await problemRow(app, actor, id, query.version)
  const data = await problemData(app, row)
  const { order, bins } = query
  const form = query.form ?? row.form
  const isSmall = row.variables <= Math.min(bins, SPARSITY_LIMITS.cells)
  const found: Sparsity & { seconds: number } = await app.compute.run('sparsity', {
    problem: data.problem,
    order,
    bins,
    budget: SPARSITY_LIMITS.bytes,
  })
  const meta: SparsityMeta = {
    variables: row.variables,
    interactions: row.interactions,
    form,
    order,
    bins: found.raster.bins,
    bandwidth: found.bandwidth,
    givenBandwidth: found.givenBandwidth,
    distances: [...found.distances],
    labels: labelsByPlace(data.labels, found.order),
    fingerprint: row.fingerprint,
    seconds: found.seconds,
    version: app.version,
  }
  const cells = isSmall ? cellsOf(row, data, form, found.order) : {}
  return packArrays({ counts: found.raster.counts, ...cells }, { ...meta })
}
