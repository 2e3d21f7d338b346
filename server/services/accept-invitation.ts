import { DomainError } from '../../shared/errors'
import type { Accept, InvitedView } from '../../shared/schemas/invitations'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import type { InvitationRow } from '../database/repositories/invitations'
import { holdInvitation, updateInvitation } from '../database/repositories/invitations'
import { findRoles, findUser, findUserByEmail, insertMembership } from '../database/repositories/people'
import { setSessionWorkspace } from '../database/repositories/sessions'
import { endConfirmations } from './confirmations'
import { requireGoodPassword } from './password-rules'
import type { Passwords } from './people'
import { createAccount } from './people'
import { secretHash } from './secrets'
import { requirePassword } from './sign-in'
import { joinArchivedPerson } from './workspace-import'

/** The same for a link that is unknown, has expired, was used or taken back. */
export async function openInvitation(app: App, tx: Db, secret: string) {
  const found = await holdInvitation(tx, secretHash(secret))
  if (found && found.invitation.expiresAt > app.now()) return found
  throw new DomainError(
    'not found',
    'invitation.gone',
    'This link leads to no open invitation. It may be older than seven days, used already, or replaced by a newer one. Ask whoever invited you to send it again.',
  )
}

/** What an invitation is for, for whoever holds its link. */
export async function invitedView(app: App, secret: string): Promise<InvitedView> {
  return app.db.transaction(async (tx) => {
    const { invitation, workspace } = await openInvitation(app, tx, secret)
    const { email, roles, expiresAt } = invitation
    const hasAccount = (await findUserByEmail(tx, email)) !== undefined
    return { workspace, email, roles, hasAccount, expiresAt: expiresAt.toISOString() }
  })
}

/**
 * Joins the workspace: with the password of the account that the address has, or with a new account.
 * @param network address that the attempt comes from
 * @returns whom to sign in and where
 */
export async function acceptInvitation(
  app: App,
  passwords: Passwords,
  secret: string,
  { name, password }: Accept,
  network: string,
): Promise<Actor> {
  const { email, hasAccount } = await invitedView(app, secret)
  if (hasAccount) {
    const user = await requirePassword(app, passwords, { email, password }, network)
    return app.db.transaction(async (tx) => {
      const { invitation } = await openInvitation(app, tx, secret)
      return acceptAs(app, tx, invitation, user.id)
    })
  }
  if (!name)
    throw new DomainError('not acceptable', 'invitation.name', 'Give your name.', [
      { path: 'name', message: 'give your name' },
    ])
  requireGoodPassword(password, { name, email })
  const passwordHash = await passwords.hash(password)
  return app.db.transaction(async (tx) => {
    const { invitation } = await openInvitation(app, tx, secret)
    const { workspaceId, roles } = invitation
    if (await findUserByEmail(tx, email))
      throw new DomainError(
        'wrong state',
        'invitation.account',
        'This address has an account by now. Load the page again and give its password.',
      )
    const userId = await createAccount(app, tx, { name, email, passwordHash, workspaceId, roles })
    await settle(app, tx, invitation, userId)
    return { userId, workspaceId }
  })
}

/**
 * Joins as whoever is signed in, whose address it has to be, and goes to the workspace: somebody who signs in by passkey
 * or provider alone has no password to give.
 */
export async function acceptSignedIn(
  app: App,
  { userId, sessionId }: { userId: string; sessionId: string },
  secret: string,
): Promise<Actor> {
  return app.db.transaction(async (tx) => {
    const { invitation } = await openInvitation(app, tx, secret)
    const user = await findUser(tx, userId)
    if (user?.email !== invitation.email)
      throw new DomainError(
        'forbidden',
        'invitation.address',
        `The invitation is for ${invitation.email}, and you are signed in with another address. Sign out and open its link again.`,
      )
    const joined = await acceptAs(app, tx, invitation, userId)
    await setSessionWorkspace(tx, sessionId, joined.workspaceId)
    return joined
  })
}

/** Joins with an account that there is. */
export async function acceptAs(app: App, tx: Db, invitation: InvitationRow, userId: string): Promise<Actor> {
  const { workspaceId, roles } = invitation
  // A link for a new password may be in the hands of an owner elsewhere, who must not get in here with it.
  await endConfirmations(app, tx, userId)
  if (!(await findRoles(tx, workspaceId, userId)))
    await insertMembership(tx, { workspaceId, userId, roles, createdAt: app.now() })
  await settle(app, tx, invitation, userId)
  return { userId, workspaceId }
}

/** Notes that it was accepted, and by whom; what the archive of the workspace tells of the address is theirs. */
export async function settle(
  app: App,
  tx: Db,
  { id, workspaceId, email }: InvitationRow,
  userId: string,
): Promise<void> {
  await updateInvitation(tx, id, { acceptedBy: userId, acceptedAt: app.now() })
  await joinArchivedPerson(tx, { workspaceId, email, userId })
}
