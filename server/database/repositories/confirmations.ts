import { and, eq, getTableColumns, gt, isNull, lte } from 'drizzle-orm'
import type { Db } from '../client'
import { accountEmail, confirmations, users } from '../schema'

export type ConfirmationRow = typeof confirmations.$inferSelect

export async function insertConfirmation(tx: Db, row: ConfirmationRow): Promise<void> {
  await tx.insert(confirmations).values(row)
}

/** An open confirmation by the hash of its secret, with whose it is; held until the transaction ends. */
export async function holdConfirmation(tx: Db, kind: ConfirmationRow['kind'], tokenHash: string, now: Date) {
  const isOpen = and(isNull(confirmations.usedAt), gt(confirmations.expiresAt, now))
  const rows = await tx
    .select({ confirmation: confirmations, user: { ...getTableColumns(users), email: accountEmail } })
    .from(confirmations)
    .innerJoin(users, eq(users.id, confirmations.userId))
    .where(and(eq(confirmations.tokenHash, tokenHash), eq(confirmations.kind, kind), isOpen))
    .for('update', { of: confirmations })
  return rows[0]
}

/** Ends every open confirmation of a person: the one that was used and those beside it. */
export async function closeConfirmations(tx: Db, userId: string, usedAt: Date): Promise<void> {
  await tx
    .update(confirmations)
    .set({ usedAt })
    .where(and(eq(confirmations.userId, userId), isNull(confirmations.usedAt)))
}

export async function deleteExpiredConfirmations(db: Db, now: Date): Promise<void> {
  await db.delete(confirmations).where(lte(confirmations.expiresAt, now))
}
