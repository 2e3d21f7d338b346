import { randomUUID } from 'node:crypto'
import type { EmbeddingTask } from '../../shared/engine/embedding/task'
import { DomainError } from '../../shared/errors'
import type { DeletionView } from '../../shared/schemas/deletions'
import type { CreateEmbedding } from '../../shared/schemas/embeddings'
import { EDITABLE_STATES } from '../../shared/schemas/run-sheets'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import { nextNumber } from '../database/repositories/counters'
import { insertEmbedding, markChosen } from '../database/repositories/embeddings'
import { insertJob } from '../database/repositories/jobs'
import { runSheetsOfEmbeddings } from '../database/repositories/run-sheets'
import { deleteFor } from './deletions'
import { startOf } from './embedding-start'
import { embeddingRow, identityOf, subjectOf, taskOf } from './embedding-subject'

/** What a repair asks for beside what a person may. */
interface InPlaceOf {
  /** Of the embedding that is repaired, current or not. */
  problemVersion: number
  /** Refuses by an error, in the transaction that stores the new embedding. */
  guard: (tx: Db) => Promise<void>
}

/**
 * Queues the making of an embedding. Refused at once where a proved bound rules every embedding out.
 * @param inPlace once found, it takes the place of the embedding that it begins from
 */
export async function startEmbedding(
  app: App,
  actor: Actor,
  input: CreateEmbedding,
  inPlace?: InPlaceOf,
): Promise<{ id: string; jobId: string }> {
  const subject = await subjectOf(app, actor, { ...input, problemVersion: inPlace?.problemVersion })
  await requireFeasible(app, taskOf(subject, null))
  const { seed, tries, timeLimitSeconds, objective, target, start } = input
  if (start) await startOf(app, actor, subject, start)
  const id = randomUUID()
  const jobId = randomUUID()
  await app.db.transaction(async (tx) => {
    await inPlace?.guard(tx)
    await insertEmbedding(tx, {
      id,
      ...identityOf(app, actor, subject),
      number: await nextNumber(tx, subject.problem.id, 'embedding'),
      status: 'running',
      method: start?.work ?? input.method ?? 'auto',
      seed,
      tries,
      timeLimitSeconds,
      objective,
      target: { longestChain: target.longestChain ?? null, totalQubits: target.totalQubits ?? null },
      startId: start?.embeddingId,
      frozen: start?.frozen,
      replaces: inPlace !== undefined,
    })
    await insertJob(
      tx,
      { id: jobId, workspaceId: actor.workspaceId, kind: 'embedding', subjectId: id, createdBy: actor.userId },
      app.now(),
    )
  })
  await app.queue.announce(jobId)
  return { id, jobId }
}

/** The bounds may take a second for large inputs, so a thread looks at them. */
async function requireFeasible(app: App, task: EmbeddingTask): Promise<void> {
  const infeasible = await app.compute.run('proveInfeasible', { task, thorough: false })
  if (!infeasible) return
  throw new DomainError(
    'not acceptable',
    'embedding.infeasible',
    `${infeasible.message} Choose a larger machine or a smaller problem.`,
    [{ path: 'machineId', message: infeasible.message }],
  )
}

/** Marks an embedding as the one to go on with, which takes the mark from any other of the problem on the machine. */
export async function chooseEmbedding(app: App, actor: Actor, id: string, chosen: boolean): Promise<void> {
  const row = await embeddingRow(app, actor, id)
  if (row.status !== 'found')
    throw new DomainError(
      'wrong state',
      'embedding.not-found',
      `E-${row.number} is ${row.status}; only an embedding that was found can be chosen.`,
    )
  await app.db.transaction((tx) => markChosen(tx, row, chosen))
}

/** Deletes an embedding with the drafts on it; kept once a run sheet on it was handed over. */
export async function removeEmbedding(app: App, actor: Actor, id: string): Promise<DeletionView> {
  const row = await embeddingRow(app, actor, id)
  const kept = (await runSheetsOfEmbeddings(app.db, [id])).find(({ state }) => !EDITABLE_STATES.includes(state))
  if (kept)
    throw new DomainError(
      'wrong state',
      'embedding.kept',
      `E-${row.number} is kept: RS-${kept.number} on it is ${kept.state}. Only embeddings with nothing but drafts can be deleted.`,
    )
  return deleteFor(app, 'embedding', id)
}
