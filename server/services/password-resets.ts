import { DomainError } from '../../shared/errors'
import type { AskReset, MadeReset, ResetView } from '../../shared/schemas/account'
import type { Actor, App } from '../app'
import { deleteAttempts } from '../database/repositories/attempts'
import { countWorkspacesOf, findRoles, findUser, findUserByEmail, updateUser } from '../database/repositories/people'
import { deleteSessionsOf } from '../database/repositories/sessions'
import { passwordChangedLetter, passwordLetter } from '../mail/account-letters'
import { countAttempt } from './attempts'
import { endConfirmations, openConfirmation, requireConfirmation } from './confirmations'
import { sendsMail, writePrivately, writeSecretLink } from './mail'
import { requireGoodPassword } from './password-rules'
import type { Passwords } from './people'
import { signInAttempts } from './sign-in'
import { noteNewPassword } from './sign-in-trail'

const PER_ADDRESS = { most: 5, withinMinutes: 60 }
const PER_NETWORK = { most: 30, withinMinutes: 60 }
const PER_WORKSPACE = { most: 30, withinMinutes: 60 }

const pathOf = (secret: string): string => `/reset/${secret}`

/**
 * Asks for a link for a new password. What is done and said does not depend on whether the address has an account; what
 * does depend on it comes later, when the answer has gone, so that its time tells nothing either.
 * @param network address that the request comes from
 * @param later takes work that goes on after the answer
 * @throws DomainError wrong state where no mail is sent, or `too many`
 */
export async function askReset(
  app: App,
  { email }: AskReset,
  network: string,
  later: (work: Promise<void>) => void,
): Promise<void> {
  if (!(await sendsMail(app)))
    throw new DomainError(
      'wrong state',
      'reset.no-mail',
      'This server sends no mail. Ask an owner of the workspace for a link.',
    )
  await countAttempt(app, `reset from ${network}`, PER_NETWORK)
  await countAttempt(app, `reset ${email}`, PER_ADDRESS)
  later(sendReset(app, email))
}

async function sendReset(app: App, email: string): Promise<void> {
  await app.db.transaction(async (tx) => {
    const user = await findUserByEmail(tx, email)
    if (!user) return
    const secret = await openConfirmation(app, tx, { kind: 'password', userId: user.id, email })
    await writeSecretLink(app, tx, { userId: user.id, address: email }, passwordLetter(pathOf(secret)))
  })
}

/**
 * Makes a link for a new password of a member, to be handed on, where no mail is sent. Only for those who belong to no other
 * workspace: whoever holds the link can act as that person, and an owner has no say over what they do elsewhere.
 */
export async function makeResetLink(app: App, actor: Actor, memberId: string): Promise<MadeReset> {
  await countAttempt(app, `reset in ${actor.workspaceId}`, PER_WORKSPACE)
  if (await sendsMail(app))
    throw new DomainError(
      'wrong state',
      'reset.by-mail',
      'This server sends mail: the link is asked for on the page for signing in, and goes to their address.',
    )
  return app.db.transaction(async (tx) => {
    const user = await findUser(tx, memberId)
    if (!user || !(await findRoles(tx, actor.workspaceId, memberId)))
      throw new DomainError('not found', 'member.missing', 'There is no such member of this workspace.')
    if ((await countWorkspacesOf(tx, memberId)) > 1)
      throw new DomainError(
        'forbidden',
        'reset.elsewhere',
        `${user.name} belongs to another workspace too, which a new password would open. Whoever runs the server has to set up mail; then the link goes to their address.`,
      )
    const secret = await openConfirmation(app, tx, { kind: 'password', userId: memberId, email: user.email })
    return {
      link: (await writeSecretLink(
        app,
        tx,
        { userId: memberId, address: user.email },
        passwordLetter(pathOf(secret)),
      ))!,
    }
  })
}

/** Whose password the link changes, for whoever holds it. */
export async function resetView(app: App, secret: string): Promise<ResetView> {
  return app.db.transaction(async (tx) => {
    const { user } = await requireConfirmation(app, tx, 'password', secret)
    return { name: user.name, email: user.email }
  })
}

/**
 * Sets the new password, signs the person out everywhere, and ends their other links.
 * @param network address that the request comes from
 */
export async function resetPassword(
  app: App,
  passwords: Passwords,
  { secret, password }: { secret: string; password: string },
  network: string,
): Promise<void> {
  requireGoodPassword(password, await resetView(app, secret))
  const passwordHash = await passwords.hash(password)
  const userId = await app.db.transaction(async (tx) => {
    const { user } = await requireConfirmation(app, tx, 'password', secret)
    await updateUser(tx, user.id, { passwordHash })
    await deleteSessionsOf(tx, user.id)
    await endConfirmations(app, tx, user.id)
    // Whoever had to ask may have used up their attempts.
    await deleteAttempts(tx, signInAttempts(user.email))
    await writePrivately(app, tx, { userId: user.id, address: user.email }, passwordChangedLetter('by a link'))
    return user.id
  })
  await noteNewPassword(app, userId, network)
}
