import { index, integer, pgTable, text } from 'drizzle-orm/pg-core'
import type { MailKind, MailState } from '../../../shared/schemas/mail'
import { createdAt, id, moment } from './columns'
import { users, workspaces } from './people'

/** Every message to a person, written in the transaction of what it tells, so that none is lost and none sent for nothing. */
export const mails = pgTable(
  'mails',
  {
    id: id(),
    /** Null for what belongs to a person only, such as a link for a new password: no outbox shows it. */
    workspaceId: text().references(() => workspaces.id, { onDelete: 'cascade' }),
    /** Null once the person's account is gone. */
    toUserId: text().references(() => users.id, { onDelete: 'set null' }),
    toAddress: text().notNull(),
    kind: text().$type<MailKind>().notNull(),
    subject: text().notNull(),
    text: text().notNull(),
    html: text().notNull(),
    state: text().$type<MailState>().notNull(),
    attempts: integer().notNull().default(0),
    /** When it is tried next; null when it is not. */
    nextAttemptAt: moment(),
    /** What the mail server or service said at the last attempt that failed. */
    reason: text(),
    createdAt: createdAt(),
    sentAt: moment(),
  },
  (table) => [index().on(table.workspaceId, table.createdAt), index().on(table.state, table.nextAttemptAt)],
)
