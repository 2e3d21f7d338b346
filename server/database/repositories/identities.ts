import { and, eq } from 'drizzle-orm'
import type { Db } from '../client'
import { identities } from '../schema'

export type IdentityRow = typeof identities.$inferSelect

export async function insertIdentity(tx: Db, row: IdentityRow): Promise<void> {
  await tx.insert(identities).values(row)
}

/** Whose identity it is. */
export async function findIdentity(db: Db, provider: string, subject: string): Promise<IdentityRow | undefined> {
  const isIt = and(eq(identities.provider, provider), eq(identities.subject, subject))
  return (await db.select().from(identities).where(isIt))[0]
}

/** Who a person is to a provider. */
export async function identityOf(db: Db, provider: string, userId: string): Promise<IdentityRow | undefined> {
  const isTheirs = and(eq(identities.provider, provider), eq(identities.userId, userId))
  return (await db.select().from(identities).where(isTheirs))[0]
}

/** False where there was none. */
export async function deleteIdentity(tx: Db, provider: string, userId: string): Promise<boolean> {
  const isTheirs = and(eq(identities.provider, provider), eq(identities.userId, userId))
  return (await tx.delete(identities).where(isTheirs).returning({ subject: identities.subject })).length > 0
}
