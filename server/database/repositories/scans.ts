import { and, desc, eq, isNull } from 'drizzle-orm'
import type { Db } from '../client'
import { scans, users } from '../schema'
import type { Place } from './pages'

export type ScanRow = typeof scans.$inferSelect

export async function insertScan(db: Db, row: typeof scans.$inferInsert): Promise<void> {
  await db.insert(scans).values(row)
}

/** A scan by its id alone, deleted or not, for jobs. */
export async function findScanOfJob(db: Db, id: string): Promise<ScanRow | undefined> {
  return (await db.select().from(scans).where(eq(scans.id, id)))[0]
}

/** A scan of the workspace with who made it. */
export async function findScan(db: Db, workspaceId: string, id: string) {
  const standing = and(eq(scans.workspaceId, workspaceId), eq(scans.id, id), isNull(scans.deletedWith))
  return (await scansWith(db).where(standing))[0]
}

/** The scans of a run sheet, newest first. */
export async function scansOfRunSheet(db: Db, runSheetId: string, { limit, offset }: Place) {
  return scansWith(db)
    .where(and(eq(scans.runSheetId, runSheetId), isNull(scans.deletedWith)))
    .orderBy(desc(scans.number))
    .limit(limit)
    .offset(offset)
}

const scansWith = (db: Db) =>
  db
    .select({ scan: scans, by: { id: users.id, name: users.name } })
    .from(scans)
    .innerJoin(users, eq(users.id, scans.createdBy))

/** False when the scan was deleted meanwhile. */
export async function updateScan(db: Db, id: string, set: Partial<typeof scans.$inferInsert>): Promise<boolean> {
  const rows = await db.update(scans).set(set).where(eq(scans.id, id)).returning({ id: scans.id })
  return rows.length === 1
}
