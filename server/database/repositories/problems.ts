import { and, desc, eq, isNull } from 'drizzle-orm'
import type { Db } from '../client'
import { problems, users } from '../schema'

export type ProblemRow = typeof problems.$inferSelect

export async function insertProblem(db: Db, row: typeof problems.$inferInsert): Promise<void> {
  await db.insert(problems).values(row)
}

export async function findProblem(db: Db, workspaceId: string, id: string): Promise<ProblemRow | undefined> {
  return (
    await db
      .select()
      .from(problems)
      .where(and(eq(problems.workspaceId, workspaceId), eq(problems.id, id), isNull(problems.deletedWith)))
  )[0]
}

/** The problem that a row refers to, deleted or not: jobs work on while a deletion can be undone. */
export async function findReferredProblem(db: Db, id: string): Promise<ProblemRow | undefined> {
  return (await db.select().from(problems).where(eq(problems.id, id)))[0]
}

export async function listProblems(db: Db, workspaceId: string, limit: number, offset: number): Promise<ProblemRow[]> {
  return db
    .select()
    .from(problems)
    .where(and(eq(problems.workspaceId, workspaceId), isNull(problems.deletedWith)))
    .orderBy(desc(problems.changedAt), desc(problems.number))
    .limit(limit)
    .offset(offset)
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
