import { sql } from 'drizzle-orm'
import { index, pgTable, text } from 'drizzle-orm/pg-core'
import type { NewsKind } from '../../../shared/schemas/news'
import { createdAt, id, moment } from './columns'
import { users } from './people'
import { workspaceId } from './references'

/** What members are told in the product, written with the messages that tell the same; in words that outlive what they are about. */
export const news = pgTable(
  'news',
  {
    id: id(),
    workspaceId: workspaceId(),
    userId: text()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    kind: text().$type<NewsKind>().notNull(),
    title: text().notNull(),
    text: text().notNull(),
    /** Words of a person. */
    quote: text(),
    /** Of the page that it is about. */
    path: text().notNull(),
    createdAt: createdAt(),
    readAt: moment(),
  },
  (table) => [
    index().on(table.userId, table.workspaceId, table.createdAt),
    index()
      .on(table.userId, table.workspaceId)
      .where(sql`read_at is null`),
    index().on(table.createdAt),
  ],
)
