import { randomUUID } from 'node:crypto'
import type { App } from '../app'
import type { Beat, JobRow } from '../database/repositories/jobs'
import {
  beatJob,
  claimJob,
  failDeadJob,
  finishJob,
  handBackJob,
  overdueJobs,
  requeueJob,
  silentJobs,
} from '../database/repositories/jobs'
import type { JobLogLine, JobView } from '../../shared/schemas/jobs'
import { Overtaken } from '../services/overtaken'
import type { JobOutcome } from './kind'
import { JOB_KINDS } from './kinds'

/** A heartbeat and a look at the cancel flag this often. */
const BEAT_MS = 400
/** A worker not heard of for this long is taken for dead. */
const SILENCE_MS = 15_000
const SWEEP_MS = 5_000
/** A job that has waited this long without being announced was created by a process that stopped before it could. */
const OVERDUE_MS = 2_000
/** A job whose worker died this often is not tried again: it may be what kills it. */
const MAX_ATTEMPTS = 2

/** Why the work of a job is aborted when the process stops: the job is handed back, whatever its work answers. */
const STOPPING = 'stopping'

/** Takes jobs from the queue, keeps their heartbeat, ends them, and picks up after dead workers. */
export interface Runner {
  stop(): Promise<void>
}

interface Running {
  controller: AbortController
  finished: Promise<void>
}

export async function startRunner(app: App, concurrency: number): Promise<Runner> {
  const worker = randomUUID()
  const running = new Map<string, Running>()
  let stopping = false

  const handle = async (jobId: string): Promise<void> => {
    const job = stopping ? undefined : await claimJob(app.db, jobId, worker, app.now())
    if (!job) return
    const controller = new AbortController()
    const finished = execute(app, job, worker, controller)
    running.set(jobId, { controller, finished })
    await finished.finally(() => running.delete(jobId))
  }

  // The embedded database has one process, so whatever is found running at its start lost its worker.
  await recover(app, app.database.pglite ? 0 : SILENCE_MS)
  const timer = setInterval(() => void recover(app, SILENCE_MS).catch(report), SWEEP_MS)
  timer.unref()
  await app.queue.take(concurrency, handle)
  return {
    async stop() {
      stopping = true
      clearInterval(timer)
      await app.queue.stop()
      for (const { controller } of running.values()) controller.abort(STOPPING)
      await Promise.allSettled([...running.values()].map(({ finished }) => finished))
    },
  }
}

const report = (error: unknown): void =>
  console.error(`jobs: ${error instanceof Error ? error.message : String(error)}`)

async function execute(app: App, job: JobRow, worker: string, controller: AbortController): Promise<void> {
  const log: JobLogLine[] = [...job.log]
  const note = (message: string): void => void log.push({ at: app.now().toISOString(), message })
  const heart = startHeartbeat(app, job.id, worker, controller)
  note(`started, attempt ${job.attempts}`)
  const kind = JOB_KINDS[job.kind]
  try {
    const context = { job, signal: controller.signal, report: heart.set, log: note }
    const outcome = await kind.run(app, context)
    await heart.stop()
    if (controller.signal.reason === STOPPING) return await handBackJob(app.db, job.id, worker)
    note(outcome.message)
    await saveOutcome(app, job, worker, outcome, log)
  } catch (error) {
    await heart.stop()
    if (controller.signal.reason === STOPPING) return await handBackJob(app.db, job.id, worker).catch(report)
    const message = error instanceof Error ? error.message : String(error)
    note(message)
    await app.db
      .transaction(async (tx) => {
        if (await finishJob(tx, job.id, worker, { status: 'failed', message, log }, app.now()))
          await kind.abandon(tx, job, 'failed', message)
      })
      .catch(report)
  }
}

/** Ends the job and stores its result, in one transaction. */
async function saveOutcome(app: App, job: JobRow, worker: string, outcome: JobOutcome, log: JobLogLine[]) {
  try {
    await app.db.transaction(async (tx) => {
      if (!(await finishJob(tx, job.id, worker, { ...outcome, log }, app.now())))
        throw new Error(`job ${job.id} was taken over by another worker`)
      await outcome.save(tx)
    })
  } catch (error) {
    if (!(error instanceof Overtaken) || !outcome.again) throw error
    await saveOutcome(app, job, worker, await outcome.again(), log)
  }
}

/** Writes progress and heartbeat at a steady pace, and carries a cancel request to the work. */
function startHeartbeat(app: App, jobId: string, worker: string, controller: AbortController) {
  let latest: Beat | undefined
  let writing: Promise<void> = Promise.resolve()
  const beat = async (): Promise<void> => {
    const cancelRequested = await beatJob(app.db, jobId, worker, latest ?? {}, app.now())
    // null: the job was given to another worker while this one was silent.
    if (cancelRequested !== false) controller.abort()
  }
  const timer = setInterval(() => {
    writing = writing.then(beat).catch(report)
  }, BEAT_MS)
  return {
    set(progress: number, message: string, detail?: JobView['detail']) {
      latest = { progress: Math.min(1, Math.max(0, progress)), message, ...(detail ? { detail } : {}) }
    },
    async stop() {
      clearInterval(timer)
      await writing
      // What was reported since the last beat would be lost: work shorter than one would show no progress at all.
      if (latest) await beatJob(app.db, jobId, worker, latest, app.now()).catch(report)
    },
  }
}

/** Takes up jobs of dead workers again, or fails those that died too often; re-announces jobs nobody was told of. */
async function recover(app: App, silenceMs: number): Promise<void> {
  const now = app.now()
  for (const job of await silentJobs(app.db, new Date(now.getTime() - silenceMs))) {
    if (job.attempts < MAX_ATTEMPTS) {
      if (await requeueJob(app.db, job, 'its worker stopped; taken up again')) await app.queue.announce(job.id)
      continue
    }
    const reason = `its worker stopped ${job.attempts} times while running it; not tried again`
    await app.db.transaction(async (tx) => {
      if (await failDeadJob(tx, job, reason, now)) await JOB_KINDS[job.kind].abandon(tx, job, 'failed', reason)
    })
  }
  const overdue = await overdueJobs(app.db, new Date(now.getTime() - OVERDUE_MS))
  if (overdue.length === 0) return
  const announced = await app.queue.announced()
  for (const { id } of overdue) if (!announced.has(id)) await app.queue.announce(id)
}
