import type { JobView } from '../../shared/schemas/jobs'
import type { App } from '../app'
import type { Db } from '../database/client'
import type { JobRow } from '../database/repositories/jobs'

/** What a job kind is given while it runs. */
export interface JobContext {
  readonly job: JobRow
  /** Aborted when the person cancels or the process stops. */
  readonly signal: AbortSignal
  report(progress: number, message: string, detail?: JobView['detail']): void
  log(message: string): void
}

/** How a job ended; `save` stores its result in the transaction that ends the job. */
export interface JobOutcome {
  status: 'done' | 'cancelled'
  message: string
  save(tx: Db): Promise<void>
  /** Works out anew what `save` rests on, after it was Overtaken. */
  again?: () => Promise<JobOutcome>
}

/** One kind of background work. */
export interface JobKindHandler {
  run(app: App, context: JobContext): Promise<JobOutcome>
  /** Settles the subject of a job that failed, or was cancelled before it started. */
  abandon(tx: Db, job: JobRow, status: 'failed' | 'cancelled', reason: string): Promise<void>
}
