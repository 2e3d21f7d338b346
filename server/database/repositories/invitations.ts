import { and, desc, eq, gt, isNull } from 'drizzle-orm'
import type { Db } from '../client'
import { invitations, users, workspaces } from '../schema'
import type { Place } from './pages'

export type InvitationRow = typeof invitations.$inferSelect

export async function insertInvitation(tx: Db, row: InvitationRow): Promise<void> {
  await tx.insert(invitations).values(row)
}

const isOpen = and(isNull(invitations.acceptedAt), isNull(invitations.withdrawnAt))

/** Invitations that were neither accepted nor withdrawn, expired ones among them, newest first, with who invited. */
export async function listInvitations(db: Db, workspaceId: string, { limit, offset }: Place) {
  return db
    .select({ invitation: invitations, by: users.name })
    .from(invitations)
    .leftJoin(users, eq(users.id, invitations.invitedBy))
    .where(and(eq(invitations.workspaceId, workspaceId), isOpen))
    .orderBy(desc(invitations.createdAt), invitations.id)
    .limit(limit)
    .offset(offset)
}

/** An open invitation of a workspace, by what is known of it. */
export async function findOpenInvitation(
  db: Db,
  workspaceId: string,
  by: { id: string } | { email: string },
): Promise<InvitationRow | undefined> {
  const which = 'id' in by ? eq(invitations.id, by.id) : eq(invitations.email, by.email)
  return (
    await db
      .select()
      .from(invitations)
      .where(and(eq(invitations.workspaceId, workspaceId), which, isOpen))
  )[0]
}

/** An open invitation by the hash of its secret, with the names of the workspace and of who invited; held until the transaction ends. */
export async function holdInvitation(tx: Db, tokenHash: string) {
  const rows = await tx
    .select({ invitation: invitations, workspace: workspaces.name })
    .from(invitations)
    .innerJoin(workspaces, eq(workspaces.id, invitations.workspaceId))
    .where(and(eq(invitations.tokenHash, tokenHash), isOpen))
    .for('update', { of: invitations })
  return rows[0]
}

export async function updateInvitation(db: Db, id: string, set: Partial<InvitationRow>): Promise<void> {
  await db.update(invitations).set(set).where(eq(invitations.id, id))
}

/** The newest invitation to an address that is open and has not expired, of any workspace; held until the transaction ends. */
export async function findOpenInvitationTo(tx: Db, email: string, now: Date): Promise<InvitationRow | undefined> {
  const rows = await tx
    .select()
    .from(invitations)
    .where(and(eq(invitations.email, email), isOpen, gt(invitations.expiresAt, now)))
    .orderBy(desc(invitations.createdAt))
    .limit(1)
    .for('update')
  return rows[0]
}
