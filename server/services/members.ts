import { DomainError } from '../../shared/errors'
import type { Role } from '../../shared/schemas/common'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import { holdersOf } from '../database/repositories/mails'
import { deleteNewsOf } from '../database/repositories/news'
import {
  deleteMembership,
  findRoles,
  firstWorkspaceOf,
  lockWorkspace,
  updateRoles,
} from '../database/repositories/people'
import { deleteSessionsIn, moveSessions } from '../database/repositories/sessions'
import { endStandInsOf } from '../database/repositories/stand-ins'
import { deleteTokensOf } from '../database/repositories/tokens'

/**
 * Works on the members of a workspace one change at a time, so that each sees the owners that those before it left.
 * @throws DomainError forbidden for somebody who is no owner any more
 */
function asOwner<T>(app: App, { workspaceId, userId }: Actor, work: (tx: Db) => Promise<T>): Promise<T> {
  return app.db.transaction(async (tx) => {
    await lockWorkspace(tx, workspaceId)
    if (!(await findRoles(tx, workspaceId, userId))?.includes('owner'))
      throw new DomainError('forbidden', 'role.missing', 'This needs the role owner, which you no longer hold.')
    return work(tx)
  })
}

async function requireMember(tx: Db, { workspaceId }: Actor, memberId: string): Promise<void> {
  if (!(await findRoles(tx, workspaceId, memberId)))
    throw new DomainError('not found', 'member.missing', 'There is no such member of this workspace.')
}

async function requireAnotherOwner(tx: Db, workspaceId: string, memberId: string): Promise<void> {
  const owners = await holdersOf(tx, workspaceId, 'owner')
  if (owners.some((id) => id !== memberId)) return
  throw new DomainError(
    'wrong state',
    'member.last-owner',
    'A workspace needs an owner, and there is no other. Make somebody else an owner first.',
  )
}

/** Gives a member other roles, from their next request on. The last owner stays one. */
export async function changeRoles(app: App, actor: Actor, memberId: string, roles: Role[]): Promise<void> {
  await asOwner(app, actor, async (tx) => {
    await requireMember(tx, actor, memberId)
    if (!roles.includes('owner')) await requireAnotherOwner(tx, actor.workspaceId, memberId)
    await updateRoles(tx, actor.workspaceId, memberId, roles)
    if (!roles.includes('reviewer'))
      await endStandInsOf(tx, actor.workspaceId, memberId, { now: app.now(), asEither: false })
  })
}

/**
 * Their sessions go on in another workspace of theirs, or end; their tokens for this one end, which would open the workspace
 * again if they came back, and so do reviews that they handed over or that were handed to them. Their news of it goes.
 */
async function remove(app: App, tx: Db, workspaceId: string, userId: string): Promise<void> {
  await requireAnotherOwner(tx, workspaceId, userId)
  await deleteMembership(tx, workspaceId, userId)
  await deleteTokensOf(tx, workspaceId, userId)
  await deleteNewsOf(tx, { workspaceId, userId })
  await endStandInsOf(tx, workspaceId, userId, { now: app.now(), asEither: true })
  const next = await firstWorkspaceOf(tx, userId)
  if (next) await moveSessions(tx, userId, workspaceId, next)
  else await deleteSessionsIn(tx, workspaceId, userId)
}

/** Takes a member out of the workspace; what they made stays. */
export async function removeMember(app: App, actor: Actor, memberId: string): Promise<void> {
  await asOwner(app, actor, async (tx) => {
    await requireMember(tx, actor, memberId)
    await remove(app, tx, actor.workspaceId, memberId)
  })
}

/** Leaves the workspace; the last owner cannot. */
export async function leaveWorkspace(app: App, { workspaceId, userId }: Actor): Promise<void> {
  await app.db.transaction(async (tx) => {
    await lockWorkspace(tx, workspaceId)
    await remove(app, tx, workspaceId, userId)
  })
}
