import { and, asc, eq, isNotNull, sql } from 'drizzle-orm'
import type { Db } from '../client'
import { archivedPeople, users } from '../schema'
import type { Place } from './pages'

export async function insertPersonWithoutAccount(
  tx: Db,
  person: { id: string; name: string; createdAt: Date },
): Promise<void> {
  await tx.insert(users).values({ ...person, email: null, passwordHash: null })
}

export async function insertArchivedPeople(tx: Db, row: typeof archivedPeople.$inferInsert): Promise<void> {
  await tx.insert(archivedPeople).values(row)
}

/** Members of the workspace that an archive came from who are not here yet, by name. */
export async function listArchivedMembers(db: Db, workspaceId: string, { limit, offset }: Place) {
  const isMember = sql`cardinality(${archivedPeople.roles}) > 0`
  return db
    .select({ id: users.id, name: users.name, email: archivedPeople.email, roles: archivedPeople.roles })
    .from(archivedPeople)
    .innerJoin(users, eq(users.id, archivedPeople.userId))
    .where(and(eq(archivedPeople.workspaceId, workspaceId), isNotNull(archivedPeople.email), isMember))
    .orderBy(asc(users.name), asc(users.id))
    .limit(limit)
    .offset(offset)
}

/** Whom an address belonged to in the archive of the workspace. */
export async function findArchivedPerson(db: Db, workspaceId: string, email: string): Promise<string | undefined> {
  const rows = await db
    .select({ id: archivedPeople.userId })
    .from(archivedPeople)
    .where(and(eq(archivedPeople.workspaceId, workspaceId), eq(archivedPeople.email, email)))
  return rows[0]?.id
}

/** They are here now: their address is no longer waited for. */
export async function settleArchivedPerson(tx: Db, userId: string): Promise<void> {
  await tx.update(archivedPeople).set({ email: null }).where(eq(archivedPeople.userId, userId))
}
