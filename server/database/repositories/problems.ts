import { and, eq, getTableColumns, isNull } from 'drizzle-orm'
import type { Db } from '../client'
import { problems, problemVersions, users } from '../schema'

const { problemId: _problemId, ...versionColumns } = getTableColumns(problemVersions)
const columns = { ...getTableColumns(problems), ...versionColumns }

/** A problem with the data of one of its versions. */
export type ProblemRow = typeof problems.$inferSelect & Omit<typeof problemVersions.$inferSelect, 'problemId'>
export type NewProblem = Omit<typeof problems.$inferInsert, 'currentVersion'>
export type NewVersion = Omit<typeof problemVersions.$inferInsert, 'problemId' | 'version'>

/** A problem with its first version. */
export async function insertProblem(tx: Db, problem: NewProblem, version: NewVersion): Promise<void> {
  await tx.insert(problems).values(problem)
  await tx.insert(problemVersions).values({ ...version, problemId: problem.id, version: 1 })
}

const rowsAt = (db: Db, version?: number) =>
  db
    .select(columns)
    .from(problems)
    .innerJoin(
      problemVersions,
      and(eq(problemVersions.problemId, problems.id), eq(problemVersions.version, version ?? problems.currentVersion)),
    )

/** A problem of the workspace at a version; without one, at the current. */
export async function findProblem(
  db: Db,
  workspaceId: string,
  id: string,
  version?: number,
): Promise<ProblemRow | undefined> {
  const rows = await rowsAt(db, version).where(
    and(eq(problems.workspaceId, workspaceId), eq(problems.id, id), isNull(problems.deletedWith)),
  )
  return rows[0]
}

/** The problem that a row refers to, deleted or not: jobs work on while a deletion can be undone. */
export async function findReferredProblem(db: Db, id: string, version: number): Promise<ProblemRow | undefined> {
  return (await rowsAt(db, version).where(eq(problems.id, id)))[0]
}

/** Problems at their current versions, to be narrowed further. */
export const problemsAtCurrentVersion = (db: Db) => rowsAt(db)

/** Tags of a problem, held until the transaction ends; undefined when it is not there. */
export async function holdTags(tx: Db, id: string): Promise<string[] | undefined> {
  const rows = await tx
    .select({ tags: problems.tags })
    .from(problems)
    .where(and(eq(problems.id, id), isNull(problems.deletedWith)))
    .for('update')
  return rows[0]?.tags
}

export async function setTags(tx: Db, id: string, tags: string[]): Promise<void> {
  await tx.update(problems).set({ tags }).where(eq(problems.id, id))
}

export async function updateProblem(
  db: Db,
  id: string,
  set: { name?: string; note?: string; changedAt: Date },
): Promise<void> {
  await db.update(problems).set(set).where(eq(problems.id, id))
}

/** A person's name as shown beside what they did. */
export async function personOf(db: Db, userId: string): Promise<{ id: string; name: string }> {
  const rows = await db.select({ id: users.id, name: users.name }).from(users).where(eq(users.id, userId))
  return rows[0] ?? { id: userId, name: 'a former member' }
}
