import { and, eq, gt, lte } from 'drizzle-orm'
import type { Db } from '../client'
import { challenges } from '../schema'

export type ChallengeRow = typeof challenges.$inferSelect

export async function insertChallenge(db: Db, row: ChallengeRow): Promise<void> {
  await db.insert(challenges).values(row)
}

/** Removes an open challenge and answers it: of two who bring the same one, one gets it. */
export async function takeChallengeRow(
  db: Db,
  purpose: ChallengeRow['purpose'],
  tokenHash: string,
  now: Date,
): Promise<ChallengeRow | undefined> {
  const isIt = and(eq(challenges.tokenHash, tokenHash), eq(challenges.purpose, purpose), gt(challenges.expiresAt, now))
  return (await db.delete(challenges).where(isIt).returning())[0]
}

export async function deleteExpiredChallenges(db: Db, now: Date): Promise<void> {
  await db.delete(challenges).where(lte(challenges.expiresAt, now))
}
