import { and, asc, desc, eq, inArray, isNull, lte, sql } from 'drizzle-orm'
import type { Db } from '../client'
import { brokenEmbeddings, embeddings, problems, returns, runSheets, users } from '../schema'
import type { Place } from './pages'

/** Found embeddings made at a calibration or an earlier one, with their problem and who made them; newest first. */
export async function embeddingsUpTo(db: Db, machineId: string, calibration: number, { limit, offset }: Place) {
  return db
    .select({
      embedding: embeddings,
      problem: { id: problems.id, number: problems.number, name: problems.name },
      by: { id: users.id, name: users.name },
    })
    .from(embeddings)
    .innerJoin(problems, eq(problems.id, embeddings.problemId))
    .leftJoin(users, eq(users.id, embeddings.createdBy))
    .where(
      and(
        eq(embeddings.machineId, machineId),
        lte(embeddings.calibration, calibration),
        eq(embeddings.status, 'found'),
        isNull(embeddings.deletedWith),
      ),
    )
    .orderBy(desc(embeddings.createdAt), desc(embeddings.number), desc(embeddings.id))
    .limit(limit)
    .offset(offset)
}

/** The calibration that first broke each embedding which does not hold at the one given. */
export async function brokenAt(db: Db, machineId: string, calibration: number): Promise<Map<string, number>> {
  const rows = await db
    .select()
    .from(brokenEmbeddings)
    .where(and(eq(brokenEmbeddings.machineId, machineId), lte(brokenEmbeddings.calibration, calibration)))
    .orderBy(desc(brokenEmbeddings.calibration))
  const still = rows.filter(({ holdsAgain }) => holdsAgain === null || holdsAgain > calibration)
  return new Map(still.map((row) => [row.embeddingId, row.calibration]))
}

/** Ready uploads and their reads of several embeddings. */
export async function uploadsOf(db: Db, embeddingIds: readonly string[]) {
  if (embeddingIds.length === 0) return new Map<string, { returns: number; reads: number }>()
  const rows = await db
    .select({
      id: returns.embeddingId,
      returns: sql<number>`count(*)::int`,
      reads: sql<number>`sum(${returns.reads})::float8`,
    })
    .from(returns)
    .where(
      and(
        inArray(returns.embeddingId, [...embeddingIds]),
        eq(returns.status, 'ready'),
        eq(returns.source, 'upload'),
        isNull(returns.deletedWith),
      ),
    )
    .groupBy(returns.embeddingId)
  return new Map(rows.map((row) => [row.id, { returns: row.returns, reads: row.reads }]))
}

/** Ready returns of embeddings made at one calibration, newest first. */
export async function returnsAt(
  db: Db,
  machineId: string,
  calibration: number,
  sources: readonly ('rehearsal' | 'upload')[],
) {
  return db
    .select({ row: returns, embedding: embeddings, runSheet: { id: runSheets.id, number: runSheets.number } })
    .from(returns)
    .innerJoin(embeddings, eq(embeddings.id, returns.embeddingId))
    .innerJoin(runSheets, eq(runSheets.id, returns.runSheetId))
    .where(
      and(
        eq(embeddings.machineId, machineId),
        eq(embeddings.calibration, calibration),
        eq(returns.status, 'ready'),
        inArray(returns.source, [...sources]),
        isNull(returns.deletedWith),
        isNull(embeddings.deletedWith),
      ),
    )
    .orderBy(desc(returns.createdAt), asc(returns.id))
}

/** Keeps the packed breaks of a return that has none yet; false when it has, or is gone. */
export async function keepBreaks(tx: Db, returnId: string, breaksBlobId: string): Promise<boolean> {
  const rows = await tx
    .update(returns)
    .set({ breaksBlobId })
    .where(and(eq(returns.id, returnId), isNull(returns.breaksBlobId)))
    .returning({ id: returns.id })
  return rows.length === 1
}
