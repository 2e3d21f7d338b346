import { index, pgTable, text } from 'drizzle-orm/pg-core'
import type { AuditKind } from '../../../shared/audit'
import { id, moment } from './columns'
import { users } from './people'
import { workspaceId } from './references'

/** Who did what to which thing, when and from where. A trigger refuses changes, as of the budget's entries. */
export const auditEntries = pgTable(
  'audit_entries',
  {
    id: id(),
    workspaceId: workspaceId(),
    at: moment().notNull(),
    by: text()
      .notNull()
      .references(() => users.id),
    /** Name of the token that was used. */
    token: text(),
    address: text().notNull(),
    what: text().notNull(),
    kind: text().$type<AuditKind>().notNull(),
    thingId: text(),
    /** What the thing was called then. */
    thing: text().notNull(),
    /** What the thing stood on then: problem, embedding, run sheet. It is known of what was deleted since too. */
    within: text().array().notNull().default([]),
  },
  (table) => [
    index().on(table.workspaceId, table.at),
    index().on(table.thingId),
    index('audit_entries_within_index').using('gin', table.within),
  ],
)
