import { text } from 'drizzle-orm/pg-core'
import { moment } from './columns'
import { users, workspaces } from './people'

export const workspaceId = () =>
  text()
    .notNull()
    .references(() => workspaces.id, { onDelete: 'cascade' })
export const createdBy = () =>
  text()
    .notNull()
    .references(() => users.id)
/** Set while a deletion can still be undone: when, and the id of what was deleted: the row itself or what it stands on. */
export const deletion = () => ({ deletedAt: moment(), deletedWith: text() })
