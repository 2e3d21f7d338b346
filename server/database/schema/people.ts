import { pgTable, primaryKey, text, uniqueIndex } from 'drizzle-orm/pg-core'
import type { Role } from '../../../shared/schemas/common'
import { createdAt, id } from './columns'

export const users = pgTable(
  'users',
  {
    id: id(),
    /** Lower case. */
    email: text().notNull(),
    name: text().notNull(),
    passwordHash: text().notNull(),
    createdAt: createdAt(),
  },
  (table) => [uniqueIndex().on(table.email)],
)

export const workspaces = pgTable('workspaces', { id: id(), name: text().notNull(), createdAt: createdAt() })

export const memberships = pgTable(
  'memberships',
  {
    workspaceId: text()
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    userId: text()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    roles: text().array().$type<Role[]>().notNull(),
    createdAt: createdAt(),
  },
  (table) => [primaryKey({ columns: [table.workspaceId, table.userId] })],
)

/** Facts about this installation, such as the one-time code that opens the first account. */
export const installation = pgTable('installation', { key: text().primaryKey(), value: text().notNull() })
