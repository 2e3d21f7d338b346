import { and, asc, eq, getTableColumns } from 'drizzle-orm'
import type { Db } from '../client'
import { accountEmail, passkeys, users } from '../schema'

export type PasskeyRow = typeof passkeys.$inferSelect

export async function insertPasskey(tx: Db, row: PasskeyRow): Promise<void> {
  await tx.insert(passkeys).values(row)
}

/** Oldest first. */
export async function listPasskeys(db: Db, userId: string): Promise<PasskeyRow[]> {
  return db
    .select()
    .from(passkeys)
    .where(eq(passkeys.userId, userId))
    .orderBy(asc(passkeys.createdAt), asc(passkeys.id))
}

/** A passkey by the authenticator's id of it, with whose it is. */
export async function findPasskey(db: Db, credentialId: string) {
  const rows = await db
    .select({ passkey: passkeys, user: { ...getTableColumns(users), email: accountEmail } })
    .from(passkeys)
    .innerJoin(users, eq(users.id, passkeys.userId))
    .where(eq(passkeys.credentialId, credentialId))
  return rows[0]
}

/** Notes a use, unless another was noted since the counter was read. @returns whether it was */
export async function notePasskeyUse(
  db: Db,
  { id, counter }: Pick<PasskeyRow, 'id' | 'counter'>,
  set: Pick<PasskeyRow, 'counter' | 'backedUp' | 'usedAt'>,
): Promise<boolean> {
  const rows = await db
    .update(passkeys)
    .set(set)
    .where(and(eq(passkeys.id, id), eq(passkeys.counter, counter)))
    .returning({ id: passkeys.id })
  return rows.length === 1
}

/** False where the person has no such passkey. */
export async function renamePasskeyRow(db: Db, userId: string, id: string, name: string): Promise<boolean> {
  const isIt = and(eq(passkeys.userId, userId), eq(passkeys.id, id))
  return (await db.update(passkeys).set({ name }).where(isIt).returning({ id: passkeys.id })).length === 1
}

/** What was removed; undefined where the person has no such passkey. */
export async function deletePasskey(tx: Db, userId: string, id: string): Promise<PasskeyRow | undefined> {
  return (
    await tx
      .delete(passkeys)
      .where(and(eq(passkeys.userId, userId), eq(passkeys.id, id)))
      .returning()
  )[0]
}
