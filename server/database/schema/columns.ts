import { customType, text, timestamp } from 'drizzle-orm/pg-core'

/** Raw bytes; PGlite answers Uint8Array, node-postgres a Buffer (which is one too). */
export const bytea = customType<{ data: Uint8Array; driverData: Uint8Array }>({ dataType: () => 'bytea' })

export const id = () => text().primaryKey()
export const moment = () => timestamp({ withTimezone: true, mode: 'date' })
export const createdAt = () => moment().notNull()
