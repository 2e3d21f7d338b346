import type { SignIn } from '../../shared/audit'
import { SIGN_INS } from '../../shared/audit'
import type { Actor, App } from '../app'
import { findPasskey } from '../database/repositories/passkeys'
import { findUserByEmail, firstWorkspaceOf } from '../database/repositories/people'
import { record } from './audit'

/**
 * Writes into the audit trail that somebody signed in or out, or was refused.
 * @param address of the network that it came from
 */
export async function noteSignIn(app: App, actor: Actor, how: SignIn, address: string): Promise<void> {
  const deed = SIGN_INS[how]
  try {
    await record(app, actor, { deed, thingId: null, known: undefined, tokenId: null, address })
  } catch (error) {
    // Nobody is kept from signing in or out because it cannot be written down.
    console.error(`audit trail: ${error instanceof Error ? error.message : String(error)}`)
  }
}

/** Told in the workspace that signing in would open; of somebody unknown it is told nowhere. */
async function noteOutside(app: App, userId: string | undefined, how: SignIn, address: string): Promise<void> {
  const workspaceId = userId && (await firstWorkspaceOf(app.db, userId))
  if (workspaceId) await noteSignIn(app, { userId, workspaceId }, how, address)
}

export const noteRefusedPassword = async (app: App, email: string, address: string): Promise<void> =>
  noteOutside(app, (await findUserByEmail(app.db, email))?.id, 'wrong password', address)

export const noteNewPassword = (app: App, userId: string, address: string): Promise<void> =>
  noteOutside(app, userId, 'new password', address)

export const noteRefusedPasskey = async (app: App, credentialId: string, address: string): Promise<void> =>
  noteOutside(app, (await findPasskey(app.db, credentialId))?.user.id, 'wrong passkey', address)
