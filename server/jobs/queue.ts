import PgBoss from 'pg-boss'
import type { Database } from '../database/client'

const QUEUE = 'work'
const POLL_SECONDS = 0.5
/** pg-boss abandons a message after this; our own heartbeat notices a dead worker within seconds (runner.ts). */
const EXPIRE_HOURS = 23

/** Delivers job ids to workers, across processes. The state of a job lives in the `jobs` table, not here. */
export interface Queue {
  /** Announces a waiting job; repeated announcements are harmless, since a worker claims a job only once. */
  announce(jobId: string): Promise<void>
  /** Ids of the jobs that are announced and not yet taken. */
  announced(): Promise<Set<string>>
  /** Starts taking jobs, at most `concurrency` at a time. */
  take(concurrency: number, handle: (jobId: string) => Promise<void>): Promise<void>
  running(): boolean
  /** Stops taking; messages in hand are left to their handlers. */
  stop(): Promise<void>
}

/** Starts pg-boss on the database. Creation runs under the start lock: two processes creating at once would deadlock. */
export async function startQueue(database: Database): Promise<Queue> {
  const boss = new PgBoss({
    db: { executeSql: (text, values) => database.executeSql(text, values) },
    schedule: false,
    retryLimit: 0,
    expireInHours: EXPIRE_HOURS,
    deleteAfterDays: 1,
  })
  boss.on('error', (error) => console.error(`queue: ${error.message}`))
  await database.exclusively(async () => {
    await boss.start()
    await boss.createQueue(QUEUE)
  })
  const workers: string[] = []
  let stopped = false
  return {
    async announce(jobId) {
      await boss.send(QUEUE, { jobId })
      for (const worker of workers) boss.notifyWorker(worker)
    },
    async announced() {
      const { rows } = await database.executeSql(
        `select data->>'jobId' as id from pgboss.job where name = $1 and state < 'active'`,
        [QUEUE],
      )
      return new Set(rows.map((row) => String(row.id)))
    },
    async take(concurrency, handle) {
      // One worker per slot: with a larger batch one failing job would fail the batch.
      for (let slot = 0; slot < concurrency; slot++)
        workers.push(
          await boss.work<{ jobId: string }>(
            QUEUE,
            { batchSize: 1, pollingIntervalSeconds: POLL_SECONDS },
            async ([message]) => {
              if (message) await handle(message.data.jobId)
            },
          ),
        )
    },
    running: () => !stopped,
    async stop() {
      stopped = true
      await boss.stop({ graceful: false, close: false, wait: false })
    },
  }
}
