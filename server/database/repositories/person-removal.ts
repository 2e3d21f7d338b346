import { and, eq, inArray, is, or, sql } from 'drizzle-orm'
import type { PgColumn, PgTable } from 'drizzle-orm/pg-core'
import { getTableConfig, PgTable as Table } from 'drizzle-orm/pg-core'
import type { Db } from '../client'
import * as schema from '../schema'
import { archivedPeople, attempts, auditEntries, invitations, mails, memberships, users } from '../schema'

/** Columns by which rows belong to a person, and go with their account: memberships, sessions, tokens and so on. */
function ownColumns(): { table: PgTable; column: PgColumn }[] {
  const tables = Object.values(schema).filter((one): one is typeof one & PgTable => is(one, Table))
  return tables.flatMap((table: PgTable) =>
    getTableConfig(table).foreignKeys.flatMap((key) => {
      const { columns, foreignTable } = key.reference()
      return foreignTable === users && key.onDelete === 'cascade' ? [{ table, column: columns[0]! }] : []
    }),
  )
}

/** Deletes all that belongs to a person alone. */
export async function deleteOwnRows(tx: Db, userId: string): Promise<void> {
  for (const { table, column } of ownColumns()) await tx.delete(table).where(eq(column, userId))
}

/** Takes a person's name and addresses out of everything that keeps them in words of its own. */
export async function takeNameOut(
  tx: Db,
  { id, email, name, attemptKeys }: { id: string; email: string; name: string; attemptKeys: readonly string[] },
): Promise<void> {
  await tx.delete(mails).where(or(eq(mails.toUserId, id), eq(mails.toAddress, email)))
  await tx.delete(invitations).where(eq(invitations.email, email))
  await tx.delete(attempts).where(inArray(attempts.key, [...attemptKeys]))
  // Entries of the trail are only ever added to, but for this: see the trigger in the migrations.
  await tx.execute(sql`set local espalier.removing_person = 'on'`)
  await tx.update(auditEntries).set({ address: '' }).where(eq(auditEntries.by, id))
  await tx
    .update(auditEntries)
    .set({ thing: name })
    .where(and(eq(auditEntries.kind, 'person'), eq(auditEntries.thingId, id)))
  await tx
    .update(auditEntries)
    .set({ thing: name })
    .where(and(eq(auditEntries.kind, 'invitation'), eq(auditEntries.thing, email)))
  await tx.execute(sql`set local espalier.removing_person = 'off'`)
  await tx.update(users).set({ name, email: null, passwordHash: null }).where(eq(users.id, id))
}

/** Deletes a person to whom nothing refers any more; false where something does. */
export async function deleteUnreferred(tx: Db, userId: string): Promise<boolean> {
  try {
    await tx.transaction((inner) => inner.delete(users).where(eq(users.id, userId)))
    return true
  } catch {
    return false
  }
}

/** Ids of the members, and of those that only the archive of the workspace told of. */
export async function peopleOfWorkspace(tx: Db, workspaceId: string) {
  const members = await tx
    .select({ id: memberships.userId })
    .from(memberships)
    .where(eq(memberships.workspaceId, workspaceId))
  const archived = await tx
    .select({ id: archivedPeople.userId })
    .from(archivedPeople)
    .where(eq(archivedPeople.workspaceId, workspaceId))
  return { members: members.map(({ id }) => id), archived: archived.map(({ id }) => id) }
}
