import { randomUUID } from 'node:crypto'
import { DomainError } from '../../shared/errors'
import type { Actor, App } from '../app'
import { deleteAttempts, takeAttemptBack } from '../database/repositories/attempts'
import type { UserRow } from '../database/repositories/people'
import { findUser, findUserByEmail, firstWorkspaceOf } from '../database/repositories/people'
import { countAttempt } from './attempts'
import type { Passwords } from './people'
import { noteRefusedPassword } from './sign-in-trail'

export const PER_ADDRESS = { most: 10, withinMinutes: 15 }
/** More, as a whole office may come from one address of the network. */
export const PER_NETWORK = { most: 60, withinMinutes: 15 }

/** What attempts at an address are counted under. */
export const signInAttempts = (email: string): string => `sign-in ${email}`
export const networkAttempts = (network: string): string => `sign-in from ${network}`

let decoy: Promise<string> | undefined
const decoyHash = (passwords: Passwords): Promise<string> => (decoy ??= passwords.hash(randomUUID()))

export interface Credentials {
  email: string
  password: string
}

/**
 * Whose e-mail and password these are. The refusal does not say which of the two was wrong, takes as long, and comes after
 * as many attempts, whether there is such an account or not.
 * @param network address that the attempt comes from
 * @throws DomainError unauthenticated, or `too many` after ten attempts that failed
 */
export async function requirePassword(
  app: App,
  passwords: Passwords,
  { email, password }: Credentials,
  network: string,
): Promise<UserRow> {
  const keys = { address: signInAttempts(email), network: networkAttempts(network) }
  await countAttempt(app, keys.network, PER_NETWORK)
  await countAttempt(app, keys.address, PER_ADDRESS)
  const user = await findUserByEmail(app.db, email)
  // Verify against something even without an account, so that the time taken tells nothing.
  const matches = await passwords.verify(user?.passwordHash ?? (await decoyHash(passwords)), password)
  if (!user?.passwordHash || !matches)
    throw new DomainError(
      'unauthenticated',
      'session.refused',
      'E-mail and password do not belong together. Check both and try again.',
    )
  await deleteAttempts(app.db, keys.address)
  await takeAttemptBack(app.db, keys.network)
  return user
}

/**
 * That somebody signed in knows the password of the account too; counted like an attempt to sign in.
 * @throws DomainError at the path `current`, or `too many`
 */
export async function requireOwnPassword(
  app: App,
  passwords: Passwords,
  userId: string,
  password: string,
  network: string,
): Promise<UserRow> {
  const { email } = (await findUser(app.db, userId))!
  try {
    return await requirePassword(app, passwords, { email, password }, network)
  } catch (error) {
    if (!(error instanceof DomainError) || error.code !== 'session.refused') throw error
    const message = 'this is not your password; check it and try again'
    throw new DomainError('not acceptable', 'password.current', 'The present password is wrong.', [
      { path: 'current', message },
    ])
  }
}

/** Takes work that goes on after the answer. */
export type Later = (work: Promise<void>) => void

/**
 * Checks e-mail and password as `requirePassword` does; answers whom to sign in and where.
 * @param later what depends on whether there is such an account comes after the answer, so that its time tells nothing
 */
export async function signIn(
  app: App,
  passwords: Passwords,
  given: Credentials,
  network: string,
  later: Later,
): Promise<Actor> {
  try {
    return await entryOf(app, (await requirePassword(app, passwords, given, network)).id)
  } catch (error) {
    if (error instanceof DomainError && error.code === 'session.refused')
      later(noteRefusedPassword(app, given.email, network))
    throw error
  }
}

/** Where somebody is signed in to: the workspace that they joined first. */
export async function entryOf(app: App, userId: string): Promise<Actor> {
  const workspaceId = await firstWorkspaceOf(app.db, userId)
  if (!workspaceId)
    throw new DomainError(
      'forbidden',
      'session.nowhere',
      'You belong to no workspace any more. Ask an owner of one for an invitation, and open its link.',
    )
  return { userId, workspaceId }
}
