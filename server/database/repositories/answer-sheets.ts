import { and, desc, eq, isNull } from 'drizzle-orm'
import type { Db } from '../client'
import { answerSheets, returns, users, workspaces } from '../schema'

export async function insertAnswerSheet(db: Db, row: typeof answerSheets.$inferInsert): Promise<void> {
  await db.insert(answerSheets).values(row)
}

const withPerson = (db: Db) =>
  db
    .select({ sheet: answerSheets, by: { id: users.id, name: users.name } })
    .from(answerSheets)
    .innerJoin(users, eq(users.id, answerSheets.createdBy))

/** Links of a return that stand, newest first. */
export async function standingAnswerSheets(db: Db, returnId: string) {
  return withPerson(db)
    .where(and(eq(answerSheets.returnId, returnId), isNull(answerSheets.revokedAt)))
    .orderBy(desc(answerSheets.createdAt), desc(answerSheets.id))
}

/** The sheet behind a link, unless it was revoked or its samples were deleted. */
export async function findAnswerSheet(db: Db, tokenHash: string) {
  const rows = await withPerson(db)
    .innerJoin(returns, eq(returns.id, answerSheets.returnId))
    .where(and(eq(answerSheets.tokenHash, tokenHash), isNull(answerSheets.revokedAt), isNull(returns.deletedWith)))
  return rows[0]
}

/** How many links were revoked. */
export async function revokeAnswerSheets(
  db: Db,
  returnId: string,
  set: { revokedBy: string; revokedAt: Date },
): Promise<number> {
  const rows = await db
    .update(answerSheets)
    .set(set)
    .where(and(eq(answerSheets.returnId, returnId), isNull(answerSheets.revokedAt)))
    .returning({ id: answerSheets.id })
  return rows.length
}

export async function workspaceName(db: Db, id: string): Promise<string> {
  return (await db.select({ name: workspaces.name }).from(workspaces).where(eq(workspaces.id, id)))[0]?.name ?? ''
}
