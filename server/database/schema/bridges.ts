import { boolean, index, integer, jsonb, pgTable, text, uniqueIndex } from 'drizzle-orm/pg-core'
import type { BridgeCallState, BridgeKind, BridgeTest, BridgeTry } from '../../../shared/schemas/bridges'
import type { BridgeKey } from '../../bridge/signature'
import { createdAt, id, moment } from './columns'
import { machines } from './machines'
import { createdBy, workspaceId } from './references'
import { returns, runSheets } from './run-sheets'

/** What runs the sheets of a machine when they are sent to it. */
export const bridges = pgTable(
  'bridges',
  {
    id: id(),
    workspaceId: workspaceId(),
    machineId: text()
      .notNull()
      .references(() => machines.id, { onDelete: 'cascade' }),
    kind: text().$type<BridgeKind>().notNull(),
    /** Null for the built-in one. */
    url: text(),
    isOn: boolean().notNull(),
    /** Secrets, newest first. They sign, so that a hash would not do. */
    keys: jsonb().$type<BridgeKey[]>().notNull(),
    lastTest: jsonb().$type<BridgeTest>(),
    createdBy: createdBy(),
    createdAt: createdAt(),
    changedAt: moment().notNull(),
  },
  (table) => [uniqueIndex().on(table.machineId)],
)

/** A run sheet that was issued by a bridge: its way there, and what came back. */
export const bridgeCalls = pgTable(
  'bridge_calls',
  {
    id: id(),
    workspaceId: workspaceId(),
    runSheetId: text()
      .notNull()
      .references(() => runSheets.id, { onDelete: 'cascade' }),
    /** Of the bridge that it was last sent to. */
    kind: text().$type<BridgeKind>().notNull(),
    state: text().$type<BridgeCallState>().notNull(),
    /** Counted on and on; whoever has the latest number is at work on it. */
    attempts: integer().notNull().default(0),
    /** How many of them were made before it was last sent anew. */
    earlierAttempts: integer().notNull().default(0),
    /** When it is tried next; while it is tried, when that try is taken for lost. */
    nextAttemptAt: moment(),
    /** The latest, oldest first. */
    tries: jsonb().$type<BridgeTry[]>().notNull().default([]),
    /** SHA-256 of the tokens that samples may come back with, hex: each try has its own, and one of them is used once. */
    tokenHashes: jsonb().$type<string[]>().notNull().default([]),
    tokenExpiresAt: moment(),
    /** SHA-256 of what came back, hex, so that the same sent again gets the same answer. */
    returnedDigest: text(),
    returnId: text().references(() => returns.id, { onDelete: 'set null' }),
    refusal: text(),
    createdBy: createdBy(),
    createdAt: createdAt(),
  },
  (table) => [uniqueIndex().on(table.runSheetId), index().on(table.state, table.nextAttemptAt)],
)
