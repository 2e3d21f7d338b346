import { and, asc, count, eq, inArray, isNotNull, isNull, lte } from 'drizzle-orm'
import type { Person, Role } from '../../../shared/schemas/common'
import type { Db } from '../client'
import { accountEmail, installation, machines, memberships, problems, runSheets, users, workspaces } from '../schema'

/** Somebody with an account. */
export type UserRow = typeof users.$inferSelect & { email: string }

const isAccount = (row: typeof users.$inferSelect | undefined): row is UserRow =>
  row !== undefined && row.email !== null

export async function anyUser(db: Db): Promise<boolean> {
  return (await db.select({ id: users.id }).from(users).where(isNotNull(users.email)).limit(1)).length > 0
}

export async function findUserByEmail(db: Db, email: string): Promise<UserRow | undefined> {
  const row = (await db.select().from(users).where(eq(users.email, email)))[0]
  return isAccount(row) ? row : undefined
}

/** The account; undefined also for somebody who has none. */
export async function findUser(db: Db, id: string): Promise<UserRow | undefined> {
  const row = (await db.select().from(users).where(eq(users.id, id)))[0]
  return isAccount(row) ? row : undefined
}

/** Names of the people with these ids. */
export async function personsOf(db: Db, ids: readonly string[]): Promise<Person[]> {
  if (ids.length === 0) return []
  return db
    .select({ id: users.id, name: users.name })
    .from(users)
    .where(inArray(users.id, [...ids]))
}

/** Those of the people given who belong to the workspace. */
export async function membersAmong(db: Db, workspaceId: string, ids: readonly string[]): Promise<Person[]> {
  if (ids.length === 0) return []
  return db
    .select({ id: users.id, name: users.name })
    .from(memberships)
    .innerJoin(users, eq(users.id, memberships.userId))
    .where(and(eq(memberships.workspaceId, workspaceId), inArray(users.id, [...ids])))
}

export async function insertUser(db: Db, user: UserRow): Promise<void> {
  await db.insert(users).values(user)
}

export async function updateUser(
  db: Db,
  id: string,
  set: Partial<Pick<UserRow, 'email' | 'passwordHash'>>,
): Promise<void> {
  await db.update(users).set(set).where(eq(users.id, id))
}

export async function insertWorkspace(db: Db, workspace: { id: string; name: string; createdAt: Date }): Promise<void> {
  await db.insert(workspaces).values(workspace)
}

export async function setWorkspaceDeletion(tx: Db, id: string, deletesAt: Date | null): Promise<void> {
  await tx.update(workspaces).set({ deletesAt }).where(eq(workspaces.id, id))
}

/** Ids of the workspaces whose deletion is due. */
export async function workspacesDue(db: Db, now: Date): Promise<string[]> {
  const rows = await db.select({ id: workspaces.id }).from(workspaces).where(lte(workspaces.deletesAt, now))
  return rows.map(({ id }) => id)
}

export async function findWorkspace(db: Db, id: string) {
  return (await db.select().from(workspaces).where(eq(workspaces.id, id)))[0]
}

/** The only workspace's name, for the sign-in page; null when there are several or none. */
export async function onlyWorkspaceName(db: Db): Promise<string | null> {
  const rows = await db.select({ name: workspaces.name }).from(workspaces).limit(2)
  return rows.length === 1 ? rows[0]!.name : null
}

export async function insertMembership(
  db: Db,
  membership: { workspaceId: string; userId: string; roles: Role[]; createdAt: Date },
): Promise<void> {
  await db.insert(memberships).values(membership)
}

export async function findRoles(db: Db, workspaceId: string, userId: string): Promise<Role[] | undefined> {
  const rows = await db
    .select({ roles: memberships.roles })
    .from(memberships)
    .where(and(eq(memberships.workspaceId, workspaceId), eq(memberships.userId, userId)))
  return rows[0]?.roles
}

export async function updateRoles(tx: Db, workspaceId: string, userId: string, roles: Role[]): Promise<void> {
  await tx
    .update(memberships)
    .set({ roles })
    .where(and(eq(memberships.workspaceId, workspaceId), eq(memberships.userId, userId)))
}

export async function deleteMembership(tx: Db, workspaceId: string, userId: string): Promise<void> {
  await tx.delete(memberships).where(and(eq(memberships.workspaceId, workspaceId), eq(memberships.userId, userId)))
}

/** Waits for whoever else changes its members, and makes others wait until the transaction ends. */
export async function lockWorkspace(tx: Db, id: string): Promise<void> {
  await tx.select({ id: workspaces.id }).from(workspaces).where(eq(workspaces.id, id)).for('update')
}

/** The workspace that a person joined first. */
export async function firstWorkspaceOf(db: Db, userId: string): Promise<string | undefined> {
  const rows = await db
    .select({ id: memberships.workspaceId })
    .from(memberships)
    .where(eq(memberships.userId, userId))
    .orderBy(asc(memberships.createdAt))
    .limit(1)
  return rows[0]?.id
}

/** Workspaces of a person, by name. */
export async function listWorkspacesOf(db: Db, userId: string): Promise<{ id: string; name: string }[]> {
  return db
    .select({ id: workspaces.id, name: workspaces.name })
    .from(memberships)
    .innerJoin(workspaces, eq(workspaces.id, memberships.workspaceId))
    .where(eq(memberships.userId, userId))
    .orderBy(asc(workspaces.name), asc(workspaces.createdAt))
}

export async function countWorkspacesOf(db: Db, userId: string): Promise<number> {
  return (await db.select({ n: count() }).from(memberships).where(eq(memberships.userId, userId)))[0]!.n
}

/** Members of a workspace by name. */
export const listMembers = (db: Db, workspaceId: string) =>
  db
    .select({
      id: users.id,
      name: users.name,
      email: accountEmail,
      roles: memberships.roles,
      since: memberships.createdAt,
    })
    .from(memberships)
    .innerJoin(users, eq(users.id, memberships.userId))
    .where(eq(memberships.workspaceId, workspaceId))
    .orderBy(asc(users.name), asc(users.id))

/** Who people are, members or not. */
export async function namesOf(db: Db, ids: readonly string[]) {
  if (ids.length === 0) return []
  return db
    .select({ id: users.id, name: users.name, email: users.email })
    .from(users)
    .where(inArray(users.id, [...ids]))
    .orderBy(asc(users.name), asc(users.id))
}

/** How many of each there are, for the rail. */
export async function countThings(db: Db, workspaceId: string) {
  const counted = async (query: Promise<{ n: number }[]>): Promise<number> => (await query)[0]!.n
  return {
    problems: await counted(
      db
        .select({ n: count() })
        .from(problems)
        .where(and(eq(problems.workspaceId, workspaceId), isNull(problems.deletedWith))),
    ),
    machines: await counted(db.select({ n: count() }).from(machines).where(eq(machines.workspaceId, workspaceId))),
    runSheets: await counted(
      db
        .select({ n: count() })
        .from(runSheets)
        .where(and(eq(runSheets.workspaceId, workspaceId), isNull(runSheets.deletedWith))),
    ),
    people: await counted(db.select({ n: count() }).from(memberships).where(eq(memberships.workspaceId, workspaceId))),
  }
}

export async function readFact(db: Db, key: string): Promise<string | undefined> {
  return (await db.select().from(installation).where(eq(installation.key, key)))[0]?.value
}

/** Keeps the first value written for a key, whoever writes it, and answers it. */
export async function keepFact(db: Db, key: string, value: string): Promise<string> {
  await db.insert(installation).values({ key, value }).onConflictDoNothing()
  return (await readFact(db, key))!
}

/** Removes a fact; false when another had already done so. */
export async function takeFact(db: Db, key: string): Promise<boolean> {
  return (
    (await db.delete(installation).where(eq(installation.key, key)).returning({ key: installation.key })).length === 1
  )
}

export async function setFact(db: Db, key: string, value: string): Promise<void> {
  await db.insert(installation).values({ key, value }).onConflictDoUpdate({ target: installation.key, set: { value } })
}
