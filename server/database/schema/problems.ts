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
import type { ProblemSource } from '../../../shared/schemas/problem-versions'
import type { ConstraintGroup, ReadingView, StructureView } from '../../../shared/schemas/problems'
import { blobs } from './blobs'
import { createdAt, id, moment } from './columns'
import { createdBy, deletion, workspaceId } from './references'

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
