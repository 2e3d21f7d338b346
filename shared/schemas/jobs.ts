import type { TracePoint } from './embeddings'

/** States of a job. A job never stays `running` without a living worker: see docs/decisions/jobs.md. */
export type JobStatus = 'waiting' | 'running' | 'done' | 'failed' | 'cancelled'
export type JobKind = 'capacity' | 'embedding' | 'import' | 'reference' | 'rehearsal' | 'scan'

export interface JobLogLine {
  at: string
  message: string
}

export interface JobView {
  id: string
  kind: JobKind
  status: JobStatus
  /** 0 … 1 */
  progress: number
  /** One sentence on where the work stands. */
  message: string
  /**
   * Kind-specific figures of the moment: `EmbeddingProgress` (embeddings.ts), `ReferenceProgress` (reference.ts), the
   * reads of a rehearsal, the points of a capacity measurement, or `ImportedDetail` (archives.ts).
   */
  detail: Record<string, number | string | null | readonly TracePoint[]>
  /** How often the work was started. */
  attempts: number
  createdAt: string
  startedAt: string | null
  finishedAt: string | null
  log: JobLogLine[]
}
