import type { AnyPgColumn } from 'drizzle-orm/pg-core'
import { doublePrecision, index, integer, jsonb, pgTable, text, uniqueIndex } from 'drizzle-orm/pg-core'
import type { ReturnMeasures } from '../../../shared/schemas/return-comparison'
import type { Decoding } from '../../../shared/schemas/returns'
import type { ScanPoint, ScanRequest } from '../../../shared/schemas/scans'
import type { RunSheetSettings, RunSheetState } from '../../../shared/schemas/run-sheets'
import { blobs } from './blobs'
import { createdAt, id, moment } from './columns'
import { embeddings } from './machines'
import { users } from './people'
import { createdBy, deletion, workspaceId } from './references'

export const runSheets = pgTable(
  'run_sheets',
  {
    id: id(),
    workspaceId: workspaceId(),
    embeddingId: text()
      .notNull()
      .references(() => embeddings.id, { onDelete: 'cascade' }),
    number: integer().notNull(),
    name: text().notNull(),
    state: text().$type<RunSheetState>().notNull(),
    settings: jsonb().$type<RunSheetSettings>().notNull(),
    /** SHA-256 of settings and programmed values; set at approval, frozen from then on. */
    fingerprint: text(),
    machineTimeMilliseconds: doublePrecision().notNull(),
    preparedBy: createdBy(),
    reviewedBy: text().references(() => users.id),
    /** The run sheet that it was copied from. */
    madeFromId: text().references((): AnyPgColumn => runSheets.id, { onDelete: 'set null' }),
    createdAt: createdAt(),
    changedAt: moment().notNull(),
    ...deletion(),
  },
  (table) => [uniqueIndex().on(table.workspaceId, table.number), index().on(table.embeddingId)],
)

/** Hand-overs and remarks of a run sheet; only ever added to. */
export const runSheetRemarks = pgTable(
  'run_sheet_remarks',
  {
    id: id(),
    runSheetId: text()
      .notNull()
      .references(() => runSheets.id, { onDelete: 'cascade' }),
    by: text().references(() => users.id),
    /** The reviewer in whose place it was decided. */
    forUserId: text().references(() => users.id),
    what: text().notNull(),
    /** People whom it mentions are in it by id; `mentions` has those who were members when it was written. */
    text: text().notNull(),
    mentions: text().array().notNull().default([]),
    /** With a submission: the settings that were submitted. */
    settings: jsonb().$type<RunSheetSettings>(),
    createdAt: createdAt(),
  },
  (table) => [index().on(table.runSheetId, table.createdAt)],
)

export const returns = pgTable(
  'returns',
  {
    id: id(),
    workspaceId: workspaceId(),
    runSheetId: text()
      .notNull()
      .references(() => runSheets.id, { onDelete: 'cascade' }),
    /** The run sheet's embedding when the samples were made: a repair may move the run sheet to another. */
    embeddingId: text()
      .notNull()
      .references(() => embeddings.id, { onDelete: 'cascade' }),
    number: integer().notNull(),
    source: text().$type<'rehearsal' | 'upload'>().notNull(),
    status: text().$type<'running' | 'ready' | 'failed' | 'cancelled'>().notNull(),
    /** What made the samples: settings of a rehearsal or the uploaded file. */
    made: jsonb().$type<Record<string, string | number | boolean | null>>().notNull(),
    /** The run sheet's settings when the samples were made: a draft may change afterwards. */
    settings: jsonb().$type<RunSheetSettings>().notNull(),
    samplesBlobId: text().references(() => blobs.id),
    /** Packed counts of breaks by qubit and chain coupler; made when first asked for. */
    breaksBlobId: text().references(() => blobs.id),
    /** Packed break statistics, energies and decoded rows; made with the samples, or when first asked for. */
    summaryBlobId: text().references(() => blobs.id),
    /** What comparisons show of the samples; worked out when first asked for. */
    measures: jsonb().$type<ReturnMeasures>(),
    reads: integer().notNull(),
    readsWithBreak: integer(),
    /** Best majority-decoded energy in the problem's own sense. */
    best: doublePrecision(),
    reason: text(),
    seconds: doublePrecision(),
    version: text().notNull(),
    createdBy: createdBy(),
    createdAt: createdAt(),
    ...deletion(),
  },
  (table) => [uniqueIndex().on(table.runSheetId, table.number), index().on(table.embeddingId)],
)

/** Rehearsals over a range of chain strengths, to see from where on chains hold and answers get better. */
export const scans = pgTable(
  'scans',
  {
    id: id(),
    workspaceId: workspaceId(),
    runSheetId: text()
      .notNull()
      .references(() => runSheets.id, { onDelete: 'cascade' }),
    /** The run sheet's embedding when the scan was made. */
    embeddingId: text()
      .notNull()
      .references(() => embeddings.id, { onDelete: 'cascade' }),
    number: integer().notNull(),
    status: text().$type<'running' | 'ready' | 'failed' | 'cancelled'>().notNull(),
    /** Strengths, reads and what else was asked for. */
    made: jsonb().$type<ScanRequest>().notNull(),
    /** The run sheet's settings when the scan was made; only their strength varies. */
    settings: jsonb().$type<RunSheetSettings>().notNull(),
    /** What was measured at each strength; as far as it came. */
    points: jsonb().$type<ScanPoint[]>().notNull().default([]),
    reason: text(),
    seconds: doublePrecision(),
    version: text().notNull(),
    createdBy: createdBy(),
    createdAt: createdAt(),
    ...deletion(),
  },
  (table) => [uniqueIndex().on(table.runSheetId, table.number), index().on(table.embeddingId)],
)

/** Answers handed to the person who asked, each behind a link of its own. */
export const answerSheets = pgTable(
  'answer_sheets',
  {
    id: id(),
    workspaceId: workspaceId(),
    returnId: text()
      .notNull()
      .references(() => returns.id, { onDelete: 'cascade' }),
    decode: text().$type<Decoding>().notNull(),
    /** How many of the best assignments it shows. */
    solutions: integer().notNull(),
    /** What the developer says beside them. */
    remark: text().notNull(),
    /** SHA-256 of the secret in the link, hex: the link itself is shown once. */
    tokenHash: text().notNull(),
    createdBy: createdBy(),
    createdAt: createdAt(),
    revokedBy: text().references(() => users.id),
    revokedAt: moment(),
  },
  (table) => [uniqueIndex().on(table.tokenHash), index().on(table.returnId)],
)
