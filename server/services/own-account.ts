import { DomainError } from '../../shared/errors'
import type { AddressView, ChangeAddress, ChangePassword } from '../../shared/schemas/account'
import type { App } from '../app'
import { findUserByEmail, updateUser } from '../database/repositories/people'
import { deleteOtherSessions } from '../database/repositories/sessions'
import { addressChangedLetter, addressLetter, passwordChangedLetter } from '../mail/account-letters'
import { countAttempt } from './attempts'
import { endConfirmations, openConfirmation, requireConfirmation } from './confirmations'
import { sendsMail, writePrivately, writeSecretLink } from './mail'
import { requireGoodPassword } from './password-rules'
import type { Passwords } from './people'
import { requireOwnPassword } from './sign-in'

const PER_PERSON = { most: 5, withinMinutes: 60 }

/** Who changes their own account, from where. */
export interface OwnChange {
  userId: string
  sessionId: string
  /** Address that the request comes from. */
  network: string
}

/** Changes one's own password and signs out everywhere but here. */
export async function changePassword(
  app: App,
  passwords: Passwords,
  { userId, sessionId, network }: OwnChange,
  { current, password }: ChangePassword,
): Promise<void> {
  const user = await requireOwnPassword(app, passwords, userId, current, network)
  requireGoodPassword(password, user)
  const passwordHash = await passwords.hash(password)
  await app.db.transaction(async (tx) => {
    await updateUser(tx, userId, { passwordHash })
    await deleteOtherSessions(tx, userId, sessionId)
    await endConfirmations(app, tx, userId)
    await writePrivately(app, tx, { userId, address: user.email }, passwordChangedLetter('on the page of your account'))
  })
}

/**
 * Asks for another address: a link goes to the new one, and nothing changes before it is used. The answer is the same
 * where the address belongs to somebody already; then nothing is sent.
 */
export async function askAddress(
  app: App,
  passwords: Passwords,
  { userId, network }: OwnChange,
  { email, current }: ChangeAddress,
): Promise<void> {
  if (!(await sendsMail(app)))
    throw new DomainError(
      'wrong state',
      'address.no-mail',
      'This server sends no mail, so no address can be confirmed.',
    )
  await countAttempt(app, `address of ${userId}`, PER_PERSON)
  const user = await requireOwnPassword(app, passwords, userId, current, network)
  if (email === user.email)
    throw new DomainError('not acceptable', 'address.same', 'This is the address of your account already.', [
      { path: 'email', message: 'this is the address of your account already' },
    ])
  await app.db.transaction(async (tx) => {
    if (await findUserByEmail(tx, email)) return
    const secret = await openConfirmation(app, tx, { kind: 'address', userId, email })
    await writeSecretLink(app, tx, { userId, address: email }, addressLetter(user.name, `/address/${secret}`))
  })
}

/** Which address the link confirms, for whoever holds it. */
export async function addressView(app: App, secret: string): Promise<AddressView> {
  return app.db.transaction(async (tx) => {
    const { confirmation, user } = await requireConfirmation(app, tx, 'address', secret)
    return { email: confirmation.email, before: user.email }
  })
}

/** Changes the address to the one that the link was sent to, and tells the one before. */
export async function confirmAddress(app: App, secret: string): Promise<void> {
  await app.db.transaction(async (tx) => {
    const { confirmation, user } = await requireConfirmation(app, tx, 'address', secret)
    const { email } = confirmation
    if (await findUserByEmail(tx, email))
      throw new DomainError('wrong state', 'address.taken', `${email} belongs to another account by now.`)
    await updateUser(tx, user.id, { email })
    await endConfirmations(app, tx, user.id)
    await writePrivately(app, tx, { userId: user.id, address: user.email }, addressChangedLetter(user.name, email))
  })
}
