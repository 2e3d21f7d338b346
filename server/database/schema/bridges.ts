import { boolean, jsonb, pgTable, text, uniqueIndex } from 'drizzle-orm/pg-core'
import type { BridgeKind, BridgeTest } from '../../../shared/schemas/bridges'
import type { BridgeKey } from '../../bridge/signature'
import { createdAt, id, moment } from './columns'
import { machines } from './machines'
import { createdBy, workspaceId } from './references'

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
