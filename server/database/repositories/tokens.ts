import { and, count, desc, eq } from 'drizzle-orm'
import type { Db } from '../client'
import { memberships, tokens, users } from '../schema'

export type TokenRow = typeof tokens.$inferSelect

export async function insertToken(db: Db, row: TokenRow): Promise<void> {
  await db.insert(tokens).values(row)
}

export async function findTokenByHash(db: Db, tokenHash: string): Promise<TokenRow | undefined> {
  return (await db.select().from(tokens).where(eq(tokens.tokenHash, tokenHash)))[0]
}

export async function noteTokenUse(db: Db, id: string, usedAt: Date): Promise<void> {
  await db.update(tokens).set({ usedAt }).where(eq(tokens.id, id))
}

/** Tokens of a workspace, or of one person in it: without `userId` everybody's. */
interface TokenScope {
  workspaceId: string
  userId?: string
}

const within = ({ workspaceId, userId }: TokenScope) =>
  and(eq(tokens.workspaceId, workspaceId), userId ? eq(tokens.userId, userId) : undefined)

/** Newest first, with whose they are and the roles that person holds now (null for nobody of the workspace). */
export async function listTokens(db: Db, scope: TokenScope, { limit, offset }: { limit: number; offset: number }) {
  return db
    .select({ token: tokens, by: { id: users.id, name: users.name }, roles: memberships.roles })
    .from(tokens)
    .innerJoin(users, eq(users.id, tokens.userId))
    .leftJoin(memberships, and(eq(memberships.userId, tokens.userId), eq(memberships.workspaceId, tokens.workspaceId)))
    .where(within(scope))
    .orderBy(desc(tokens.createdAt), desc(tokens.id))
    .limit(limit)
    .offset(offset)
}

export async function countTokens(db: Db, scope: TokenScope): Promise<number> {
  return (await db.select({ n: count() }).from(tokens).where(within(scope)))[0]!.n
}

/** False when there is no such token in the scope. */
export async function deleteToken(db: Db, scope: TokenScope, id: string): Promise<boolean> {
  const rows = await db
    .delete(tokens)
    .where(and(within(scope), eq(tokens.id, id)))
    .returning({ id: tokens.id })
  return rows.length === 1
}

export async function deleteTokensOf(tx: Db, workspaceId: string, userId: string): Promise<void> {
  await tx.delete(tokens).where(within({ workspaceId, userId }))
}
