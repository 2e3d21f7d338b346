import { and, count, desc, gt, eq, inArray, isNull, lt, lte, or, sql } from 'drizzle-orm'
import type { PgColumn } from 'drizzle-orm/pg-core'
import type { Actor } from '../../app'
import type { Db } from '../client'
import { embeddings, machines, memberships, news, problems, returns, runSheets, sessions } from '../schema'

export type NewsRow = typeof news.$inferSelect

/** Where a list goes on: after the item of that moment and id. */
export interface NewsPlace {
  at: Date
  id: string
}

const ofPerson = ({ userId, workspaceId }: Actor) => and(eq(news.userId, userId), eq(news.workspaceId, workspaceId))
const isUnread = isNull(news.readAt)

export async function insertNews(tx: Db, rows: (typeof news.$inferInsert)[]): Promise<void> {
  if (rows.length > 0) await tx.insert(news).values(rows)
}

/** A person’s news of a workspace, newest first. What is read or comes meanwhile moves nothing of what follows a place. */
export async function listNews(
  db: Db,
  actor: Actor,
  { unread, limit, after }: { unread: boolean; limit: number; after?: NewsPlace },
): Promise<NewsRow[]> {
  const follows = after && or(lt(news.createdAt, after.at), and(eq(news.createdAt, after.at), lt(news.id, after.id)))
  return db
    .select()
    .from(news)
    .where(and(ofPerson(actor), unread ? isUnread : undefined, follows))
    .orderBy(desc(news.createdAt), desc(news.id))
    .limit(limit)
}

export async function countUnread(db: Db, actor: Actor): Promise<number> {
  const [row] = await db
    .select({ n: count() })
    .from(news)
    .where(and(ofPerson(actor), isUnread))
  return row!.n
}

/** What a session’s person is told in the workspace that it looks at. */
export interface NewsStanding {
  sessionId: string
  workspaceId: string
  unread: number
  newestAt: Date | null
}

/** How things stand for each of these sessions; those that ended, or whose person left the workspace, are left out. */
export async function newsStandings(db: Db, sessionIds: readonly string[], now: Date): Promise<NewsStanding[]> {
  const own = and(eq(news.userId, sessions.userId), eq(news.workspaceId, sessions.workspaceId))
  const unread = db.select({ n: count() }).from(news).where(and(own, isUnread))
  const newest = db.select({ at: news.createdAt }).from(news).where(own).orderBy(desc(news.createdAt)).limit(1)
  return db
    .select({
      sessionId: sessions.id,
      workspaceId: sessions.workspaceId,
      unread: sql<number>`(${unread})`.mapWith(Number),
      newestAt: sql<Date | null>`(${newest})`.mapWith(news.createdAt),
    })
    .from(sessions)
    .innerJoin(
      memberships,
      and(eq(memberships.userId, sessions.userId), eq(memberships.workspaceId, sessions.workspaceId)),
    )
    .where(and(inArray(sessions.id, [...sessionIds]), gt(sessions.expiresAt, now)))
}

/** What was read before stays read as of then. @returns false where the person has no such item in the workspace */
export async function markRead(db: Db, actor: Actor, id: string, at: Date): Promise<boolean> {
  const rows = await db
    .update(news)
    .set({ readAt: sql`coalesce(${news.readAt}, ${at.toISOString()})` })
    .where(and(ofPerson(actor), eq(news.id, id)))
    .returning({ id: news.id })
  return rows.length === 1
}

/** Marks all as read that was written until a moment. */
export async function markAllRead(db: Db, actor: Actor, upTo: Date, at: Date): Promise<void> {
  await db
    .update(news)
    .set({ readAt: at })
    .where(and(ofPerson(actor), isUnread, lte(news.createdAt, upTo)))
}

export async function deleteNewsOf(tx: Db, actor: Actor): Promise<void> {
  await tx.delete(news).where(ofPerson(actor))
}

/** Deletes what was read before a moment, and what was written before another and never read. */
export async function deleteOldNews(db: Db, { readBefore, before }: { readBefore: Date; before: Date }): Promise<void> {
  // Nothing is read before it is written: the index by time finds both.
  await db
    .delete(news)
    .where(and(lt(news.createdAt, readBefore), or(lt(news.readAt, readBefore), lt(news.createdAt, before))))
}

interface Deletable {
  id: PgColumn
  workspaceId?: PgColumn
  deletedWith?: PgColumn
}

const THINGS = {
  problems,
  machines,
  embeddings,
  'run-sheets': runSheets,
  returns,
} as const
export type ThingFolder = keyof typeof THINGS

/** Those of the ids whose things can still be opened. */
export async function thingsThere(db: Db, folder: ThingFolder, ids: readonly string[]): Promise<string[]> {
  const table = THINGS[folder]
  const { id, deletedWith }: Deletable = table
  const rows = await db
    .select({ id: table.id })
    .from(table)
    .where(and(inArray(id, [...ids]), deletedWith && isNull(deletedWith)))
  return rows.map((row) => row.id)
}
