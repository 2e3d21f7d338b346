import { boolean, doublePrecision, index, integer, jsonb, pgTable, primaryKey, text } from 'drizzle-orm/pg-core'
import type { JobKind, JobStatus, JobView } from '../../../shared/schemas/jobs'
import { createdAt, id, moment } from './columns'
import { createdBy, workspaceId } from './references'

/** Running numbers: problems and run sheets per workspace, embeddings per problem, returns per run sheet. */
export const counters = pgTable(
  'counters',
  { scope: text().notNull(), kind: text().notNull(), value: integer().notNull() },
  (table) => [primaryKey({ columns: [table.scope, table.kind] })],
)

export const jobs = pgTable(
  'jobs',
  {
    id: id(),
    workspaceId: workspaceId(),
    kind: text().$type<JobKind>().notNull(),
    /** The embedding or return that the job fills. */
    subjectId: text().notNull(),
    status: text().$type<JobStatus>().notNull(),
    progress: doublePrecision().notNull(),
    message: text().notNull(),
    detail: jsonb().$type<JobView['detail']>().notNull(),
    log: jsonb().$type<{ at: string; message: string }[]>().notNull(),
    attempts: integer().notNull(),
    cancelRequested: boolean().notNull(),
    /** The process that runs it; its heartbeat tells whether that process still lives. */
    worker: text(),
    heartbeatAt: moment(),
    createdBy: createdBy(),
    createdAt: createdAt(),
    startedAt: moment(),
    finishedAt: moment(),
  },
  (table) => [index().on(table.status), index().on(table.subjectId)],
)
