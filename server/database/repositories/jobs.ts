import { and, eq, inArray, isNull, lt, or, sql } from 'drizzle-orm'
import type { JobKind, JobLogLine, JobStatus, JobView } from '../../../shared/schemas/jobs'
import type { Db } from '../client'
import { jobs } from '../schema'

export type JobRow = typeof jobs.$inferSelect

const LOG_LINES = 200

export interface NewJob {
  id: string
  workspaceId: string
  kind: JobKind
  subjectId: string
  createdBy: string
}

/** Adds a waiting job; part of the transaction that creates its subject. */
export async function insertJob(db: Db, job: NewJob, at: Date): Promise<void> {
  await db.insert(jobs).values({
    ...job,
    status: 'waiting',
    progress: 0,
    message: 'waiting for a free worker',
    detail: {},
    log: [],
    attempts: 0,
    cancelRequested: false,
    createdAt: at,
  })
}

export async function findJob(db: Db, id: string): Promise<JobRow | undefined> {
  return (await db.select().from(jobs).where(eq(jobs.id, id)))[0]
}

export async function findJobOfSubject(db: Db, subjectId: string): Promise<JobRow | undefined> {
  return (
    await db
      .select()
      .from(jobs)
      .where(eq(jobs.subjectId, subjectId))
      .orderBy(sql`${jobs.createdAt} desc`)
      .limit(1)
  )[0]
}

/** Ids of the jobs of several subjects, by subject. */
export async function jobsOfSubjects(db: Db, subjectIds: readonly string[]): Promise<Map<string, string>> {
  if (subjectIds.length === 0) return new Map()
  const rows = await db
    .select({ id: jobs.id, subjectId: jobs.subjectId })
    .from(jobs)
    .where(inArray(jobs.subjectId, [...subjectIds]))
  return new Map(rows.map((row) => [row.subjectId, row.id]))
}

/** Takes a waiting job for this worker; undefined when another has it or it is over. */
export async function claimJob(db: Db, id: string, worker: string, at: Date): Promise<JobRow | undefined> {
  const rows = await db
    .update(jobs)
    .set({
      status: 'running',
      worker,
      attempts: sql`${jobs.attempts} + 1`,
      startedAt: at,
      heartbeatAt: at,
      message: 'started',
      progress: 0,
    })
    .where(and(eq(jobs.id, id), eq(jobs.status, 'waiting')))
    .returning()
  return rows[0]
}

export interface Beat {
  progress?: number
  message?: string
  detail?: JobView['detail']
}

/**
 * Says that the worker lives and where the work stands.
 * @returns whether the person asked to cancel, or null when the job is no longer this worker's
 */
export async function beatJob(db: Db, id: string, worker: string, beat: Beat, at: Date): Promise<boolean | null> {
  const rows = await db
    .update(jobs)
    .set({ ...beat, heartbeatAt: at })
    .where(and(eq(jobs.id, id), eq(jobs.worker, worker), eq(jobs.status, 'running')))
    .returning({ cancelRequested: jobs.cancelRequested })
  return rows[0]?.cancelRequested ?? null
}

/** Ends a running job, only while it still is this worker's. */
export async function finishJob(
  db: Db,
  id: string,
  worker: string,
  end: { status: JobStatus; message: string; log?: JobLogLine[] },
  at: Date,
): Promise<boolean> {
  const rows = await db
    .update(jobs)
    .set({
      status: end.status,
      message: end.message,
      finishedAt: at,
      ...(end.status === 'done' ? { progress: 1 } : {}),
      ...(end.log ? { log: end.log.slice(-LOG_LINES) } : {}),
    })
    .where(and(eq(jobs.id, id), eq(jobs.worker, worker), eq(jobs.status, 'running')))
    .returning({ id: jobs.id })
  return rows.length === 1
}

/** Ends a job that no worker has taken yet; false when one has. */
export async function cancelWaitingJob(db: Db, id: string, at: Date): Promise<boolean> {
  const rows = await db
    .update(jobs)
    .set({ status: 'cancelled', cancelRequested: true, message: 'cancelled before it started', finishedAt: at })
    .where(and(eq(jobs.id, id), eq(jobs.status, 'waiting')))
    .returning({ id: jobs.id })
  return rows.length === 1
}

export async function requestCancel(db: Db, id: string): Promise<void> {
  await db.update(jobs).set({ cancelRequested: true }).where(eq(jobs.id, id))
}

/** What a deletion leaves to be cleared away. */
export interface Deleted {
  /** Blobs that nothing refers to any more. */
  blobIds: string[]
  /** Embeddings and returns that are gone; jobs may still be at work on them. */
  subjectIds: string[]
}

/** Ends the jobs of subjects that were deleted: those that wait at once, those that run at their next heartbeat. */
export async function cancelJobsOf(db: Db, subjectIds: readonly string[], at: Date): Promise<void> {
  if (subjectIds.length === 0) return
  const concerned = inArray(jobs.subjectId, [...subjectIds])
  const message = 'cancelled: what it worked on was deleted'
  await db
    .update(jobs)
    .set({ status: 'cancelled', cancelRequested: true, message, finishedAt: at })
    .where(and(concerned, eq(jobs.status, 'waiting')))
  await db
    .update(jobs)
    .set({ cancelRequested: true })
    .where(and(concerned, eq(jobs.status, 'running')))
}

/** Gives a running job back to the queue without counting the attempt, as at an orderly shutdown. */
export async function handBackJob(db: Db, id: string, worker: string): Promise<void> {
  await db
    .update(jobs)
    .set({
      status: 'waiting',
      worker: null,
      attempts: sql`${jobs.attempts} - 1`,
      message: 'handed back when its worker was stopped',
    })
    .where(and(eq(jobs.id, id), eq(jobs.worker, worker), eq(jobs.status, 'running')))
}

/** Running jobs whose worker has not been heard of since `before`. */
export async function silentJobs(db: Db, before: Date): Promise<JobRow[]> {
  return db
    .select()
    .from(jobs)
    .where(and(eq(jobs.status, 'running'), or(isNull(jobs.heartbeatAt), lt(jobs.heartbeatAt, before))))
}

/** Jobs that have waited since `before`: their message may have been lost with the process that sent it. */
export async function overdueJobs(db: Db, before: Date): Promise<{ id: string }[]> {
  return db
    .select({ id: jobs.id })
    .from(jobs)
    .where(and(eq(jobs.status, 'waiting'), lt(jobs.createdAt, before)))
}

/** Puts a job back into the queue after its worker died. Guarded, so that two sweeps do it once. */
export async function requeueJob(db: Db, row: JobRow, message: string): Promise<boolean> {
  const rows = await db
    .update(jobs)
    .set({ status: 'waiting', worker: null, message, log: [...row.log, { at: new Date().toISOString(), message }] })
    .where(and(eq(jobs.id, row.id), eq(jobs.status, 'running'), eq(jobs.attempts, row.attempts)))
    .returning({ id: jobs.id })
  return rows.length === 1
}

/** Fails a job whose worker died too often, with its subject, in one transaction given. */
export async function failDeadJob(db: Db, row: JobRow, message: string, at: Date): Promise<boolean> {
  const rows = await db
    .update(jobs)
    .set({ status: 'failed', message, finishedAt: at })
    .where(and(eq(jobs.id, row.id), eq(jobs.status, 'running'), eq(jobs.attempts, row.attempts)))
    .returning({ id: jobs.id })
  return rows.length === 1
}

export function jobView(row: JobRow): JobView {
  return {
    id: row.id,
    kind: row.kind,
    status: row.status,
    progress: row.progress,
    message: row.message,
    detail: row.detail,
    attempts: row.attempts,
    createdAt: row.createdAt.toISOString(),
    startedAt: row.startedAt?.toISOString() ?? null,
    finishedAt: row.finishedAt?.toISOString() ?? null,
    log: row.log,
  }
}
