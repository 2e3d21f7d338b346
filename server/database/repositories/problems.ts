import { and, desc, eq } from 'drizzle-orm'
import type { Db } from '../client'
import type { Deleted } from './jobs'
import { embeddings, problems, returns, runSheets, users } from '../schema'

export type ProblemRow = typeof problems.$inferSelect

export async function insertProblem(db: Db, row: typeof problems.$inferInsert): Promise<void> {
  await db.insert(problems).values(row)
}

export async function findProblem(db: Db, workspaceId: string, id: string): Promise<ProblemRow | undefined> {
  return (
    await db
      .select()
      .from(problems)
      .where(and(eq(problems.workspaceId, workspaceId), eq(problems.id, id)))
  )[0]
}

export async function listProblems(db: Db, workspaceId: string, limit: number, offset: number): Promise<ProblemRow[]> {
  return db
    .select()
    .from(problems)
    .where(eq(problems.workspaceId, workspaceId))
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

/** Deletes a problem with everything built on it. */
export async function deleteProblem(db: Db, row: ProblemRow): Promise<Deleted> {
  const chains = await db
    .select({ id: embeddings.id, blobId: embeddings.chainsBlobId })
    .from(embeddings)
    .where(eq(embeddings.problemId, row.id))
  const samples = await db
    .select({ id: returns.id, blobId: returns.samplesBlobId })
    .from(returns)
    .innerJoin(runSheets, eq(runSheets.id, returns.runSheetId))
    .innerJoin(embeddings, eq(embeddings.id, runSheets.embeddingId))
    .where(eq(embeddings.problemId, row.id))
  await db.delete(problems).where(eq(problems.id, row.id))
  const built = [...chains, ...samples]
  return {
    blobIds: [row.dataBlobId, ...built.flatMap(({ blobId }) => blobId ?? [])],
    subjectIds: built.map(({ id }) => id),
  }
}

/** A person's name as shown beside what they did. */
export async function personOf(db: Db, userId: string): Promise<{ id: string; name: string }> {
  const rows = await db.select({ id: users.id, name: users.name }).from(users).where(eq(users.id, userId))
  return rows[0] ?? { id: userId, name: 'a former member' }
}
