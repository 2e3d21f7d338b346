import { DomainError } from '../../shared/errors'
import type { App } from '../app'
import type { Db } from '../database/client'
import { identityOf } from '../database/repositories/identities'
import { listPasskeys } from '../database/repositories/passkeys'
import { findUser } from '../database/repositories/people'

/**
 * That something opens the account: a password, a passkey, or the provider of this installation.
 * @throws DomainError wrong state, so that the last way in is not taken away
 */
export async function requireWayIn(app: App, tx: Db, userId: string): Promise<void> {
  if ((await findUser(tx, userId))?.passwordHash || (await listPasskeys(tx, userId)).length > 0) return
  if (app.provider && (await identityOf(tx, app.provider.issuer, userId))) return
  throw new DomainError(
    'wrong state',
    'sign-in.last',
    'Nothing else opens your account. Add another way to sign in before you take this one away.',
  )
}
