import { and, desc, eq, gt, lte, ne } from 'drizzle-orm'
import type { Db } from '../client'
import { sessions, workspaces } from '../schema'
import type { Place } from './pages'

export type SessionRow = typeof sessions.$inferSelect

export async function insertSession(db: Db, row: SessionRow): Promise<void> {
  await db.insert(sessions).values(row)
}

/** A session that has not expired. */
export async function findSession(db: Db, id: string, now: Date): Promise<SessionRow | undefined> {
  return (
    await db
      .select()
      .from(sessions)
      .where(and(eq(sessions.id, id), gt(sessions.expiresAt, now)))
  )[0]
}

export async function noteSessionUse(
  db: Db,
  id: string,
  set: Pick<SessionRow, 'address' | 'seenAt' | 'expiresAt'>,
): Promise<void> {
  await db.update(sessions).set(set).where(eq(sessions.id, id))
}

/** Sessions of a person that have not expired, with the workspace each looks at; last seen first. */
export async function listSessions(db: Db, userId: string, now: Date, { limit, offset }: Place) {
  return db
    .select({ session: sessions, workspace: workspaces.name })
    .from(sessions)
    .innerJoin(workspaces, eq(workspaces.id, sessions.workspaceId))
    .where(and(eq(sessions.userId, userId), gt(sessions.expiresAt, now)))
    .orderBy(desc(sessions.seenAt), sessions.id)
    .limit(limit)
    .offset(offset)
}

/** False when the person has no such session. */
export async function deleteSession(db: Db, userId: string, id: string): Promise<boolean> {
  const rows = await db
    .delete(sessions)
    .where(and(eq(sessions.userId, userId), eq(sessions.id, id)))
    .returning({ id: sessions.id })
  return rows.length === 1
}

export async function deleteSessionsOf(db: Db, userId: string): Promise<void> {
  await db.delete(sessions).where(eq(sessions.userId, userId))
}

export async function setSessionWorkspace(db: Db, id: string, workspaceId: string): Promise<void> {
  await db.update(sessions).set({ workspaceId }).where(eq(sessions.id, id))
}

/** Lets a person's sessions that look at one workspace look at another. */
export async function moveSessions(tx: Db, userId: string, from: string, to: string): Promise<void> {
  await tx
    .update(sessions)
    .set({ workspaceId: to })
    .where(and(eq(sessions.userId, userId), eq(sessions.workspaceId, from)))
}

/** Those that look at a workspace. */
export async function deleteSessionsIn(tx: Db, workspaceId: string, userId: string): Promise<void> {
  await tx.delete(sessions).where(and(eq(sessions.userId, userId), eq(sessions.workspaceId, workspaceId)))
}

export async function deleteOtherSessions(db: Db, userId: string, keptId: string): Promise<void> {
  await db.delete(sessions).where(and(eq(sessions.userId, userId), ne(sessions.id, keptId)))
}

export async function deleteExpiredSessions(db: Db, now: Date): Promise<void> {
  await db.delete(sessions).where(lte(sessions.expiresAt, now))
}
