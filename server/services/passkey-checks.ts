import {
  generateAuthenticationOptions,
  verifyAuthenticationResponse,
  verifyRegistrationResponse,
} from '@simplewebauthn/server'
import { DomainError } from '../../shared/errors'
import type { NewPasskey, PasskeyChallenge, UsedPasskey } from '../../shared/schemas/passkeys'
import type { App } from '../app'
import { deleteAttempts, takeAttemptBack } from '../database/repositories/attempts'
import type { PasskeyRow } from '../database/repositories/passkeys'
import { findPasskey, notePasskeyUse } from '../database/repositories/passkeys'
import type { UserRow } from '../database/repositories/people'
import { countAttempt } from './attempts'
import { openChallenge, takeChallenge } from './challenges'
import { PER_ADDRESS, PER_NETWORK, networkAttempts } from './sign-in'

/** Where the product is reached: passkeys are made for its name alone, and answer to nobody else. */
export interface Site {
  /** Of the product, without a slash at its end; the origin with the path under which it is reached. */
  address: string
  /** Such as `https://espalier.example`. */
  origin: string
  hostname: string
}

const refused = (): DomainError =>
  new DomainError(
    'unauthenticated',
    'session.passkey',
    'This passkey opens no account here. Choose another one, or sign in with your password.',
  )

/** Asks for any passkey of this site that its authenticator knows: nobody has to say who they are. */
export async function askPasskey(app: App, site: Site, network: string): Promise<PasskeyChallenge> {
  await countAttempt(app, `passkey asked from ${network}`, PER_NETWORK)
  const options = await generateAuthenticationOptions({ rpID: site.hostname, userVerification: 'required' })
  const challengeId = await openChallenge(app, {
    ...{ purpose: 'passkey used', userId: null, challenge: options.challenge },
  })
  return { challengeId, options }
}

/**
 * Whose passkey answered. Counted like an attempt with a password.
 * @param network address that the attempt comes from
 * @throws DomainError unauthenticated, whatever was wrong with it; `too many` after ten attempts that failed
 */
export async function requirePasskey(app: App, site: Site, used: UsedPasskey, network: string): Promise<UserRow> {
  const keys = { passkey: `sign-in passkey ${used.credential.id}`, network: networkAttempts(network) }
  await countAttempt(app, keys.network, PER_NETWORK)
  await countAttempt(app, keys.passkey, PER_ADDRESS)
  const { challenge } = await takeChallenge(app, 'passkey used', used.challengeId)
  const found = await findPasskey(app.db, used.credential.id)
  if (!found || !(await answers(app, site, { challenge, passkey: found.passkey }, used))) throw refused()
  await deleteAttempts(app.db, keys.passkey)
  await takeAttemptBack(app.db, keys.network)
  return found.user
}

/** Whether a passkey signed what was asked; its counter has to have gone up, or it may be a copy. */
async function answers(
  app: App,
  site: Site,
  { challenge, passkey }: { challenge: string; passkey: PasskeyRow },
  { credential }: UsedPasskey,
): Promise<boolean> {
  const { userHandle } = credential.response
  if (userHandle && Buffer.from(userHandle, 'base64url').toString() !== passkey.userId) return false
  const verification = await verifyAuthenticationResponse({
    response: {
      ...credential,
      response: { ...credential.response, userHandle: userHandle ?? undefined },
      clientExtensionResults: {},
    },
    expectedChallenge: challenge,
    expectedOrigin: site.origin,
    expectedRPID: site.hostname,
    requireUserVerification: true,
    credential: {
      id: passkey.credentialId,
      publicKey: new Uint8Array(Buffer.from(passkey.publicKey, 'base64url')),
      counter: passkey.counter,
    },
  }).catch(() => null)
  if (!verification?.verified) return false
  const { newCounter: counter, credentialBackedUp: backedUp } = verification.authenticationInfo
  return notePasskeyUse(app.db, passkey, { counter, backedUp, usedAt: app.now() })
}

/**
 * What is to be kept of a passkey that was made.
 * @throws DomainError not acceptable
 */
export async function checkNewPasskey(site: Site, challenge: string, { credential }: NewPasskey) {
  const { transports, ...response } = credential.response
  const made = await verifyRegistrationResponse({
    response: { ...credential, response, clientExtensionResults: {} },
    expectedChallenge: challenge,
    expectedOrigin: site.origin,
    expectedRPID: site.hostname,
    requireUserVerification: true,
  }).catch(() => null)
  if (!made?.verified)
    throw new DomainError(
      'not acceptable',
      'passkey.unreadable',
      'This passkey cannot be taken: it was not made for this site, or without asking who you are. Begin again.',
    )
  const { credential: key, credentialBackedUp: backedUp } = made.registrationInfo
  const publicKey = Buffer.from(key.publicKey).toString('base64url')
  return { credentialId: key.id, publicKey, counter: key.counter, backedUp, transports }
}
