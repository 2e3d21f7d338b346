import { DomainError } from '../../shared/errors'
import type { Proof } from '../../shared/schemas/passkeys'
import type { App } from '../app'
import type { UserRow } from '../database/repositories/people'
import { findUser } from '../database/repositories/people'
import { listPasskeys } from '../database/repositories/passkeys'
import { findSession } from '../database/repositories/sessions'
import type { OwnChange } from './own-account'
import type { Site } from './passkey-checks'
import { requirePasskey } from './passkey-checks'
import type { Passwords } from './people'
import { requireOwnPassword } from './sign-in'

const FRESH_MS = 10 * 60 * 1000

/**
 * That it is really its owner who changes how an account is opened, not whoever found a browser left open: their password, a
 * passkey of theirs or, where they have neither, that they signed in within the last ten minutes.
 * @throws DomainError at the path `current`, forbidden, or `too many`
 */
export async function requireProof(
  app: App,
  passwords: Passwords,
  { userId, sessionId, network }: OwnChange,
  { current, passkey }: Proof,
  site: Site,
): Promise<UserRow> {
  if (passkey) {
    const user = await requirePasskey(app, site, passkey, network)
    if (user.id === userId) return user
    throw new DomainError(
      'forbidden',
      'passkey.other',
      'This passkey is of another account. Choose one of this account.',
    )
  }
  const user = (await findUser(app.db, userId))!
  const hasNeither = !user.passwordHash && (await listPasskeys(app.db, userId)).length === 0
  if (!hasNeither) return requireOwnPassword(app, passwords, userId, current ?? '', network)
  const session = await findSession(app.db, sessionId, app.now())
  if (session && app.now().getTime() - session.createdAt.getTime() <= FRESH_MS) return user
  throw new DomainError(
    'forbidden',
    'proof.old',
    'You signed in more than ten minutes ago. Sign out, sign in again, and come back here at once.',
  )
}
