import { aliasedTable, and, asc, count, desc, eq, inArray, isNull, ne } from 'drizzle-orm'
import type { Db } from '../client'
import { embeddings, machines, problems, returns, runSheetRemarks, runSheets, users } from '../schema'

export type RunSheetRow = typeof runSheets.$inferSelect
/** What a remark says of a submission. */
export const SUBMITTED = 'submitted for review'

export type ReturnRow = typeof returns.$inferSelect

export async function insertRunSheet(db: Db, row: typeof runSheets.$inferInsert): Promise<void> {
  await db.insert(runSheets).values(row)
}

export async function findRunSheet(db: Db, workspaceId: string, id: string): Promise<RunSheetRow | undefined> {
  return (
    await db
      .select()
      .from(runSheets)
      .where(and(eq(runSheets.workspaceId, workspaceId), eq(runSheets.id, id), isNull(runSheets.deletedWith)))
  )[0]
}

export async function listRunSheets(db: Db, workspaceId: string, limit: number, offset: number) {
  return db
    .select({
      sheet: runSheets,
      embedding: { id: embeddings.id, number: embeddings.number },
      problem: { id: problems.id, number: problems.number, name: problems.name },
      machine: { id: machines.id, name: machines.name },
    })
    .from(runSheets)
    .innerJoin(embeddings, eq(embeddings.id, runSheets.embeddingId))
    .innerJoin(problems, eq(problems.id, embeddings.problemId))
    .innerJoin(machines, eq(machines.id, embeddings.machineId))
    .where(and(eq(runSheets.workspaceId, workspaceId), isNull(runSheets.deletedWith)))
    .orderBy(desc(runSheets.changedAt), desc(runSheets.number))
    .limit(limit)
    .offset(offset)
}

/** Names of the problem that a run sheet runs and of the machine that it runs on. */
export async function aboutRunSheet(db: Db, id: string): Promise<{ problem: string; machine: string }> {
  const rows = await db
    .select({ problem: problems.name, machine: machines.name })
    .from(runSheets)
    .innerJoin(embeddings, eq(embeddings.id, runSheets.embeddingId))
    .innerJoin(problems, eq(problems.id, embeddings.problemId))
    .innerJoin(machines, eq(machines.id, embeddings.machineId))
    .where(eq(runSheets.id, id))
  return rows[0]!
}

export async function runSheetsOfEmbeddings(db: Db, embeddingIds: readonly string[]): Promise<RunSheetRow[]> {
  if (embeddingIds.length === 0) return []
  return db
    .select()
    .from(runSheets)
    .where(and(inArray(runSheets.embeddingId, [...embeddingIds]), isNull(runSheets.deletedWith)))
    .orderBy(desc(runSheets.createdAt), desc(runSheets.number))
}

/** Run sheets that were copied from one, by number. */
export async function copiesOf(db: Db, { workspaceId, id }: Pick<RunSheetRow, 'workspaceId' | 'id'>) {
  return db
    .select()
    .from(runSheets)
    .where(and(eq(runSheets.workspaceId, workspaceId), eq(runSheets.madeFromId, id), isNull(runSheets.deletedWith)))
    .orderBy(asc(runSheets.number))
}

/**
 * Changes a run sheet only while it is in one of the states given and, where `seen` is given, unchanged since then; false
 * when it no longer is.
 */
export async function updateRunSheet(
  db: Db,
  id: string,
  states: readonly RunSheetRow['state'][],
  set: Partial<typeof runSheets.$inferInsert>,
  seen?: Date,
): Promise<boolean> {
  const unchanged = seen ? eq(runSheets.changedAt, seen) : undefined
  const rows = await db
    .update(runSheets)
    .set(set)
    .where(and(eq(runSheets.id, id), inArray(runSheets.state, [...states]), isNull(runSheets.deletedWith), unchanged))
    .returning({ id: runSheets.id })
  return rows.length === 1
}

/** Run sheets on an embedding that are in one of the states given; nobody changes them before the transaction ends. */
export async function lockRunSheetsOn(
  tx: Db,
  embeddingId: string,
  states: readonly RunSheetRow['state'][],
): Promise<RunSheetRow[]> {
  return tx
    .select()
    .from(runSheets)
    .where(
      and(eq(runSheets.embeddingId, embeddingId), inArray(runSheets.state, [...states]), isNull(runSheets.deletedWith)),
    )
    .orderBy(asc(runSheets.number))
    .for('update')
}

export async function insertRemark(db: Db, row: typeof runSheetRemarks.$inferInsert): Promise<void> {
  await db.insert(runSheetRemarks).values(row)
}

const away = aliasedTable(users, 'away')

export async function listRemarks(db: Db, runSheetId: string) {
  return db
    .select({
      remark: runSheetRemarks,
      by: { id: users.id, name: users.name },
      forWhom: { id: away.id, name: away.name },
    })
    .from(runSheetRemarks)
    .leftJoin(users, eq(users.id, runSheetRemarks.by))
    .leftJoin(away, eq(away.id, runSheetRemarks.forUserId))
    .where(eq(runSheetRemarks.runSheetId, runSheetId))
    .orderBy(asc(runSheetRemarks.createdAt))
}

/** Submissions of a run sheet for review, newest first. */
export async function submissionsOf(db: Db, runSheetId: string) {
  return db
    .select()
    .from(runSheetRemarks)
    .where(and(eq(runSheetRemarks.runSheetId, runSheetId), eq(runSheetRemarks.what, SUBMITTED)))
    .orderBy(desc(runSheetRemarks.createdAt))
}

/** Run sheets in review, the longest unchanged first. */
export async function listInReview(db: Db, workspaceId: string, limit: number, offset: number): Promise<RunSheetRow[]> {
  return db
    .select()
    .from(runSheets)
    .where(and(eq(runSheets.workspaceId, workspaceId), eq(runSheets.state, 'in review'), isNull(runSheets.deletedWith)))
    .orderBy(asc(runSheets.changedAt), asc(runSheets.number))
    .limit(limit)
    .offset(offset)
}

export async function insertReturn(db: Db, row: typeof returns.$inferInsert): Promise<void> {
  await db.insert(returns).values(row)
}

export async function findReturn(db: Db, workspaceId: string, id: string): Promise<ReturnRow | undefined> {
  return (
    await db
      .select()
      .from(returns)
      .where(and(eq(returns.workspaceId, workspaceId), eq(returns.id, id), isNull(returns.deletedWith)))
  )[0]
}

/** A return by its id alone, deleted or not, for jobs. */
export async function findReturnOfJob(db: Db, id: string): Promise<ReturnRow | undefined> {
  return (await db.select().from(returns).where(eq(returns.id, id)))[0]
}

/** False when the return was deleted meanwhile. */
export async function updateReturn(db: Db, id: string, set: Partial<typeof returns.$inferInsert>): Promise<boolean> {
  const rows = await db.update(returns).set(set).where(eq(returns.id, id)).returning({ id: returns.id })
  return rows.length === 1
}

/** Keeps the packed summary of a return that has none yet; false when it has, or is gone. */
export async function keepSummary(tx: Db, id: string, summaryBlobId: string): Promise<boolean> {
  const rows = await tx
    .update(returns)
    .set({ summaryBlobId })
    .where(and(eq(returns.id, id), isNull(returns.summaryBlobId)))
    .returning({ id: returns.id })
  return rows.length === 1
}

/** Keeps what was worked out of samples, which never changes. */
export async function keepMeasures(db: Db, id: string, measures: NonNullable<ReturnRow['measures']>): Promise<void> {
  await db.update(returns).set({ measures }).where(eq(returns.id, id))
}

const readyOfProblem = (workspaceId: string, problemId: string) =>
  and(
    eq(returns.workspaceId, workspaceId),
    eq(embeddings.problemId, problemId),
    eq(returns.status, 'ready'),
    isNull(returns.deletedWith),
  )

/** Samples of all versions of a problem that are there, newest first, each with its run sheet. */
export async function returnsOfProblem(
  db: Db,
  { workspaceId, problemId, limit, offset }: { workspaceId: string; problemId: string; limit: number; offset: number },
) {
  return db
    .select({ row: returns, runSheet: { id: runSheets.id, number: runSheets.number, name: runSheets.name } })
    .from(returns)
    .innerJoin(embeddings, eq(embeddings.id, returns.embeddingId))
    .innerJoin(runSheets, eq(runSheets.id, returns.runSheetId))
    .where(readyOfProblem(workspaceId, problemId))
    .orderBy(desc(returns.createdAt), desc(returns.id))
    .limit(limit)
    .offset(offset)
}

/** How many sets of samples of a problem there are, by their source. */
export async function countReturnsOfProblem(db: Db, workspaceId: string, problemId: string) {
  return db
    .select({ source: returns.source, n: count() })
    .from(returns)
    .innerJoin(embeddings, eq(embeddings.id, returns.embeddingId))
    .where(readyOfProblem(workspaceId, problemId))
    .groupBy(returns.source)
}

/** Returns of several run sheets, newest first. */
export async function returnsOfRunSheets(db: Db, runSheetIds: readonly string[]): Promise<ReturnRow[]> {
  if (runSheetIds.length === 0) return []
  return db
    .select()
    .from(returns)
    .where(inArray(returns.runSheetId, [...runSheetIds]))
    .orderBy(desc(returns.createdAt))
}

/** Uploaded samples made on an embedding, each with the number of its run sheet. */
export async function returnedOnEmbedding(db: Db, embeddingId: string) {
  return db
    .select({ row: returns, runSheet: runSheets.number })
    .from(returns)
    .innerJoin(runSheets, eq(runSheets.id, returns.runSheetId))
    .where(
      and(
        eq(returns.embeddingId, embeddingId),
        ne(returns.source, 'rehearsal'),
        eq(returns.status, 'ready'),
        isNull(returns.deletedWith),
      ),
    )
    .orderBy(asc(returns.createdAt))
}

/** Another ready return of the same run sheet to compare with: the newest of the other source, else the newest other one. */
export async function returnToCompare(db: Db, row: ReturnRow): Promise<ReturnRow | undefined> {
  const others = await db
    .select()
    .from(returns)
    .where(and(eq(returns.runSheetId, row.runSheetId), ne(returns.id, row.id), eq(returns.status, 'ready')))
    .orderBy(desc(returns.createdAt))
  return others.find((other) => other.source !== row.source) ?? others[0]
}
