import { randomUUID } from 'node:crypto'
import { DomainError } from '../../shared/errors'
import type { StartReference } from '../../shared/schemas/reference'
import type { Actor, App } from '../app'
import { insertJob } from '../database/repositories/jobs'
import { insertReference, referenceUnderWay } from '../database/repositories/reference-optima'
import { problemData, problemRow } from './problems'

/** @throws DomainError where the method asked for does not suit a component of the problem */
async function requireSuitable(
  app: App,
  row: Awaited<ReturnType<typeof problemRow>>,
  method: StartReference['method'],
) {
  if (!method) return
  const { problem, form } = await problemData(app, row)
  const { refusal } = await app.compute.run('planOptimum', { problem, form, method })
  if (refusal !== null)
    throw new DomainError(
      'not acceptable',
      'reference.method',
      `This problem is too large for the method asked for: ${refusal}. Leave the method out: each component is then given one that suits it.`,
      [{ path: 'method', message: refusal }],
    )
}

/** Queues the look for the optimum of a problem as it stands now. */
export async function startReference(
  app: App,
  actor: Actor,
  problemId: string,
  input: StartReference,
): Promise<{ id: string; jobId: string }> {
  const row = await problemRow(app, actor, problemId)
  await requireSuitable(app, row, input.method)
  const { seed, timeLimitSeconds, method = null } = input
  const [id, jobId, now] = [randomUUID(), randomUUID(), app.now()]
  const { workspaceId, userId: createdBy } = actor
  await app.db.transaction(async (tx) => {
    if (await referenceUnderWay(tx, problemId, row.version))
      throw new DomainError(
        'wrong state',
        'reference.running',
        'A look for the optimum of this problem is under way. Stop it, or wait until it is over.',
      )
    await insertReference(tx, {
      id,
      workspaceId,
      problemId,
      problemVersion: row.version,
      status: 'running',
      settings: { seed, timeLimitSeconds, method },
      version: app.version,
      createdBy,
      createdAt: now,
    })
    await insertJob(tx, { id: jobId, workspaceId, kind: 'reference', subjectId: id, createdBy }, now)
  })
  await app.queue.announce(jobId)
  return { id, jobId }
}
