import { and, desc, eq, isNotNull, isNull } from 'drizzle-orm'
import type { Db } from '../client'
import { problems, referenceOptima } from '../schema'
import type { Place } from './pages'

export type ReferenceRow = typeof referenceOptima.$inferSelect

export async function insertReference(db: Db, row: typeof referenceOptima.$inferInsert): Promise<void> {
  await db.insert(referenceOptima).values(row)
}

/** A look for an optimum by its id alone, for jobs, which are not asked for by anyone. */
export async function findReferenceOfJob(db: Db, id: string): Promise<ReferenceRow | undefined> {
  return (await db.select().from(referenceOptima).where(eq(referenceOptima.id, id)))[0]
}

/** False when it was deleted with its problem meanwhile. */
export async function updateReference(
  db: Db,
  id: string,
  set: Partial<typeof referenceOptima.$inferInsert>,
): Promise<boolean> {
  const rows = await db
    .update(referenceOptima)
    .set(set)
    .where(eq(referenceOptima.id, id))
    .returning({ id: referenceOptima.id })
  return rows.length === 1
}

/** Looks for the optimum of one version of a problem, newest first. */
export async function listReferences(db: Db, problemId: string, version: number, { limit, offset }: Place) {
  return db
    .select()
    .from(referenceOptima)
    .where(and(eq(referenceOptima.problemId, problemId), eq(referenceOptima.problemVersion, version)))
    .orderBy(desc(referenceOptima.createdAt), desc(referenceOptima.id))
    .limit(limit)
    .offset(offset)
}

/**
 * The best that is known of one version: a proved value before any other, then the lowest energy, then the newest.
 * Energies are of the problem as stored, to be minimised.
 */
export async function bestReference(db: Db, problemId: string, version: number): Promise<ReferenceRow | undefined> {
  return (
    await db
      .select()
      .from(referenceOptima)
      .where(
        and(
          eq(referenceOptima.problemId, problemId),
          eq(referenceOptima.problemVersion, version),
          eq(referenceOptima.status, 'found'),
          isNotNull(referenceOptima.energy),
        ),
      )
      .orderBy(desc(referenceOptima.proved), referenceOptima.energy, desc(referenceOptima.createdAt))
      .limit(1)
  )[0]
}

/** Whether a look at this version is under way already; holds the problem, so that of two starts one sees the other. */
export async function referenceUnderWay(tx: Db, problemId: string, version: number): Promise<boolean> {
  await tx
    .select({ id: problems.id })
    .from(problems)
    .where(and(eq(problems.id, problemId), isNull(problems.deletedWith)))
    .for('update')
  const rows = await tx
    .select({ id: referenceOptima.id })
    .from(referenceOptima)
    .where(
      and(
        eq(referenceOptima.problemId, problemId),
        eq(referenceOptima.problemVersion, version),
        eq(referenceOptima.status, 'running'),
      ),
    )
    .limit(1)
  return rows.length > 0
}
