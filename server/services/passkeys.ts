import { randomUUID } from 'node:crypto'
import { generateRegistrationOptions } from '@simplewebauthn/server'
import { DomainError } from '../../shared/errors'
import type { NewPasskey, PasskeyChallenge, PasskeysView, Proof } from '../../shared/schemas/passkeys'
import type { App } from '../app'
import type { PasskeyRow } from '../database/repositories/passkeys'
import {
  deletePasskey,
  findPasskey,
  insertPasskey,
  listPasskeys,
  renamePasskeyRow,
} from '../database/repositories/passkeys'
import { findUser } from '../database/repositories/people'
import { signInChangedLetter } from '../mail/account-letters'
import { openChallenge, takeChallenge } from './challenges'
import { writePrivately } from './mail'
import type { OwnChange } from './own-account'
import type { Site } from './passkey-checks'
import { checkNewPasskey } from './passkey-checks'
import type { Passwords } from './people'
import { requireProof } from './proofs'
import { requireWayIn } from './ways-in'

const MOST = 20

/** Passkeys of a person, and whether there is a password beside them. */
export async function passkeysOf(app: App, userId: string): Promise<PasskeysView> {
  const user = await findUser(app.db, userId)
  const items = (await listPasskeys(app.db, userId)).map(viewOf)
  return { items, nextCursor: null, hasPassword: Boolean(user?.passwordHash) }
}

const viewOf = ({ id, name, backedUp, createdAt, usedAt }: PasskeyRow) => ({
  ...{ id, name, backedUp },
  createdAt: createdAt.toISOString(),
  usedAt: usedAt?.toISOString() ?? null,
})

/** What a browser needs to make a passkey, for whoever proved who they are. */
export async function beginPasskey(
  app: App,
  passwords: Passwords,
  own: OwnChange,
  proof: Proof,
  site: Site,
): Promise<PasskeyChallenge> {
  const { id: userId, email, name } = await requireProof(app, passwords, own, proof, site)
  const held = await listPasskeys(app.db, userId)
  if (held.length >= MOST)
    throw new DomainError('wrong state', 'passkey.many', `An account has at most ${MOST} passkeys. Remove one first.`)
  const options = await generateRegistrationOptions({
    ...{ rpName: 'Espalier', rpID: site.hostname, userName: email, userDisplayName: name },
    userID: new TextEncoder().encode(userId),
    attestationType: 'none',
    excludeCredentials: held.map(({ credentialId }) => ({ id: credentialId })),
    authenticatorSelection: { residentKey: 'required', userVerification: 'required' },
  })
  const challengeId = await openChallenge(app, { purpose: 'passkey made', userId, challenge: options.challenge })
  return { challengeId, options }
}

/** Keeps the passkey that a browser made. @returns its id */
export async function addPasskey(app: App, userId: string, input: NewPasskey, site: Site): Promise<{ id: string }> {
  const asked = await takeChallenge(app, 'passkey made', input.challengeId)
  if (asked.userId !== userId)
    throw new DomainError('forbidden', 'challenge.other', 'This was begun by somebody else. Begin again.')
  const made = await checkNewPasskey(site, asked.challenge, input)
  const id = randomUUID()
  await app.db.transaction(async (tx) => {
    if (await findPasskey(tx, made.credentialId))
      throw new DomainError('wrong state', 'passkey.known', 'This passkey is known here already.')
    await insertPasskey(tx, { ...{ id, userId, name: input.name, createdAt: app.now(), usedAt: null }, ...made })
    const user = (await findUser(tx, userId))!
    const letter = signInChangedLetter(`the passkey ${input.name} was added`)
    await writePrivately(app, tx, { userId, address: user.email }, letter)
  })
  return { id }
}

const missing = (): DomainError => new DomainError('not found', 'passkey.missing', 'You have no such passkey.')

export async function renamePasskey(app: App, userId: string, id: string, name: string): Promise<void> {
  if (!(await renamePasskeyRow(app.db, userId, id, name))) throw missing()
}

/** Removes a passkey: it opens nothing from then on. The last one stays where nothing else opens the account. */
export async function removePasskey(app: App, userId: string, id: string): Promise<void> {
  await app.db.transaction(async (tx) => {
    const removed = await deletePasskey(tx, userId, id)
    if (!removed) throw missing()
    await requireWayIn(app, tx, userId)
    const user = (await findUser(tx, userId))!
    const letter = signInChangedLetter(`the passkey ${removed.name} was removed`)
    await writePrivately(app, tx, { userId, address: user.email }, letter)
  })
}
