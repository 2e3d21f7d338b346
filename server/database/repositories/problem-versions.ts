import { and, desc, eq, isNull, sql } from 'drizzle-orm'
import type { Db } from '../client'
import { problems, problemVersions, users } from '../schema'
import type { NewVersion } from './problems'

/**
 * Makes the version after `seen` the current one; false when another came in between or the problem was deleted. Of two
 * at once the second waits for the first and then fails, so no number is given twice.
 */
export async function advanceVersion(tx: Db, problemId: string, seen: number, changedAt: Date): Promise<boolean> {
  const rows = await tx
    .update(problems)
    .set({ currentVersion: sql`${problems.currentVersion} + 1`, changedAt })
    .where(and(eq(problems.id, problemId), eq(problems.currentVersion, seen), isNull(problems.deletedWith)))
    .returning({ id: problems.id })
  return rows.length === 1
}

export async function insertVersion(tx: Db, problemId: string, version: number, row: NewVersion): Promise<void> {
  await tx.insert(problemVersions).values({ ...row, problemId, version })
}

/** Versions of a problem with who made each, newest first. */
export async function listVersions(db: Db, problemId: string, limit: number, offset: number) {
  return db
    .select({ row: problemVersions, by: { id: users.id, name: users.name } })
    .from(problemVersions)
    .innerJoin(users, eq(users.id, problemVersions.versionBy))
    .where(eq(problemVersions.problemId, problemId))
    .orderBy(desc(problemVersions.version))
    .limit(limit)
    .offset(offset)
}

/** When and by whom a version was made; undefined where there is none of that number. */
export async function findVersionMaker(db: Db, problemId: string, version: number) {
  return (
    await db
      .select({ at: problemVersions.versionAt, by: { id: users.id, name: users.name } })
      .from(problemVersions)
      .innerJoin(users, eq(users.id, problemVersions.versionBy))
      .where(and(eq(problemVersions.problemId, problemId), eq(problemVersions.version, version)))
  )[0]
}
