import { sql } from 'drizzle-orm'
import type { AnyPgColumn } from 'drizzle-orm/pg-core'
import {
  boolean,
  doublePrecision,
  foreignKey,
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
import type { CapacityResult, CapacitySettings, EmbeddingDamage, MachineSheet } from '../../../shared/schemas/machines'
import type { Family } from '../../../shared/engine/machine/fabric'
import { blobs } from './blobs'
import { createdAt, id, moment } from './columns'
import { problems } from './problems'
import { createdBy, deletion, workspaceId } from './references'

export const machines = pgTable(
  'machines',
  {
    id: id(),
    workspaceId: workspaceId(),
    name: text().notNull(),
    note: text().notNull().default(''),
    family: jsonb().$type<Family>().notNull(),
    /** Packed graph of a machine that is of no family: qubit numbers, couplers, positions. */
    graphBlobId: text().references(() => blobs.id),
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
    createdBy: createdBy(),
    createdAt: createdAt(),
  },
  (table) => [primaryKey({ columns: [table.machineId, table.number] })],
)

/** That an embedding which held before does not hold from a calibration on. */
export const brokenEmbeddings = pgTable(
  'broken_embeddings',
  {
    machineId: text().notNull(),
    calibration: integer().notNull(),
    embeddingId: text()
      .notNull()
      .references((): AnyPgColumn => embeddings.id, { onDelete: 'cascade' }),
    /** Chains that are damaged, of how many; and the parts that they lost. */
    damage: jsonb().$type<EmbeddingDamage>().notNull(),
    /** The later calibration at which it holds again, as it is. */
    holdsAgain: integer(),
  },
  (table) => [
    primaryKey({ columns: [table.machineId, table.calibration, table.embeddingId] }),
    foreignKey({
      name: 'broken_embeddings_calibration_fk',
      columns: [table.machineId, table.calibration],
      foreignColumns: [calibrations.machineId, calibrations.number],
    }).onDelete('cascade'),
    index().on(table.embeddingId),
  ],
)

/** What a machine holds at a calibration, measured with the engine; the newest that ended counts. */
export const capacityMeasurements = pgTable(
  'capacity_measurements',
  {
    id: id(),
    workspaceId: workspaceId(),
    machineId: text().notNull(),
    calibration: integer().notNull(),
    status: text().$type<'running' | 'measured' | 'cancelled' | 'failed'>().notNull(),
    settings: jsonb().$type<CapacitySettings>().notNull(),
    /** The largest complete graph, and the longest chains by variables and density; as far as it came. */
    result: jsonb().$type<CapacityResult>(),
    reason: text(),
    seconds: doublePrecision(),
    version: text().notNull(),
    createdBy: createdBy(),
    createdAt: createdAt(),
  },
  (table) => [
    foreignKey({
      name: 'capacity_measurements_calibration_fk',
      columns: [table.machineId, table.calibration],
      foreignColumns: [calibrations.machineId, calibrations.number],
    }).onDelete('cascade'),
    index().on(table.machineId, table.calibration),
  ],
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
    /** Once found, it takes the start's place: open run sheets move over to it. */
    replaces: boolean().notNull().default(false),
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
