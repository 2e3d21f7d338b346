import { createHash } from 'node:crypto'
import { mkdirSync, realpathSync } from 'node:fs'
import type { Server } from 'node:net'
import { createServer } from 'node:net'
import { join } from 'node:path'
import type { PGlite } from '@electric-sql/pglite'
import type { ExtractTablesWithRelations } from 'drizzle-orm'
import type { PgDatabase, PgQueryResultHKT } from 'drizzle-orm/pg-core'
import { sql } from 'drizzle-orm'
import type { Pool } from 'pg'
import { MIGRATIONS } from './migrations'
import * as schema from './schema'

export type Schema = typeof schema
/** A database handle or a transaction: repositories accept either. Inside a transaction use only the transaction. */
export type Db = PgDatabase<PgQueryResultHKT, Schema, ExtractTablesWithRelations<Schema>>

export interface Database {
  readonly db: Db
  /** The embedded engine, where it is used; large values go round the SQL parser there. */
  readonly pglite: PGlite | null
  /** Runs plain SQL for the queue; without values several statements may stand in one text. */
  executeSql(text: string, values?: unknown[]): Promise<{ rows: Record<string, unknown>[]; rowCount: number }>
  /** Runs `work` while no other process of this database runs work under the same lock. */
  exclusively<T>(work: () => Promise<T>): Promise<T>
  close(): Promise<void>
}

/** Any constant: all processes of one database take the same lock around migrations and queue creation. */
const START_LOCK = 4_711_020

interface Migratable {
  dialect: { migrate(migrations: readonly unknown[], session: unknown, config: string): Promise<void> }
  session: unknown
}

/** Applies the migrations that the database does not have yet. */
export async function migrate(database: Database, migrations = MIGRATIONS): Promise<void> {
  const handle = database.db as unknown as Migratable
  await database.exclusively(() => handle.dialect.migrate(migrations, handle.session, 'migrations'))
}

/** Opens the PostgreSQL server at `databaseUrl`, or the embedded database in `dataFolder`. */
export async function openDatabase(options: { databaseUrl?: string; dataFolder: string }): Promise<Database> {
  return options.databaseUrl ? openServer(options.databaseUrl) : openEmbedded(join(options.dataFolder, 'database'))
}

async function openServer(url: string): Promise<Database> {
  const { Pool } = (await import('pg')).default
  const { drizzle } = await import('drizzle-orm/node-postgres')
  const pool: Pool = new Pool({ connectionString: url, max: 10 })
  // An idle connection that the server drops must not end the process; the next query opens another.
  pool.on('error', (error) => console.error(`database connection lost: ${error.message}`))
  await pool.query('select 1')
  const db = drizzle(pool, { schema, casing: 'snake_case' }) as unknown as Db
  return {
    db,
    pglite: null,
    executeSql: async (text, values) => {
      const result = await pool.query(text, values)
      return { rows: result.rows ?? [], rowCount: result.rowCount ?? 0 }
    },
    exclusively: async (work) => {
      const client = await pool.connect()
      try {
        await client.query('select pg_advisory_lock($1)', [START_LOCK])
        return await work()
      } finally {
        await client.query('select pg_advisory_unlock($1)', [START_LOCK])
        client.release()
      }
    },
    close: () => pool.end(),
  }
}

const LOCK_TRIES = 20
const LOCK_WAIT_MS = 250

function listen(name: string): Promise<Server> {
  const server = createServer()
  return new Promise((resolve, reject) => {
    server.once('error', reject)
    server.listen(name, () => resolve(server.unref()))
  })
}

/**
 * Two processes on one folder would corrupt it silently, so the folder's hash is held as an abstract socket name: the
 * kernel frees it even when the process is killed. A predecessor that is just stopping is waited for.
 */
async function lockFolder(folder: string): Promise<Server> {
  const hash = createHash('sha256').update(realpathSync(folder)).digest('hex').slice(0, 32)
  const name = process.platform === 'linux' ? `\0espalier-${hash}` : join('/tmp', `espalier-${hash}.sock`)
  for (let tries = LOCK_TRIES; ; tries--) {
    try {
      return await listen(name)
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== 'EADDRINUSE') throw error
      if (tries === 0)
        throw new Error(
          `${folder} is in use by another process. Stop that one first, choose another DATA_DIR, or use a PostgreSQL server through DATABASE_URL.`,
        )
      await new Promise((resolve) => setTimeout(resolve, LOCK_WAIT_MS))
    }
  }
}

async function openEmbedded(folder: string): Promise<Database> {
  mkdirSync(folder, { recursive: true })
  const lock = await lockFolder(folder)
  const { PGlite } = await import('@electric-sql/pglite')
  const { drizzle } = await import('drizzle-orm/pglite')
  const pglite = await PGlite.create(folder)
  const db = drizzle(pglite, { schema, casing: 'snake_case' }) as unknown as Db
  return {
    db,
    pglite,
    executeSql: async (text, values) => {
      if (!values?.length) {
        const results = await pglite.exec(text)
        const last = results.at(-1)
        return { rows: (last?.rows ?? []) as Record<string, unknown>[], rowCount: last?.affectedRows ?? 0 }
      }
      const result = await pglite.query<Record<string, unknown>>(text, values)
      return { rows: result.rows, rowCount: result.affectedRows ?? result.rows.length }
    },
    exclusively: (work) => work(),
    close: async () => {
      await pglite.close()
      await new Promise((resolve) => lock.close(resolve))
    },
  }
}

/** True when the database answers. */
export async function isAlive(db: Db): Promise<boolean> {
  return db.execute(sql`select 1`).then(
    () => true,
    () => false,
  )
}
