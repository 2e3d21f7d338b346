import { and, asc, eq, getTableColumns, getTableName, inArray, isNull, ne, or, sql } from 'drizzle-orm'
import type { SQL } from 'drizzle-orm'
import type { PgColumn, PgTable } from 'drizzle-orm/pg-core'
import { getTableConfig } from 'drizzle-orm/pg-core'
import type { Db } from '../client'
import {
  answerSheets,
  auditEntries,
  blobs,
  brokenEmbeddings,
  budgetEntries,
  calibrations,
  capacityMeasurements,
  counters,
  embeddings,
  jobs,
  machines,
  problems,
  problemVersions,
  reductions,
  referenceOptima,
  returns,
  runSheetRemarks,
  runSheets,
  scans,
  users,
  workspaces,
} from '../schema'

/** What a workspace consists of, each table after those that its rows refer to. */
export const WORK_TABLES = {
  machines,
  calibrations,
  capacityMeasurements,
  problems,
  problemVersions,
  reductions,
  referenceOptima,
  embeddings,
  brokenEmbeddings,
  runSheets,
  runSheetRemarks,
  returns,
  scans,
  answerSheets,
  counters,
  budgetEntries,
  auditEntries,
} as const satisfies Record<string, PgTable>

/**
 * What no archive holds, because it belongs to people and their browsers, is a secret, is on its way, or is of the
 * installation: tables that are in neither list fail a test.
 */
export const NOT_ARCHIVED = [
  'users',
  'memberships',
  'workspaces',
  'archived_people',
  'sessions',
  'invitations',
  'confirmations',
  'passkeys',
  'challenges',
  'identities',
  'unwanted_mails',
  'attempts',
  'tokens',
  'stand_ins',
  'answered_requests',
  'mails',
  'news',
  'jobs',
  'bridges',
  'bridge_calls',
  'installation',
  'blobs',
  'blob_chunks',
] as const

export type WorkTable = keyof typeof WORK_TABLES
export const WORK_TABLE_NAMES = Object.keys(WORK_TABLES) as WorkTable[]

/** A row by the names of its columns. */
export type WorkRow = Record<string, unknown>

/** What is worked out anew when it is first asked for, and so left out of an archive. */
export const DERIVED: Partial<Record<WorkTable, WorkRow>> = {
  returns: { breaksBlobId: null, summaryBlobId: null, measures: null },
}

/** That columns of a row name another row. */
export interface Reference {
  readonly columns: readonly string[]
  readonly to: WorkTable | 'users' | 'workspaces' | 'blobs'
  /** Columns of the row that is named, in the same order. */
  readonly keys: readonly string[]
  readonly isRequired: boolean
}

export const columnsOf = (name: WorkTable): Record<string, PgColumn> => getTableColumns(WORK_TABLES[name] as PgTable)

const NAMED = new Map<PgTable, Reference['to']>([
  [users, 'users'],
  [workspaces, 'workspaces'],
  [blobs, 'blobs'],
  ...WORK_TABLE_NAMES.map((name): [PgTable, WorkTable] => [WORK_TABLES[name], name]),
])

const keyOfColumn = (table: PgTable, column: PgColumn): string =>
  Object.entries(getTableColumns(table)).find(([, one]) => one.name === column.name)![0]

function readReferences(name: WorkTable): Reference[] {
  const table: PgTable = WORK_TABLES[name]
  return getTableConfig(table).foreignKeys.map((foreignKey) => {
    const { columns, foreignColumns, foreignTable } = foreignKey.reference()
    const to = NAMED.get(foreignTable)
    if (!to) throw new Error(`${name} refers to ${getTableName(foreignTable)}, which is no part of a workspace`)
    return {
      columns: columns.map((column) => keyOfColumn(table, column)),
      to,
      keys: foreignColumns.map((column) => keyOfColumn(foreignTable, column)),
      isRequired: columns.every(({ notNull }) => notNull),
    }
  })
}

const REFERENCES = new Map(WORK_TABLE_NAMES.map((name) => [name, readReferences(name)]))

/** What rows of a table refer to, as the schema says. */
export const referencesOf = (name: WorkTable): readonly Reference[] => REFERENCES.get(name)!

/** Which rows are meant: `whole` ones alone, neither deleted a moment ago nor at work, or all that there are. */
export type Extent = 'whole' | 'all'

function inSight(columns: Record<string, PgColumn>, extent: Extent): (SQL | undefined)[] {
  if (extent === 'all') return []
  const { deletedWith, status } = columns
  return [deletedWith && isNull(deletedWith), status && ne(status, 'running')]
}

const idsIn = (db: Db, name: 'problems' | 'runSheets', workspaceId: string, extent: Extent) =>
  db
    .select({ id: WORK_TABLES[name].id })
    .from(WORK_TABLES[name])
    .where(ofWorkspace(db, name, workspaceId, extent))

function ofWorkspace(db: Db, name: WorkTable, workspaceId: string, extent: Extent): SQL | undefined {
  const columns = columnsOf(name)
  if (name === 'counters')
    return or(
      eq(counters.scope, workspaceId),
      inArray(counters.scope, idsIn(db, 'problems', workspaceId, extent)),
      inArray(counters.scope, idsIn(db, 'runSheets', workspaceId, extent)),
    )
  if (columns.workspaceId) return and(eq(columns.workspaceId, workspaceId), ...inSight(columns, extent))
  const carrier = referencesOf(name).find((one) => one.isRequired && one.columns.length === 1 && one.to in WORK_TABLES)!
  const to = carrier.to as WorkTable
  const carriers = db
    .select({ id: columnsOf(to)[carrier.keys[0]!]! })
    .from(WORK_TABLES[to] as PgTable)
    .where(ofWorkspace(db, to, workspaceId, extent))
  return and(inArray(columns[carrier.columns[0]!]!, carriers), ...inSight(columns, extent))
}

function keyColumns(name: WorkTable): PgColumn[] {
  const { primaryKeys } = getTableConfig(WORK_TABLES[name] as PgTable)
  return primaryKeys[0]?.columns ?? Object.values(columnsOf(name)).filter(({ primary }) => primary)
}

const ROWS_AT_ONCE = 500

/** Rows of a workspace's table in the order of their keys, some at a time. */
export async function* workRows(
  db: Db,
  name: WorkTable,
  workspaceId: string,
  extent: Extent,
): AsyncGenerator<WorkRow[]> {
  const order = keyColumns(name).map((column) => asc(column))
  for (let offset = 0; ; offset += ROWS_AT_ONCE) {
    const rows = await db
      .select()
      .from(WORK_TABLES[name] as PgTable)
      .where(ofWorkspace(db, name, workspaceId, extent))
      .orderBy(...order)
      .limit(ROWS_AT_ONCE)
      .offset(offset)
    if (rows.length > 0) yield rows
    if (rows.length < ROWS_AT_ONCE) return
  }
}

const fieldsOf = (row: WorkRow, reference: Reference): unknown[] => reference.columns.map((column) => row[column])

/** Ids of the blobs that a row refers to. */
export function blobsOf(name: WorkTable, row: WorkRow): string[] {
  const named = referencesOf(name).filter(({ to }) => to === 'blobs')
  const rejected = (row.reading as { rejectedBlobId?: unknown } | undefined)?.rejectedBlobId
  return [...named.map((reference) => fieldsOf(row, reference)[0]), rejected].filter((id) => typeof id === 'string')
}

/** The row with other blobs in the places of its own. */
export function withBlobs(name: WorkTable, row: WorkRow, blobIds: ReadonlyMap<string, string>): WorkRow {
  const named = referencesOf(name).filter(({ to }) => to === 'blobs')
  const changed = named.map(({ columns }) => [columns[0]!, blobIds.get(row[columns[0]!] as string) ?? null] as const)
  const reading = row.reading as { rejectedBlobId?: string } | undefined
  const rejected = reading?.rejectedBlobId && { ...reading, rejectedBlobId: blobIds.get(reading.rejectedBlobId) }
  return { ...row, ...Object.fromEntries(changed), ...(rejected ? { reading: rejected } : {}) }
}

/** How many rows of each table an archive of the workspace holds. */
export async function countWork(db: Db, workspaceId: string) {
  const rows: Partial<Record<WorkTable, number>> = {}
  for (const name of WORK_TABLE_NAMES) {
    const where = ofWorkspace(db, name, workspaceId, 'whole')
    rows[name] = await db.$count(WORK_TABLES[name] as PgTable, where)
  }
  return rows as Record<WorkTable, number>
}

/** Bytes of the arrays that an archive of the workspace holds. */
export async function workBytes(db: Db, workspaceId: string): Promise<number> {
  let total = 0
  for (const name of WORK_TABLE_NAMES)
    for (const { columns, to } of referencesOf(name)) {
      const column = columns[0]!
      if (to !== 'blobs' || column in (DERIVED[name] ?? {})) continue
      const held = db
        .select({ id: columnsOf(name)[column]! })
        .from(WORK_TABLES[name] as PgTable)
        .where(ofWorkspace(db, name, workspaceId, 'whole'))
      const [row] = await db
        .select({ total: sql<string>`coalesce(sum(${blobs.bytes}), 0)` })
        .from(blobs)
        .where(inArray(blobs.id, held))
      total += Number(row!.total)
    }
  return total
}

/** Stores rows whose references are there already. */
export async function insertWorkRows(tx: Db, name: WorkTable, rows: readonly WorkRow[]): Promise<void> {
  for (let from = 0; from < rows.length; from += ROWS_AT_ONCE)
    await tx.insert(WORK_TABLES[name] as PgTable).values(rows.slice(from, from + ROWS_AT_ONCE))
}

/** Sets what could not be set before the row that is named was there. */
export async function setWorkField(tx: Db, name: WorkTable, id: string, column: string, value: unknown): Promise<void> {
  await tx
    .update(WORK_TABLES[name] as PgTable)
    .set({ [column]: value })
    .where(eq(columnsOf(name).id!, id))
}

/** Puts one person in the place of another in all that may be changed: entries of record keep who they named. */
export async function replacePerson(tx: Db, before: string, after: string): Promise<void> {
  for (const name of WORK_TABLE_NAMES) {
    if (name === 'budgetEntries' || name === 'auditEntries') continue
    for (const { columns, to } of referencesOf(name))
      if (to === 'users')
        await tx
          .update(WORK_TABLES[name] as PgTable)
          .set({ [columns[0]!]: after })
          .where(eq(columnsOf(name)[columns[0]!]!, before))
  }
  await tx
    .update(runSheetRemarks)
    .set({
      mentions: sql`array_replace(${runSheetRemarks.mentions}, ${before}, ${after})`,
      text: sql`replace(${runSheetRemarks.text}, ${`@[${before}]`}, ${`@[${after}]`})`,
    })
    .where(sql`${before} = any(${runSheetRemarks.mentions})`)
}

/** Whether a workspace, or a person, is in this database. */
export async function isHere(db: Db, table: 'workspaces' | 'users', id: string): Promise<boolean> {
  const named = table === 'users' ? users : workspaces
  return (await db.$count(named, eq(named.id, id))) > 0
}

/** Every array of a workspace, derived ones and those of things that were deleted a moment ago among them. */
export async function workBlobs(db: Db, workspaceId: string): Promise<string[]> {
  const ids = new Set<string>()
  for (const name of WORK_TABLE_NAMES) {
    if (!referencesOf(name).some(({ to }) => to === 'blobs')) continue
    for await (const rows of workRows(db, name, workspaceId, 'all'))
      for (const row of rows) for (const id of blobsOf(name, row)) ids.add(id)
  }
  const archives = await db
    .select({ id: jobs.subjectId })
    .from(jobs)
    .where(and(eq(jobs.workspaceId, workspaceId), eq(jobs.kind, 'import')))
  return [...ids, ...archives.map(({ id }) => id)]
}

/** Deletes every row of a workspace, and the workspace. */
export async function deleteWork(tx: Db, workspaceId: string): Promise<void> {
  // Embeddings refer to machines without cascade, so that a machine in use cannot vanish: problems go first.
  await tx.delete(counters).where(ofWorkspace(tx, 'counters', workspaceId, 'all'))
  await tx.delete(problems).where(eq(problems.workspaceId, workspaceId))
  await tx.delete(workspaces).where(eq(workspaces.id, workspaceId))
}
