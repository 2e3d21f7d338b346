import { DomainError } from '../../shared/errors'
import type { IdentityView } from '../../shared/schemas/identities'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import { deleteIdentity, findIdentity, identityOf, insertIdentity } from '../database/repositories/identities'
import { findOpenInvitationTo } from '../database/repositories/invitations'
import type { UserRow } from '../database/repositories/people'
import { findUser, findUserByEmail } from '../database/repositories/people'
import type { Provider, Who } from '../identity/provider'
import { signInChangedLetter } from '../mail/account-letters'
import { acceptAs, openInvitation, settle } from './accept-invitation'
import { requireProvider } from './handshakes'
import { writePrivately } from './mail'
import { createAccount } from './people'
import { entryOf } from './sign-in'
import { requireWayIn } from './ways-in'

/** Whether a person is linked to the provider of this installation. */
export async function identityView(app: App, userId: string): Promise<IdentityView> {
  const { provider } = app
  const linked = provider && (await identityOf(app.db, provider.issuer, userId))
  const user = await findUser(app.db, userId)
  return {
    provider: provider?.name ?? null,
    linkedAt: linked?.createdAt.toISOString() ?? null,
    hasPassword: Boolean(user?.passwordHash),
  }
}

async function link(app: App, tx: Db, provider: Provider, { userId, who }: { userId: string; who: Who }) {
  const createdAt = app.now()
  await insertIdentity(tx, { provider: provider.issuer, subject: who.subject, userId, createdAt })
}

async function told(app: App, tx: Db, { id, email }: UserRow, what: string): Promise<void> {
  await writePrivately(app, tx, { userId: id, address: email }, signInChangedLetter(what))
}

/** Links who came back to the account that sent them. */
export async function linkIdentity(app: App, userId: string, who: Who): Promise<void> {
  const provider = requireProvider(app)
  await app.db.transaction(async (tx) => {
    const holder = await findIdentity(tx, provider.issuer, who.subject)
    if (holder)
      throw new DomainError('wrong state', 'identity.taken', `You are linked to an account here at ${provider.name}.`)
    if (await identityOf(tx, provider.issuer, userId))
      throw new DomainError('wrong state', 'identity.linked', 'Your account is linked already. Unlink it first.')
    await link(app, tx, provider, { userId, who })
    await told(app, tx, (await findUser(tx, userId))!, `your account was linked to ${provider.name}`)
  })
}

/** Signing in through the provider no longer opens the account. */
export async function unlinkIdentity(app: App, userId: string): Promise<void> {
  const provider = requireProvider(app)
  await app.db.transaction(async (tx) => {
    if (!(await deleteIdentity(tx, provider.issuer, userId)))
      throw new DomainError('not found', 'identity.missing', `Your account is not linked to ${provider.name}.`)
    await requireWayIn(app, tx, userId)
    await told(app, tx, (await findUser(tx, userId))!, `your account was unlinked from ${provider.name}`)
  })
}

/** Whose account it is: by the link, or by an address that the provider has verified, which is then linked. */
async function accountOf(app: App, tx: Db, provider: Provider, who: Who): Promise<UserRow | undefined> {
  const linked = await findIdentity(tx, provider.issuer, who.subject)
  if (linked) return findUser(tx, linked.userId)
  const user = who.email === null ? undefined : await findUserByEmail(tx, who.email)
  if (!user) return undefined
  if (await identityOf(tx, provider.issuer, user.id))
    throw new DomainError(
      'unauthenticated',
      'identity.other',
      `The account with this address is linked to somebody else at ${provider.name}.`,
    )
  await link(app, tx, provider, { userId: user.id, who })
  await told(app, tx, user, `your account was linked to ${provider.name}, which confirmed your address`)
  return user
}

function unknown({ name }: Provider, { email }: Who): DomainError {
  return email === null
    ? new DomainError('unauthenticated', 'identity.unverified', `${name} confirms no address of yours.`)
    : new DomainError('unauthenticated', 'identity.unknown', `No account here has the address that ${name} says.`)
}

/**
 * Whom to sign in, and where: somebody who is linked, whose address the provider has verified, or who was invited at that
 * address, whose invitation is then accepted.
 * @param invitation secret of the link that they came by, if any
 * @throws DomainError unauthenticated for anybody else
 */
export async function enterByProvider(app: App, who: Who, invitation: string | null): Promise<Actor> {
  const provider = requireProvider(app)
  const entered = await app.db.transaction(async (tx): Promise<Actor | string> => {
    const user = await accountOf(app, tx, provider, who)
    if (invitation !== null) return acceptByProvider(app, tx, provider, { who, user, invitation })
    if (user) return user.id
    const open = who.email === null ? undefined : await findOpenInvitationTo(tx, who.email, app.now())
    if (!open) throw unknown(provider, who)
    return joinAnew(app, tx, provider, { who, invited: open })
  })
  return typeof entered === 'string' ? entryOf(app, entered) : entered
}

interface Invited {
  who: Who
  invited: NonNullable<Awaited<ReturnType<typeof findOpenInvitationTo>>>
}

/** Makes the account of somebody who was invited at the address that the provider has verified; it has no password. */
async function joinAnew(app: App, tx: Db, provider: Provider, { who, invited }: Invited): Promise<Actor> {
  const { email, workspaceId, roles } = invited
  const name = who.name ?? email.split('@')[0]!
  const userId = await createAccount(app, tx, { name, email, passwordHash: null, workspaceId, roles })
  await link(app, tx, provider, { userId, who })
  await settle(app, tx, invited, userId)
  return { userId, workspaceId }
}

/** An invitation is for the address it was sent to: of the account, or as the provider has verified it. */
async function acceptByProvider(
  app: App,
  tx: Db,
  provider: Provider,
  { who, user, invitation }: { who: Who; user: UserRow | undefined; invitation: string },
): Promise<Actor> {
  const { invitation: invited } = await openInvitation(app, tx, invitation)
  if (user?.email === invited.email) return acceptAs(app, tx, invited, user.id)
  if (!user && who.email === invited.email) return joinAnew(app, tx, provider, { who, invited })
  throw new DomainError(
    'unauthenticated',
    'identity.other-address',
    `The invitation is for ${invited.email}, and ${provider.name} says another address.`,
  )
}
