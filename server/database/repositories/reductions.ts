import { and, desc, eq, isNull } from 'drizzle-orm'
import type { Db } from '../client'
import { problems, problemVersions, reductions } from '../schema'

export type ReductionRow = typeof reductions.$inferSelect

export async function insertReduction(tx: Db, row: typeof reductions.$inferInsert): Promise<void> {
  await tx.insert(reductions).values(row)
}

/** How a problem came from another one; undefined when it did not. */
export async function findReduction(db: Db, problemId: string): Promise<ReductionRow | undefined> {
  return (await db.select().from(reductions).where(eq(reductions.problemId, problemId)))[0]
}

/** What a problem was reduced to, newest first, at the current versions. */
export async function listReduced(db: Db, sourceId: string) {
  return db
    .select({
      id: problems.id,
      number: problems.number,
      name: problems.name,
      variables: problemVersions.variables,
      interactions: problemVersions.interactions,
      fromVersion: reductions.sourceVersion,
    })
    .from(reductions)
    .innerJoin(problems, eq(problems.id, reductions.problemId))
    .innerJoin(
      problemVersions,
      and(eq(problemVersions.problemId, problems.id), eq(problemVersions.version, problems.currentVersion)),
    )
    .where(and(eq(reductions.sourceId, sourceId), isNull(problems.deletedWith)))
    .orderBy(desc(reductions.createdAt), desc(problems.number))
}
