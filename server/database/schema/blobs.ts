import { boolean, index, integer, pgTable, primaryKey, text } from 'drizzle-orm/pg-core'
import { bytea, createdAt, id } from './columns'

/**
 * Large arrays. A blob is written first and adopted in the transaction that refers to it; one that was never adopted
 * is swept away, so an interrupted save leaves nothing behind.
 */
export const blobs = pgTable(
  'blobs',
  { id: id(), bytes: integer().notNull(), adopted: boolean().notNull(), createdAt: createdAt() },
  (table) => [index().on(table.adopted, table.createdAt)],
)

export const blobChunks = pgTable(
  'blob_chunks',
  {
    blobId: text()
      .notNull()
      .references(() => blobs.id, { onDelete: 'cascade' }),
    part: integer().notNull(),
    data: bytea().notNull(),
  },
  (table) => [primaryKey({ columns: [table.blobId, table.part] })],
)
