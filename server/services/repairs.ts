import { DomainError } from '../../shared/errors'
import { createEmbeddingSchema } from '../../shared/schemas/embeddings'
import type { RepairsStarted, StartRepairs } from '../../shared/schemas/repairs'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import type { EmbeddingRow } from '../database/repositories/embeddings'
import { lockEmbedding, replacementsOf } from '../database/repositories/embeddings'
import { findJobOfSubject } from '../database/repositories/jobs'
import { brokenEmbeddings, brokenView } from './broken-view'
import { embeddingRow } from './embedding-subject'
import { startEmbedding } from './embeddings'
import { machineRow } from './machine-graphs'

type Started = RepairsStarted['repairs'][number]

const wrongState = (code: string, message: string): DomainError => new DomainError('wrong state', code, message)

/**
 * Starts repairs of embeddings that the calibration in force broke, each as an embedding that takes its place once it is
 * found. A repair that is under way is answered as it is, not started again.
 * @throws DomainError when one that is named needs none, or when nothing on the machine does
 */
export async function startRepairs(
  app: App,
  actor: Actor,
  machineId: string,
  { embeddingIds }: StartRepairs,
): Promise<RepairsStarted> {
  const machine = await machineRow(app, actor, machineId)
  if (embeddingIds) {
    const rows: EmbeddingRow[] = []
    for (const id of new Set(embeddingIds)) rows.push(await embeddingOn(app, actor, machine, id))
    const repairs: Started[] = []
    for (const row of rows) repairs.push(await repairOne(app, actor, row))
    return { repairs, refused: [] }
  }
  const waiting = (await brokenEmbeddings(app, machine)).filter(({ state }) => state === 'to repair')
  if (waiting.length === 0) throw wrongState('repair.none', `No embedding on ${machine.name} waits for a repair.`)
  return repairAll(
    app,
    actor,
    waiting.map(({ embedding }) => embedding.id),
  )
}

/** Starts as many as can be: that one cannot be repaired is no reason to leave the others. */
async function repairAll(app: App, actor: Actor, ids: readonly string[]): Promise<RepairsStarted> {
  const outcome: RepairsStarted = { repairs: [], refused: [] }
  for (const id of ids) {
    const row = await embeddingRow(app, actor, id)
    try {
      outcome.repairs.push(await repairOne(app, actor, row))
    } catch (error) {
      if (!(error instanceof DomainError)) throw error
      outcome.refused.push({ embeddingId: id, number: row.number, message: error.message })
    }
  }
  if (outcome.repairs.length > 0) return outcome
  throw new DomainError(
    'not acceptable',
    'repair.refused',
    outcome.refused[0]!.message,
    outcome.refused.map(({ number, message }) => ({ path: `E-${number}`, message })),
  )
}

async function embeddingOn(
  app: App,
  actor: Actor,
  machine: { id: string; name: string; calibration: number },
  id: string,
): Promise<EmbeddingRow> {
  const row = await embeddingRow(app, actor, id)
  if (row.machineId !== machine.id)
    throw new DomainError('not acceptable', 'repair.machine', `E-${row.number} is not on ${machine.name}.`, [
      { path: 'embeddingIds', message: `E-${row.number} is on another machine` },
    ])
  const broken = await brokenView(app, row)
  if (!broken)
    throw wrongState(
      'repair.holds',
      row.status === 'found'
        ? `E-${row.number} holds at calibration ${machine.calibration}: there is nothing to repair.`
        : `E-${row.number} is ${row.status}; it has no chains to repair.`,
    )
  if (broken.state === 'repaired')
    throw wrongState('repair.done', `E-${row.number} is repaired already, as E-${broken.repair!.number}.`)
  return row
}

/** Chains of the same version of the problem, at the calibration in force; every further try with the next seed. */
async function repairOne(app: App, actor: Actor, row: EmbeddingRow): Promise<Started> {
  const earlier = await replacementsOf(app.db, [row.id])
  const underWay = await runningRepair(app, earlier)
  if (underWay) return { embeddingId: row.id, ...underWay }
  const input = createEmbeddingSchema.parse({
    problemId: row.problemId,
    machineId: row.machineId,
    objective: row.objective,
    seed: earlier.length + 1,
    start: { embeddingId: row.id, work: 'repair' },
  })
  const started = await startEmbedding(app, actor, input, {
    problemVersion: row.problemVersion,
    guard: (tx) => refuseSecond(tx, row),
  })
  return { embeddingId: row.id, ...started }
}

async function runningRepair(app: App, repairs: readonly EmbeddingRow[]) {
  const running = repairs.find(({ status }) => status === 'running')
  const job = running && (await findJobOfSubject(app.db, running.id))
  return job && { id: running.id, jobId: job.id }
}

/** Two people may ask at the same moment: the second finds the first one's repair. */
async function refuseSecond(tx: Db, row: EmbeddingRow): Promise<void> {
  await lockEmbedding(tx, row.id)
  const running = (await replacementsOf(tx, [row.id])).find(({ status }) => status === 'running')
  if (running) throw wrongState('repair.running', `E-${row.number} is being repaired already, as E-${running.number}.`)
}
