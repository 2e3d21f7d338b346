import { and, count, desc, eq, inArray, isNull, lte, sql } from 'drizzle-orm'
import type { Role } from '../../../shared/schemas/common'
import type { MailState } from '../../../shared/schemas/mail'
import type { Db } from '../client'
import { accountEmail, mails, memberships, users } from '../schema'

export type MailRow = typeof mails.$inferSelect

export interface Addressee {
  id: string
  email: string
}

export async function insertMails(tx: Db, rows: (typeof mails.$inferInsert)[]): Promise<void> {
  if (rows.length > 0) await tx.insert(mails).values(rows)
}

/** Those of the people given who still belong to the workspace. */
export async function addresseesOf(db: Db, workspaceId: string, userIds: readonly string[]): Promise<Addressee[]> {
  if (userIds.length === 0) return []
  return db
    .select({ id: users.id, email: accountEmail })
    .from(memberships)
    .innerJoin(users, eq(users.id, memberships.userId))
    .where(and(eq(memberships.workspaceId, workspaceId), inArray(users.id, [...userIds])))
}

/** Ids of the people who hold a role. */
export async function holdersOf(db: Db, workspaceId: string, role: Role): Promise<string[]> {
  const rows = await db
    .select({ id: memberships.userId })
    .from(memberships)
    .where(and(eq(memberships.workspaceId, workspaceId), sql`${role} = any(${memberships.roles})`))
  return rows.map(({ id }) => id)
}

/**
 * Takes the message that is due for longest and counts an attempt; the next one is set at once, so that no other process
 * takes it meanwhile and one that is lost with its process is tried again.
 */
export async function claimDueMail(
  db: Db,
  now: Date,
  nextAfter: (attempts: number) => Date,
): Promise<MailRow | undefined> {
  return db.transaction(async (tx) => {
    const due = and(eq(mails.state, 'waiting'), lte(mails.nextAttemptAt, now))
    const [row] = await tx
      .select()
      .from(mails)
      .where(due)
      .orderBy(mails.nextAttemptAt)
      .limit(1)
      .for('update', { skipLocked: true })
    if (!row) return undefined
    const attempts = row.attempts + 1
    const nextAttemptAt = nextAfter(attempts)
    await tx.update(mails).set({ attempts, nextAttemptAt }).where(eq(mails.id, row.id))
    return { ...row, attempts, nextAttemptAt }
  })
}

/** Stores how an attempt ended, unless the message was settled meanwhile. */
export async function settleMail(
  db: Db,
  id: string,
  set: Pick<Partial<MailRow>, 'state' | 'reason' | 'sentAt' | 'nextAttemptAt' | 'text' | 'html'>,
): Promise<void> {
  await db
    .update(mails)
    .set(set)
    .where(and(eq(mails.id, id), eq(mails.state, 'waiting')))
}

/** Keeps what waits, where there is no mail server any more; what is in no outbox holds secrets, and goes. */
export async function keepWaitingMails(db: Db): Promise<void> {
  await db.delete(mails).where(and(eq(mails.state, 'waiting'), isNull(mails.workspaceId)))
  await db.update(mails).set({ state: 'kept', nextAttemptAt: null }).where(eq(mails.state, 'waiting'))
}

const inState = (workspaceId: string, state?: MailState) =>
  and(eq(mails.workspaceId, workspaceId), state ? eq(mails.state, state) : undefined)

/** Messages of a workspace, newest first, with the names of whom they are for. */
export async function listMails(
  db: Db,
  workspaceId: string,
  { state, limit, offset }: { state?: MailState; limit: number; offset: number },
) {
  return db
    .select({ mail: mails, name: users.name })
    .from(mails)
    .leftJoin(users, eq(users.id, mails.toUserId))
    .where(inState(workspaceId, state))
    .orderBy(desc(mails.createdAt), mails.id)
    .limit(limit)
    .offset(offset)
}

export async function countMails(db: Db, workspaceId: string): Promise<{ state: MailState; n: number }[]> {
  return db.select({ state: mails.state, n: count() }).from(mails).where(inState(workspaceId)).groupBy(mails.state)
}
