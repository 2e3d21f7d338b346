import type { PageQuery } from '../../shared/schemas/common'
import type { EmbeddingDamage } from '../../shared/schemas/machines'
import type { BrokenList, BrokenState, BrokenView, RepairView } from '../../shared/schemas/repairs'
import { OPEN_STATES } from '../../shared/schemas/run-sheets'
import type { Actor, App } from '../app'
import type { EmbeddingRow } from '../database/repositories/embeddings'
import { replacementsOf } from '../database/repositories/embeddings'
import { findJobOfSubject } from '../database/repositories/jobs'
import type { MachineRow } from '../database/repositories/machines'
import { listBrokenEmbeddings } from '../database/repositories/machines'
import { pageOf, positionOf } from '../database/repositories/pages'
import { findReferredProblem, personOf } from '../database/repositories/problems'
import type { RunSheetRow } from '../database/repositories/run-sheets'
import { runSheetsOfEmbeddings } from '../database/repositories/run-sheets'
import { damageInForce } from './embedding-damage'
import { machineRow } from './machine-graphs'

type Listed = Awaited<ReturnType<typeof listBrokenEmbeddings>>[number]

/** What is known of the broken embeddings of a machine beside themselves. */
interface Surroundings {
  machine: MachineRow
  /** Broken and not holding again, whatever became of them. */
  broken: ReadonlySet<string>
  /** Newest first. */
  repairs: EmbeddingRow[]
  runSheets: RunSheetRow[]
}

async function surroundingsOf(app: App, machine: MachineRow, rows: readonly Listed[]): Promise<Surroundings> {
  const ids = rows.map(({ embedding }) => embedding.id)
  const open = rows.filter(({ broken }) => broken.holdsAgain === null)
  return {
    machine,
    broken: new Set(open.map(({ embedding }) => embedding.id)),
    repairs: await replacementsOf(app.db, ids),
    runSheets: (await runSheetsOfEmbeddings(app.db, ids)).filter(({ state }) => OPEN_STATES.includes(state)),
  }
}

/** The repair that counts: one that stands, else one under way, else the newest. */
function repairOf(embeddingId: string, { repairs, broken }: Surroundings): EmbeddingRow | undefined {
  const own = repairs.filter(({ startId }) => startId === embeddingId)
  return (
    own.find(({ id, status }) => status === 'found' && !broken.has(id)) ??
    own.find(({ status }) => status === 'running') ??
    own[0]
  )
}

function stateOf(
  holdsAgain: number | null,
  repair: EmbeddingRow | undefined,
  broken: ReadonlySet<string>,
): BrokenState {
  if (holdsAgain !== null) return 'holds again'
  if (repair?.status === 'found' && !broken.has(repair.id)) return 'repaired'
  return repair?.status === 'running' ? 'running' : 'to repair'
}

async function repairView(app: App, row: EmbeddingRow): Promise<RepairView> {
  const job = await findJobOfSubject(app.db, row.id)
  return {
    id: row.id,
    number: row.number,
    calibration: row.calibration,
    status: row.status,
    jobId: job?.id ?? null,
    progress: row.status === 'running' ? (job?.progress ?? 0) : null,
    message: row.reason ?? job?.message ?? '',
    changedChains: row.changedChains,
  }
}

async function viewOf(
  app: App,
  { broken, embedding, problem, createdBy }: Listed,
  damage: EmbeddingDamage,
  around: Surroundings,
): Promise<BrokenView> {
  const repair = repairOf(embedding.id, around)
  const { machine } = around
  return {
    embedding: { id: embedding.id, number: embedding.number },
    machine: { id: machine.id, name: machine.name },
    problem,
    createdBy,
    calibration: broken.calibration,
    calibrationInForce: machine.calibration,
    damage,
    runSheets: around.runSheets
      .filter(({ embeddingId }) => embeddingId === embedding.id)
      .map(({ id, number, state }) => ({ id, number, state })),
    state: stateOf(broken.holdsAgain, repair, around.broken),
    holdsAgain: broken.holdsAgain,
    repair: repair ? await repairView(app, repair) : null,
  }
}

/** Whether a broken embedding is still of interest: what was settled before the calibration in force is not. */
function isCurrent({ state, repair, holdsAgain, calibrationInForce }: BrokenView): boolean {
  if (state === 'repaired') return repair!.calibration === calibrationInForce
  return state !== 'holds again' || holdsAgain === calibrationInForce
}

/** The damage stored; of those broken before it was stored, worked out. */
async function damageOf(app: App, { broken, embedding }: Listed): Promise<EmbeddingDamage> {
  if (broken.damage.ofChains > 0 || broken.holdsAgain !== null) return broken.damage
  return (await damageInForce(app, embedding)) ?? broken.damage
}

/** Views of some of the broken embeddings of a machine, as far as they are of interest. */
async function viewsOf(app: App, shown: readonly Listed[], around: Surroundings): Promise<BrokenView[]> {
  const views: BrokenView[] = []
  for (const row of shown) views.push(await viewOf(app, row, await damageOf(app, row), around))
  return views.filter(isCurrent)
}

/** Embeddings that calibrations of a machine broke and what becomes of them, the latest calibration first. */
export async function brokenEmbeddings(app: App, machine: MachineRow): Promise<BrokenView[]> {
  const rows = await listBrokenEmbeddings(app.db, machine.id)
  return viewsOf(app, rows, await surroundingsOf(app, machine, rows))
}

/** The same a page at a time; what was settled long ago leaves gaps, so that a page may hold less than its limit. */
export async function brokenList(app: App, actor: Actor, machineId: string, query: PageQuery): Promise<BrokenList> {
  const machine = await machineRow(app, actor, machineId)
  // Whether a repair stands depends on whether it is broken itself, so all are looked at.
  const rows = await listBrokenEmbeddings(app.db, machineId)
  const offset = positionOf(query.cursor)
  const shown = pageOf(rows.slice(offset, offset + query.limit + 1), query.limit, offset)
  const items = await viewsOf(app, shown.items, await surroundingsOf(app, machine, rows))
  return { calibration: machine.calibration, items, nextCursor: shown.nextCursor }
}

/** One embedding that does not hold at the calibration in force; null where it does. */
export async function brokenView(app: App, row: EmbeddingRow): Promise<BrokenView | null> {
  const damage = await damageInForce(app, row)
  return damage && brokenViewBy(app, row, damage)
}

async function brokenViewBy(app: App, embedding: EmbeddingRow, damage: EmbeddingDamage): Promise<BrokenView> {
  const machine = await machineRow(app, embedding, embedding.machineId)
  const rows = await listBrokenEmbeddings(app.db, machine.id)
  const stored = rows.find((row) => row.embedding.id === embedding.id && row.broken.holdsAgain === null)
  const listed = stored ?? (await unstored(app, machine, embedding, damage))
  return viewOf(app, listed, damage, await surroundingsOf(app, machine, [...rows, ...(stored ? [] : [listed])]))
}

/** As if the calibration in force had broken it: so it is with those broken before such things were stored. */
async function unstored(app: App, machine: MachineRow, embedding: EmbeddingRow, damage: EmbeddingDamage) {
  const { id, number, name } = (await findReferredProblem(app.db, embedding.problemId, embedding.problemVersion))!
  return {
    broken: {
      machineId: machine.id,
      calibration: machine.calibration,
      embeddingId: embedding.id,
      damage,
      holdsAgain: null,
    },
    embedding,
    problem: { id, number, name },
    createdBy: await personOf(app.db, embedding.createdBy),
  }
}
