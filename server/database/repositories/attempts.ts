import { eq, lte, sql } from 'drizzle-orm'
import type { Db } from '../client'
import { attempts } from '../schema'

/** Counts one more under a key, or begins anew once its time is over. @returns how many there are, until when */
export async function addAttempt(
  db: Db,
  key: string,
  now: Date,
  resetsAt: Date,
): Promise<{ count: number; resetsAt: Date }> {
  const isOver = lte(attempts.resetsAt, now)
  const [row] = await db
    .insert(attempts)
    .values({ key, count: 1, resetsAt })
    .onConflictDoUpdate({
      target: attempts.key,
      set: {
        count: sql`case when ${isOver} then 1 else ${attempts.count} + 1 end`,
        resetsAt: sql`case when ${isOver} then excluded.resets_at else ${attempts.resetsAt} end`,
      },
    })
    .returning()
  return row!
}

/** Takes one back. */
export async function takeAttemptBack(db: Db, key: string): Promise<void> {
  await db
    .update(attempts)
    .set({ count: sql`greatest(${attempts.count} - 1, 0)` })
    .where(eq(attempts.key, key))
}

export async function deleteAttempts(db: Db, key: string): Promise<void> {
  await db.delete(attempts).where(eq(attempts.key, key))
}

export async function deleteOverAttempts(db: Db, now: Date): Promise<void> {
  await db.delete(attempts).where(lte(attempts.resetsAt, now))
}
