import { DomainError } from '../../shared/errors'
import type { JobView } from '../../shared/schemas/jobs'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import type { Deleted } from '../database/repositories/jobs'
import { cancelJobsOf, cancelWaitingJob, findJob, jobView, requestCancel } from '../database/repositories/jobs'
import type { JobKindHandler } from '../jobs/kind'

async function jobRow(app: App, actor: Actor, id: string) {
  const row = await findJob(app.db, id)
  if (!row || row.workspaceId !== actor.workspaceId)
    throw new DomainError('not found', 'job.unknown', 'There is no such job in this workspace.')
  return row
}

export async function jobOf(app: App, actor: Actor, id: string): Promise<JobView> {
  return jobView(await jobRow(app, actor, id))
}

/** Asks a running job to stop and keep its best, or ends one that waits. Cancelling one that is over changes nothing. */
export async function cancelJob(
  app: App,
  actor: Actor,
  id: string,
  kinds: Record<string, JobKindHandler>,
): Promise<JobView> {
  const row = await jobRow(app, actor, id)
  const reason = 'cancelled before it started'
  const ended = await app.db.transaction(async (tx) => {
    if (!(await cancelWaitingJob(tx, id, app.now()))) return false
    await kinds[row.kind]!.abandon(tx, row, 'cancelled', reason)
    return true
  })
  if (!ended) await requestCancel(app.db, id)
  return jobOf(app, actor, id)
}

/** Clears away what a deletion left, in its transaction: blobs, and jobs still at work on what is gone. */
export async function clearAway(app: App, tx: Db, { blobIds, subjectIds }: Deleted): Promise<void> {
  await cancelJobsOf(tx, subjectIds, app.now())
  await app.blobs.remove(tx, blobIds)
}
