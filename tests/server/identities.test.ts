import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest'
import type { App } from '../../server/app'
import { users } from '../../server/database/schema'
import { createProvider } from '../../server/identity/provider'
import { acceptInvitation } from '../../server/services/accept-invitation'
import { beginHandshake, finishHandshake } from '../../server/services/handshakes'
import { enterByProvider, identityView, linkIdentity, unlinkIdentity } from '../../server/services/identities'
import { invitationsOf, invite } from '../../server/services/invitations'
import { createWorkspace, rolesIn } from '../../server/services/people'
import { passkeysOf } from '../../server/services/passkeys'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import type { IdentityProvider, Visitor } from '../support/identity-provider'
import { CLIENT, startIdentityProvider } from '../support/identity-provider'
import { newMember, plainPasswords as passwords } from '../support/people'

const site = { address: 'https://espalier.example', origin: 'https://espalier.example', hostname: 'espalier.example' }
const refused = { kind: 'unauthenticated', code: 'provider.refused' }
let test: TestApp
let app: App
let provider: IdentityProvider
let people = 0

const settings = () => ({
  ...{ issuer: provider.issuer, clientId: CLIENT.id, clientSecret: CLIENT.secret as string | null, name: 'Harbour ID' },
})

beforeAll(async () => {
  test = await startTestApp(1)
  provider = await startIdentityProvider({ sub: 'nobody' })
  app = { ...test.app, provider: createProvider(settings()) }
})
beforeEach(() => {
  provider.visitor = { sub: 'nobody' }
})
afterAll(async () => {
  await provider?.close()
  await test?.close()
})

const begin = (options: { invitation?: string; userId?: string; network?: string } = {}, by = app) =>
  beginHandshake(by, { site, network: '192.0.2.1', next: '/', userId: null, ...options })

/** Goes to the provider as somebody, and comes back. */
async function visit(visitor: Visitor, options: Parameters<typeof begin>[0] = {}) {
  provider.visitor = visitor
  const begun = await begin({ network: `network of ${visitor.sub}`, ...options })
  const returned = await provider.visit(begun.url)
  return { kept: begun.kept, search: returned.search }
}

async function signIn(visitor: Visitor, invitation?: string) {
  const { kept, search } = await visit(visitor, { invitation })
  const { who } = await finishHandshake(app, site, kept, search)
  return enterByProvider(app, who, kept.invitation)
}

async function member() {
  const name = `Sailor${++people}`
  const actor = await newMember(app, test.actor, name, ['reader'], 'hash of right')
  return { ...actor, email: `${name.toLowerCase()}@works.example.org` }
}

/** A visitor whose address the provider has verified. */
const verified = (email: string, more: Partial<Visitor> = {}): Visitor => ({
  ...{ sub: `subject of ${email}`, email, email_verified: true, name: 'Nell Tarn' },
  ...more,
})

const secretIn = (link: string | null) => /\/invitations\/([\w-]+)$/.exec(link!)![1]!

it('signs in whose verified address it is, and by the link from then on, whatever the address', async () => {
  const { email, userId, workspaceId } = await member()
  expect(await signIn(verified(email.toUpperCase()))).toEqual({ userId, workspaceId })
  expect(await identityView(app, userId)).toMatchObject({ provider: 'Harbour ID', hasPassword: true })
  expect((await identityView(app, userId)).linkedAt).not.toBeNull()
  const moved = verified('elsewhere@example.org', { sub: `subject of ${email.toUpperCase()}`, email_verified: false })
  expect(await signIn(moved)).toEqual({ userId, workspaceId })
})

it('takes the address from the userinfo endpoint where the token has none', async () => {
  const { email, userId } = await member()
  expect(await signIn(verified(email, { byUserInfo: true }))).toMatchObject({ userId })
})

it.each([['not said'], [false], ['true'], [1]])(
  'opens nothing by an address whose verification is %s',
  async (said) => {
    const { email } = await member()
    const visitor = { ...verified(email), email_verified: said === 'not said' ? undefined : said }
    await expect(signIn(visitor)).rejects.toMatchObject({ kind: 'unauthenticated', code: 'identity.unverified' })
  },
)

it('opens no account for an address that nobody has and nobody invited', async () => {
  const strange = verified('stranger@example.org')
  await expect(signIn(strange)).rejects.toMatchObject({ kind: 'unauthenticated', code: 'identity.unknown' })
  expect(await app.db.select().from(users).where(eq(users.email, 'stranger@example.org'))).toEqual([])
})

it('opens an account nobody else is linked to', async () => {
  const { email } = await member()
  await signIn(verified(email))
  await expect(signIn(verified(email, { sub: 'an impostor' }))).rejects.toMatchObject({ code: 'identity.other' })
})

it('accepts the invitation of a verified address, without a password', async () => {
  const email = 'invited.nell@example.org'
  await invite(app, test.actor, { email, roles: ['steward'] })
  await expect(signIn({ ...verified(email), email_verified: false })).rejects.toMatchObject({
    code: 'identity.unverified',
  })
  const entered = await signIn(verified(email))
  expect(entered.workspaceId).toBe(test.actor.workspaceId)
  expect(await rolesIn(app, entered)).toEqual(['steward'])
  expect((await app.db.select().from(users).where(eq(users.id, entered.userId)))[0]).toMatchObject({
    ...{ email, name: 'Nell Tarn', passwordHash: null },
  })
  expect((await invitationsOf(app, test.actor, { limit: 50 })).items.map((open) => open.email)).not.toContain(email)
  await expect(unlinkIdentity(app, entered.userId)).rejects.toMatchObject({ code: 'sign-in.last' })
  expect(await passkeysOf(app, entered.userId)).toMatchObject({ hasPassword: false })
})

it('accepts none that has expired or was withdrawn', async () => {
  const email = 'late@example.org'
  await invite(app, test.actor, { email, roles: ['reader'] })
  const { kept, search } = await visit(verified(email))
  const { who } = await finishHandshake(app, site, kept, search)
  const later = { ...app, now: () => new Date(Date.now() + 8 * 86_400_000) }
  await expect(enterByProvider(later, who, null)).rejects.toMatchObject({ code: 'identity.unknown' })
})

it('joins by the link of an invitation with an account that has no password, and only with its address', async () => {
  const email = 'twice@example.org'
  const first = secretIn((await invite(app, test.actor, { email, roles: ['reader'] })).link)
  const { userId } = await signIn(verified(email), first)
  const elsewhere = await app.db.transaction((tx) => createWorkspace(app, tx, 'Elsewhere'))
  const owner = await newMember(app, { userId: '', workspaceId: elsewhere }, 'Orla', ['owner'])
  const second = secretIn((await invite(app, owner, { email, roles: ['developer'] })).link)
  const other = await member()
  await expect(signIn(verified(other.email), second)).rejects.toMatchObject({ code: 'identity.other-address' })
  await expect(acceptInvitation(app, passwords, second, { name: '', password: 'x' }, '-')).rejects.toMatchObject({
    code: 'session.refused',
  })
  expect(await signIn(verified(email), second)).toEqual({ userId, workspaceId: elsewhere })
  await expect(signIn(verified(email), second)).rejects.toMatchObject({ code: 'invitation.gone' })
})

it.each<[string, Partial<Visitor>]>([
  ['another nonce', { token: { nonce: 'of an earlier visit' } }],
  ['no nonce', { token: { nonce: undefined } }],
  ['another audience', { token: { aud: 'another client' } }],
  ['another issuer', { token: { iss: 'https://id.elsewhere.example' } }],
  ['a token that has expired', { token: { exp: 1_000_000_000 } }],
  ['a signature by another key', { forged: true }],
])('refuses %s', async (_what, fault) => {
  const { email } = await member()
  await expect(signIn(verified(email, fault))).rejects.toMatchObject(refused)
})

it('says so when the person declines at the provider', async () => {
  await expect(signIn({ sub: 'shy', declines: true })).rejects.toMatchObject({ code: 'provider.declined' })
})

it('takes what comes back once, in the browser it was begun in, within five minutes', async () => {
  const { email } = await member()
  const gone = { code: 'challenge.gone' }
  const first = await visit(verified(email))
  await finishHandshake(app, site, first.kept, first.search)
  await expect(finishHandshake(app, site, first.kept, first.search)).rejects.toMatchObject(gone)

  const [mine, theirs] = [await visit(verified(email)), await visit(verified(email))]
  await expect(finishHandshake(app, site, mine.kept, theirs.search)).rejects.toMatchObject(refused)
  const none = await visit(verified(email))
  await expect(finishHandshake(app, site, null, none.search)).rejects.toMatchObject({ code: 'provider.browser' })

  const slow = await visit(verified(email))
  const later = { ...app, now: () => new Date(Date.now() + 6 * 60_000) }
  await expect(finishHandshake(later, site, slow.kept, slow.search)).rejects.toMatchObject(gone)
  await expect(finishHandshake(app, site, mine.kept, '?code=x')).rejects.toMatchObject(gone)
})

it('gives the code to nobody who did not ask for it', async () => {
  const { email } = await member()
  const { kept, search } = await visit(verified(email))
  await expect(finishHandshake(app, site, { ...kept, verifier: 'x'.repeat(43) }, search)).rejects.toMatchObject(refused)
})

it('links an account to who came back, one to one, and unlinks it', async () => {
  const [own, other] = [await member(), await member()]
  const linking = async (userId: string, visitor: Visitor) => {
    const { kept, search } = await visit(visitor, { userId })
    const finished = await finishHandshake(app, site, kept, search)
    expect(finished.userId).toBe(userId)
    await linkIdentity(app, userId, finished.who)
  }
  await linking(own.userId, { sub: 'own elsewhere', email: 'any@example.org' })
  expect(await signIn({ sub: 'own elsewhere' })).toMatchObject({ userId: own.userId })
  await expect(linking(other.userId, { sub: 'own elsewhere' })).rejects.toMatchObject({ code: 'identity.taken' })
  await expect(linking(own.userId, { sub: 'a second' })).rejects.toMatchObject({ code: 'identity.linked' })
  await unlinkIdentity(app, own.userId)
  await expect(signIn({ sub: 'own elsewhere' })).rejects.toMatchObject({ code: 'identity.unverified' })
  await expect(unlinkIdentity(app, own.userId)).rejects.toMatchObject({ code: 'identity.missing' })
})

it('says so when the provider does not answer, and asks it again the next time', async () => {
  const closed = await startIdentityProvider({ sub: 'nobody' })
  await closed.close()
  const cut = { ...app, provider: createProvider({ ...settings(), issuer: closed.issuer }) }
  await expect(begin({}, cut)).rejects.toMatchObject({ kind: 'wrong state', code: 'provider.unreachable' })
  await expect(begin({}, { ...app, provider: null })).rejects.toMatchObject({ code: 'provider.none' })
})

it('sends nobody to the provider for ever', async () => {
  for (let k = 0; k < 60; k++) await begin({ network: '203.0.113.5' })
  await expect(begin({ network: '203.0.113.5' })).rejects.toMatchObject({ code: 'attempts.many' })
})
