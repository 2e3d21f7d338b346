import { randomUUID } from 'node:crypto'
import { DomainError } from '../../shared/errors'
import type { Page, PageQuery } from '../../shared/schemas/common'
import type { InvitationView, Invite, MadeInvitation } from '../../shared/schemas/invitations'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import type { InvitationRow } from '../database/repositories/invitations'
import {
  findOpenInvitation,
  insertInvitation,
  listInvitations,
  updateInvitation,
} from '../database/repositories/invitations'
import { readPage } from '../database/repositories/pages'
import { findRoles, findUser, findUserByEmail, findWorkspace } from '../database/repositories/people'
import { invitationLetter } from '../mail/letters'
import { countAttempt } from './attempts'
import { writeSecretLink } from './mail'
import { newSecret } from './secrets'

const OPEN_MS = 7 * 24 * 60 * 60 * 1000
/** So that nobody fills the boxes of strangers. */
const PER_WORKSPACE = { most: 60, withinMinutes: 60 }

const endFrom = (now: Date): Date => new Date(now.getTime() + OPEN_MS)

/** Writes the link to the address. @returns the link where no mail is sent */
async function send(app: App, tx: Db, { workspaceId, userId }: Actor, row: InvitationRow, secret: string) {
  const [workspace, inviter] = [await findWorkspace(tx, workspaceId), await findUser(tx, userId)]
  const letter = invitationLetter(workspace?.name ?? '', inviter?.name ?? '', row.roles, `/invitations/${secret}`)
  return writeSecretLink(app, tx, { userId: null, address: row.email }, letter)
}

/**
 * Asks an address into the workspace, with the roles it will have there.
 * @throws DomainError when it belongs to a member, has an open invitation, or too many were sent
 */
export async function invite(app: App, actor: Actor, { email, roles }: Invite): Promise<MadeInvitation> {
  await countAttempt(app, `invite ${actor.workspaceId}`, PER_WORKSPACE)
  return app.db.transaction(async (tx) => {
    const user = await findUserByEmail(tx, email)
    if (user && (await findRoles(tx, actor.workspaceId, user.id)))
      throw new DomainError('wrong state', 'invitation.member', `${email} belongs to a member of this workspace.`)
    if (await findOpenInvitation(tx, actor.workspaceId, { email }))
      throw new DomainError(
        'wrong state',
        'invitation.open',
        `${email} was invited already. Send that invitation again, or withdraw it first.`,
      )
    const now = app.now()
    const { secret, tokenHash } = newSecret()
    const row: InvitationRow = {
      ...{ id: randomUUID(), workspaceId: actor.workspaceId, email, roles, tokenHash, invitedBy: actor.userId },
      ...{ createdAt: now, expiresAt: endFrom(now), acceptedBy: null, acceptedAt: null, withdrawnAt: null },
    }
    await insertInvitation(tx, row)
    return { id: row.id, link: await send(app, tx, actor, row, secret) }
  })
}

/** Invitations that are open or have expired, newest first. */
export function invitationsOf(app: App, { workspaceId }: Actor, query: PageQuery): Promise<Page<InvitationView>> {
  return readPage(
    query,
    (place) => listInvitations(app.db, workspaceId, place),
    ({ invitation, by }) => ({
      id: invitation.id,
      email: invitation.email,
      roles: invitation.roles,
      by,
      createdAt: invitation.createdAt.toISOString(),
      expiresAt: invitation.expiresAt.toISOString(),
      hasExpired: invitation.expiresAt <= app.now(),
    }),
  )
}

async function requireInvitation(db: Db, actor: Actor, id: string): Promise<InvitationRow> {
  const row = await findOpenInvitation(db, actor.workspaceId, { id })
  if (row) return row
  throw new DomainError('not found', 'invitation.missing', 'There is no such open invitation.')
}

/** Sends an invitation again with a new link and another week; the link sent before is worth nothing from then on. */
export async function resendInvitation(app: App, actor: Actor, id: string): Promise<MadeInvitation> {
  await countAttempt(app, `invite ${actor.workspaceId}`, PER_WORKSPACE)
  return app.db.transaction(async (tx) => {
    const row = await requireInvitation(tx, actor, id)
    const { secret, tokenHash } = newSecret()
    await updateInvitation(tx, id, { tokenHash, expiresAt: endFrom(app.now()) })
    return { id, link: await send(app, tx, actor, row, secret) }
  })
}

/** Takes an invitation back: its link leads nowhere from then on. */
export async function withdrawInvitation(app: App, actor: Actor, id: string): Promise<void> {
  await requireInvitation(app.db, actor, id)
  await updateInvitation(app.db, id, { withdrawnAt: app.now() })
}
