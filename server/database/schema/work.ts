import { sql } from 'drizzle-orm'
import type { AnyPgColumn } from 'drizzle-orm/pg-core'
import {
  boolean,
  doublePrecision,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  uniqueIndex,
} from 'drizzle-orm/pg-core'
import type {
  EmbeddingMethod,
  EmbeddingStats,
  EmbeddingStatus,
  MethodUsed,
  Objective,
  TargetView,
  UnmetView,
} from '../../../shared/schemas/embeddings'
import type { JobKind, JobStatus, JobView } from '../../../shared/schemas/jobs'
import type { CalibrationSaved, MachineSheet } from '../../../shared/schemas/machines'
import type { ProblemSource } from '../../../shared/schemas/problem-versions'
import type { ConstraintGroup, ReadingView, StructureView } from '../../../shared/schemas/problems'
import type { RunSheetSettings, RunSheetState } from '../../../shared/schemas/run-sheets'
import type { Family } from '../../../shared/engine/machine/fabric'
import { blobs } from './blobs'
import { createdAt, id, moment } from './columns'
import { users, workspaces } from './people'

const workspaceId = () =>
  text()
    .notNull()
    .references(() => workspaces.id, { onDelete: 'cascade' })
const createdBy = () =>
  text()
    .notNull()
    .references(() => users.id)
/** Set while a deletion can still be undone: when, and the id of what was deleted: the row itself or what it stands on. */
const deletion = () => ({ deletedAt: moment(), deletedWith: text() })

/** Running numbers: problems and run sheets per workspace, embeddings per problem, returns per run sheet. */
export const counters = pgTable(
  'counters',
  { scope: text().notNull(), kind: text().notNull(), value: integer().notNull() },
  (table) => [primaryKey({ columns: [table.scope, table.kind] })],
)

/** What is one and the same through all versions of a problem. */
export const problems = pgTable(
  'problems',
  {
    id: id(),
    workspaceId: workspaceId(),
    number: integer().notNull(),
    name: text().notNull(),
    note: text().notNull().default(''),
    tags: jsonb().$type<string[]>().notNull().default([]),
    currentVersion: integer().notNull().default(1),
    createdBy: createdBy(),
    createdAt: createdAt(),
    changedAt: moment().notNull(),
    ...deletion(),
  },
  (table) => [
    uniqueIndex().on(table.workspaceId, table.number),
    index().on(table.workspaceId, table.changedAt),
    index().on(table.workspaceId, table.name),
  ],
)

/** Never edited, except for the groups: every upload to a problem and every change of its labels is a new row. */
export const problemVersions = pgTable(
  'problem_versions',
  {
    problemId: text()
      .notNull()
      .references(() => problems.id, { onDelete: 'cascade' }),
    version: integer().notNull(),
    /** What this version is for, in the words of who made it. */
    remark: text().notNull().default(''),
    form: text().$type<'qubo' | 'ising'>().notNull(),
    /** The sense of the file; coefficients are stored for minimisation. */
    sense: text().$type<'min' | 'max'>().notNull(),
    variables: integer().notNull(),
    interactions: integer().notNull(),
    /** Packed arrays: labels, linear, rows, cols, values, offset; in `form`, to be minimised. */
    dataBlobId: text()
      .notNull()
      .references(() => blobs.id),
    fingerprint: text().notNull(),
    source: jsonb().$type<ProblemSource>().notNull(),
    reading: jsonb().$type<ReadingView>().notNull(),
    structure: jsonb().$type<StructureView>().notNull(),
    /** Constraint groups as confirmed or entered; null while nobody has looked at them. */
    groups: jsonb().$type<ConstraintGroup[]>(),
    versionBy: createdBy(),
    versionAt: createdAt(),
  },
  (table) => [primaryKey({ columns: [table.problemId, table.version] })],
)

/** That a problem is what is left of another one after pre-solve, and how its answers are lifted back. */
export const reductions = pgTable(
  'reductions',
  {
    /** The reduced problem. */
    problemId: text()
      .primaryKey()
      .references(() => problems.id, { onDelete: 'cascade' }),
    /** Null once the source was deleted for good; the record below lifts answers all the same. */
    sourceId: text().references((): AnyPgColumn => problems.id, { onDelete: 'set null' }),
    sourceVersion: integer().notNull(),
    /** Packed record of the reductions, with the source's labels. */
    blobId: text()
      .notNull()
      .references(() => blobs.id),
    summary: jsonb().$type<Record<string, unknown>>().notNull(),
    seconds: doublePrecision().notNull(),
    version: text().notNull(),
    createdAt: createdAt(),
  },
  (table) => [index().on(table.sourceId)],
)

/** Looks for the best possible value of a problem; the newest that found one counts. */
export const referenceOptima = pgTable(
  'reference_optima',
  {
    id: id(),
    workspaceId: workspaceId(),
    problemId: text()
      .notNull()
      .references(() => problems.id, { onDelete: 'cascade' }),
    problemVersion: integer().notNull(),
    status: text().$type<'running' | 'found' | 'cancelled' | 'failed'>().notNull(),
    /** Of the problem as stored, to be minimised; null while there is none. */
    energy: doublePrecision(),
    /** A proved lower bound in the same sense. */
    bound: doublePrecision(),
    proved: boolean().notNull().default(false),
    /** Packed state, one byte a variable. */
    stateBlobId: text().references(() => blobs.id),
    method: text(),
    /** What was done for each component, and other figures. */
    detail: jsonb().$type<Record<string, unknown>>().notNull().default({}),
    settings: jsonb().$type<Record<string, number | string | null>>().notNull(),
    reason: text(),
    seconds: doublePrecision(),
    version: text().notNull(),
    createdBy: createdBy(),
    createdAt: createdAt(),
  },
  (table) => [index().on(table.problemId, table.problemVersion)],
)

export const machines = pgTable(
  'machines',
  {
    id: id(),
    workspaceId: workspaceId(),
    name: text().notNull(),
    note: text().notNull().default(''),
    family: jsonb().$type<Family>().notNull(),
    calibration: integer().notNull(),
    createdBy: createdBy(),
    createdAt: createdAt(),
    changedAt: moment().notNull(),
  },
  (table) => [uniqueIndex().on(table.workspaceId, table.name)],
)

/** Never edited: every saved change of a machine's sheet is a new row. */
export const calibrations = pgTable(
  'calibrations',
  {
    machineId: text()
      .notNull()
      .references(() => machines.id, { onDelete: 'cascade' }),
    number: integer().notNull(),
    sheet: jsonb().$type<MachineSheet>().notNull(),
    qubits: integer().notNull(),
    couplers: integer().notNull(),
    /** Embeddings that stood before and no longer hold at this calibration. */
    broke: jsonb().$type<CalibrationSaved['invalidated']['embeddings']>().notNull(),
    createdBy: createdBy(),
    createdAt: createdAt(),
  },
  (table) => [primaryKey({ columns: [table.machineId, table.number] })],
)

export const embeddings = pgTable(
  'embeddings',
  {
    id: id(),
    workspaceId: workspaceId(),
    problemId: text()
      .notNull()
      .references(() => problems.id, { onDelete: 'cascade' }),
    problemVersion: integer().notNull().default(1),
    machineId: text()
      .notNull()
      .references(() => machines.id),
    calibration: integer().notNull(),
    number: integer().notNull(),
    status: text().$type<EmbeddingStatus>().notNull(),
    /** As asked for: what is done to the start where there is one. */
    method: text().$type<EmbeddingMethod>().notNull(),
    seed: doublePrecision().notNull(),
    tries: integer().notNull(),
    timeLimitSeconds: doublePrecision().notNull(),
    objective: text().$type<Objective>().notNull().default('longest chain'),
    target: jsonb().$type<TargetView>().notNull().default({ longestChain: null, totalQubits: null }),
    /** The embedding to begin from. */
    startId: text().references((): AnyPgColumn => embeddings.id, { onDelete: 'set null' }),
    /** Labels of the variables whose chains had to stay as they are in the start. */
    frozen: jsonb().$type<string[]>().notNull().default([]),
    /** Chains that differ from the start's. */
    changedChains: integer(),
    /** Method and number of the try that gave the embedding. */
    methodUsed: text().$type<MethodUsed>(),
    tryNumber: integer(),
    /** Packed arrays: offsets and dense qubit indices. */
    chainsBlobId: text().references(() => blobs.id),
    stats: jsonb().$type<Omit<EmbeddingStats, 'unusedShare'>>(),
    unmet: jsonb().$type<Omit<UnmetView, 'partialChains'>>(),
    reason: text(),
    fingerprint: text(),
    seconds: doublePrecision(),
    firstSeconds: doublePrecision(),
    /** The one to go on with; at most one of a problem on a machine. */
    chosen: boolean().notNull().default(false),
    version: text().notNull(),
    createdBy: createdBy(),
    createdAt: createdAt(),
    ...deletion(),
  },
  (table) => [
    uniqueIndex().on(table.problemId, table.number),
    uniqueIndex()
      .on(table.problemId, table.machineId)
      .where(sql`chosen`),
    index().on(table.workspaceId),
    index().on(table.machineId),
    index().on(table.startId),
  ],
)

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
    what: text().notNull(),
    text: text().notNull(),
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
    number: integer().notNull(),
    source: text().$type<'rehearsal' | 'upload'>().notNull(),
    status: text().$type<'running' | 'ready' | 'failed' | 'cancelled'>().notNull(),
    /** What made the samples: settings of a rehearsal or the uploaded file. */
    made: jsonb().$type<Record<string, string | number | boolean | null>>().notNull(),
    /** The run sheet's settings when the samples were made: a draft may change afterwards. */
    settings: jsonb().$type<RunSheetSettings>().notNull(),
    samplesBlobId: text().references(() => blobs.id),
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
  (table) => [uniqueIndex().on(table.runSheetId, table.number)],
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
