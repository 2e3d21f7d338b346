import { randomUUID } from 'node:crypto'
import { DomainError } from '../../shared/errors'
import type { App } from '../app'
import type { Db } from '../database/client'
import type { ConfirmationRow } from '../database/repositories/confirmations'
import {
  closeConfirmations,
  deleteExpiredConfirmations,
  holdConfirmation,
  insertConfirmation,
} from '../database/repositories/confirmations'
import { newSecret, secretHash } from './secrets'

const OPEN_MS = 60 * 60 * 1000

/** Opens a confirmation for one hour. @returns the secret of its link */
export async function openConfirmation(
  app: App,
  tx: Db,
  { kind, userId, email }: Pick<ConfirmationRow, 'kind' | 'userId' | 'email'>,
): Promise<string> {
  const { secret, tokenHash } = newSecret()
  const createdAt = app.now()
  const expiresAt = new Date(createdAt.getTime() + OPEN_MS)
  await insertConfirmation(tx, { id: randomUUID(), kind, userId, email, tokenHash, createdAt, expiresAt, usedAt: null })
  return secret
}

/**
 * The confirmation behind a link, with whose it is.
 * @throws DomainError not found, the same for a link that is unknown, has expired, was used or ended
 */
export async function requireConfirmation(app: App, tx: Db, kind: ConfirmationRow['kind'], secret: string) {
  const found = await holdConfirmation(tx, kind, secretHash(secret), app.now())
  if (found) return found
  throw new DomainError(
    'not found',
    'confirmation.gone',
    'This link no longer holds. It may be older than an hour, or used already. Ask for a new one.',
  )
}

/** Ends every open link of a person. */
export const endConfirmations = (app: App, tx: Db, userId: string): Promise<void> =>
  closeConfirmations(tx, userId, app.now())

export const sweepConfirmations = (app: App): Promise<void> => deleteExpiredConfirmations(app.db, app.now())
