import { randomUUID } from 'node:crypto'
import { DomainError } from '../../shared/errors'
import type { Proof } from '../../shared/schemas/passkeys'
import type { App } from '../app'
import type { Db } from '../database/client'
import { insertAuditEntry } from '../database/repositories/audit'
import { holdersOf } from '../database/repositories/mails'
import { findUser, findWorkspace, listMembers, listWorkspacesOf, lockWorkspace } from '../database/repositories/people'
import { deleteOwnRows, takeNameOut } from '../database/repositories/person-removal'
import type { OwnChange } from './own-account'
import type { Site } from './passkey-checks'
import type { Passwords } from './people'
import { requireProof } from './proofs'
import { signInAttempts } from './sign-in'

/** What is left of a name: the same in every place, so that the trail still tells one person from another. */
export const formerName = (userId: string): string => `Former member ${userId.replaceAll('-', '').slice(0, 6)}`

/**
 * Ends an account: what belongs to the person alone is deleted, and their name and addresses are taken out of all that
 * stays. What they made, reviewed and decided stays under a name that says only that it was one and the same person.
 */
export async function removeAccount(tx: Db, userId: string): Promise<void> {
  const user = await findUser(tx, userId)
  await deleteOwnRows(tx, userId)
  if (!user) return
  const name = formerName(userId)
  await takeNameOut(tx, { id: userId, email: user.email, name, attemptKeys: [signInAttempts(user.email)] })
}

const removalEntry = (app: App, workspaceId: string, userId: string) => ({
  ...{ id: randomUUID(), workspaceId, at: app.now(), by: userId, token: null, address: '' },
  ...{ what: 'removed their own account', kind: 'person' as const, thingId: null, thing: '' },
})

/** A workspace whose only owner one is needs another first, unless nobody else is in it and it is to be deleted. */
async function requireNoOrphan(tx: Db, workspaceId: string, userId: string): Promise<void> {
  await lockWorkspace(tx, workspaceId)
  const owners = await holdersOf(tx, workspaceId, 'owner')
  if (!owners.includes(userId) || owners.length > 1) return
  const [workspace, members] = [(await findWorkspace(tx, workspaceId))!, await listMembers(tx, workspaceId)]
  if (members.length === 1 && workspace.deletesAt) return
  const remedy =
    members.length === 1
      ? 'Nobody else is in it: ask for its deletion first, on its page under People.'
      : 'Make somebody else an owner there first.'
  throw new DomainError('wrong state', 'account.last-owner', `You are the only owner of ${workspace.name}. ${remedy}`)
}

/** Removes one’s own account, everywhere and for good. @throws DomainError as `requireProof`, or for an only owner */
export async function removeOwnAccount(
  app: App,
  passwords: Passwords,
  own: OwnChange,
  proof: Proof,
  site: Site,
): Promise<void> {
  const { id: userId } = await requireProof(app, passwords, own, proof, site)
  await app.db.transaction(async (tx) => {
    // In one order for all, so that two who leave the same workspaces do not wait for each other.
    const ids = (await listWorkspacesOf(tx, userId)).map(({ id }) => id).sort()
    for (const id of ids) await requireNoOrphan(tx, id, userId)
    for (const workspaceId of ids) await insertAuditEntry(tx, removalEntry(app, workspaceId, userId))
    await removeAccount(tx, userId)
  })
}
