import { and, eq, lte, or, isNull, sql } from 'drizzle-orm'
import type { Actor } from '../../app'
import type { Db } from '../client'
import { answeredRequests } from '../schema'

export type AnsweredRequestRow = typeof answeredRequests.$inferSelect

const isAt = ({ workspaceId, userId }: Actor, key: string) =>
  and(eq(answeredRequests.workspaceId, workspaceId), eq(answeredRequests.userId, userId), eq(answeredRequests.key, key))

/**
 * Takes a key for a request that is about to be answered: one that is free, one answered before `forgotten`, or one that
 * somebody began to answer before `abandoned`. @returns whether it was to be had
 */
export async function takeKey(
  db: Db,
  actor: Actor,
  {
    key,
    request,
    now,
    forgotten,
    abandoned,
  }: Record<'key' | 'request', string> & Record<'now' | 'forgotten' | 'abandoned', Date>,
): Promise<boolean> {
  const { workspaceId, userId } = actor
  const rows = await db
    .insert(answeredRequests)
    .values({ workspaceId, userId, key, request, status: null, answer: null, createdAt: now })
    .onConflictDoUpdate({
      target: [answeredRequests.workspaceId, answeredRequests.userId, answeredRequests.key],
      set: { request, status: sql`null`, answer: sql`null`, createdAt: now },
      setWhere: or(
        lte(answeredRequests.createdAt, forgotten),
        and(isNull(answeredRequests.status), lte(answeredRequests.createdAt, abandoned)),
      ),
    })
    .returning({ key: answeredRequests.key })
  return rows.length === 1
}

export async function findAnswered(db: Db, actor: Actor, key: string): Promise<AnsweredRequestRow | undefined> {
  return (await db.select().from(answeredRequests).where(isAt(actor, key)))[0]
}

export async function saveAnswer(
  db: Db,
  actor: Actor,
  key: string,
  set: Pick<AnsweredRequestRow, 'request' | 'status' | 'answer'>,
): Promise<void> {
  await db.update(answeredRequests).set(set).where(isAt(actor, key))
}

export async function deleteAnswered(db: Db, actor: Actor, key: string): Promise<void> {
  await db.delete(answeredRequests).where(isAt(actor, key))
}

export async function deleteAnsweredBefore(db: Db, time: Date): Promise<void> {
  await db.delete(answeredRequests).where(lte(answeredRequests.createdAt, time))
}
