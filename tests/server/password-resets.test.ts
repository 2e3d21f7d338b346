import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest'
import type { Actor } from '../../server/app'
import { confirmations, mails, users } from '../../server/database/schema'
import { createMailer } from '../../server/mail/create-mailer'
import { deliverDue, openPost } from '../../server/mail/post'
import { acceptInvitation } from '../../server/services/accept-invitation'
import { sweepConfirmations } from '../../server/services/confirmations'
import { invite } from '../../server/services/invitations'
import { outboxOf } from '../../server/services/mail'
import { addressView, askAddress, changePassword, confirmAddress } from '../../server/services/own-account'
import { askReset, makeResetLink, resetPassword, resetView } from '../../server/services/password-resets'
import { createWorkspace } from '../../server/services/people'
import { openSession, sessionCaller } from '../../server/services/sessions'
import { signIn } from '../../server/services/sign-in'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import type { MailServer } from '../support/mail-server'
import { startMailServer } from '../support/mail-server'
import { newMember, plainPasswords as passwords } from '../support/people'

const GOOD = 'lichen wall ferry north'
const OTHER = 'cobble heron seven lamps'
const SITE = 'https://espalier.example'
const from = 'Espalier <espalier@example.org>'
const device = { userAgent: 'Firefox/140.0', address: '192.0.2.1' }
const gone = { kind: 'not found', code: 'confirmation.gone' }
let test: TestApp
let server: MailServer
let owner: Actor
let people = 0

const withMail = async (sends: boolean) =>
  (await openPost(test.app, { route: sends ? { by: 'smtp', url: server.url, from } : null, site: SITE })).stop()

beforeAll(async () => {
  test = await startTestApp(1)
  server = await startMailServer()
  owner = await newMember(test.app, test.actor, 'Olga', ['owner'])
})
beforeEach(() => withMail(true))
afterAll(async () => {
  await server?.close()
  await test?.close()
})

/** A member of the test's workspace, with a password. */
async function member() {
  const name = `Person${++people}`
  const { userId } = await newMember(test.app, test.actor, name, ['reader'], `hash of ${OTHER}`)
  return { userId, email: `${name.toLowerCase()}@works.example.org` }
}

const reset = (secret: string, password: string): Promise<void> =>
  resetPassword(test.app, passwords, { secret, password }, '192.0.2.1')

async function ask(email: string, network = '192.0.2.1'): Promise<void> {
  const work: Promise<void>[] = []
  await askReset(test.app, { email }, network, (later) => work.push(later))
  expect(work).toHaveLength(1)
  await Promise.all(work)
}

/** What was sent meanwhile: to whom, what about, and the secret of its link. */
async function delivered() {
  server.taken.length = 0
  await deliverDue(test.app, createMailer({ by: 'smtp', url: server.url, from }))
  return server.taken.map(({ mail, to }) => ({
    to: to[0],
    subject: mail.subject,
    secret: /https:\S+\/(?:reset|address)\/([\w-]{43})/.exec(mail.text!)?.[1] ?? '',
  }))
}

const enter = (email: string, password: string) =>
  signIn(test.app, passwords, { email, password }, '192.0.2.1', () => {})
const later = (minutes: number) => {
  const now = new Date(Date.now() + minutes * 60_000)
  return { ...test.app, now: () => now }
}

it('changes a password once, by a link that goes to the address, and signs out everywhere', async () => {
  const { userId, email } = await member()
  const sessionId = await openSession(test.app, { userId, workspaceId: owner.workspaceId }, device)
  await ask(email)
  await ask(email)
  const [first, second] = await delivered()
  expect(first).toMatchObject({ to: email, subject: 'A new password for Espalier' })
  expect(await resetView(test.app, first!.secret)).toMatchObject({ email })
  await expect(reset(first!.secret, 'short')).rejects.toMatchObject({
    code: 'password.weak',
  })
  await reset(first!.secret, GOOD)
  await expect(sessionCaller(test.app, sessionId, '192.0.2.1')).rejects.toMatchObject({ code: 'session.ended' })
  await expect(enter(email, OTHER)).rejects.toMatchObject({ code: 'session.refused' })
  expect(await enter(email, GOOD)).toMatchObject({ userId })
  for (const { secret } of [first!, second!]) await expect(reset(secret, OTHER)).rejects.toMatchObject(gone)
  expect(await delivered()).toMatchObject([{ to: email, subject: 'Your password for Espalier was changed' }])
})

it('writes to nobody without an account, shows no outbox its letters, and keeps no words', async () => {
  await ask('nobody@works.example.org')
  expect(await delivered()).toEqual([])
  expect((await outboxOf(test.app, owner, { limit: 50 })).items).toEqual([])
  for (const { text, html } of await test.app.db.select().from(mails)) expect(text + html).toBe('')
})

it('refuses the sixth request for an address, known or not, and the link after an hour', async () => {
  const { email } = await member()
  const outcomes = { known: [] as string[], unknown: [] as string[] }
  for (let k = 0; k < 6; k++) {
    outcomes.known.push(await ask(email, `198.51.100.${k}`).then(String, ({ message }: Error) => message))
    outcomes.unknown.push(
      await ask('none@example.org', `198.51.100.${k}`).then(String, ({ message }: Error) => message),
    )
  }
  expect(outcomes.known).toEqual(outcomes.unknown)
  expect(outcomes.known[4]).toBe('undefined')
  expect(outcomes.known[5]).toMatch(/^Too many attempts/)
  const { secret } = (await delivered())[0]!
  await expect(resetView(later(61), secret)).rejects.toMatchObject(gone)
  expect(await resetView(later(59), secret)).toMatchObject({ email })
  await sweepConfirmations(later(61))
  expect(await test.app.db.select().from(confirmations)).toEqual([])
})

it('uses a link once, also when it is used twice at the same time', async () => {
  const { email } = await member()
  await ask(email)
  const { secret } = (await delivered())[0]!
  const outcomes = await Promise.allSettled([GOOD, OTHER].map((password) => reset(secret, password)))
  expect(outcomes.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected'])
})

it('lets an owner hand on a link where no mail is sent, for a member of this workspace alone', async () => {
  const { userId, email } = await member()
  await expect(makeResetLink(test.app, owner, userId)).rejects.toMatchObject({ code: 'reset.by-mail' })
  await withMail(false)
  await expect(ask(email)).rejects.toMatchObject({ code: 'reset.no-mail' })
  const secret = (await makeResetLink(test.app, owner, userId)).link.split('/').at(-1)!
  const workspaceId = await test.app.db.transaction((tx) => createWorkspace(test.app, tx, 'Elsewhere'))
  const elsewhere = await newMember(test.app, { userId: '', workspaceId }, 'Else', ['owner'])
  await expect(makeResetLink(test.app, elsewhere, userId)).rejects.toMatchObject({ code: 'member.missing' })
  const link = (await invite(test.app, elsewhere, { email, roles: ['reader'] })).link!
  const given = { name: '', password: OTHER }
  await acceptInvitation(test.app, passwords, link.split('/').at(-1)!, given, '192.0.2.1')
  await expect(reset(secret, GOOD)).rejects.toMatchObject(gone)
  await expect(makeResetLink(test.app, owner, userId)).rejects.toMatchObject({ code: 'reset.elsewhere' })
  expect(await test.app.db.select().from(mails)).not.toContainEqual(expect.objectContaining({ state: 'kept' }))
})

it('changes one’s own password for who knows the present one, and keeps this session alone', async () => {
  const { userId, email } = await member()
  const who = { userId, workspaceId: owner.workspaceId }
  const [here, there] = [await openSession(test.app, who, device), await openSession(test.app, who, device)]
  const change = (current: string, password: string) =>
    changePassword(test.app, passwords, { userId, sessionId: here, network: '192.0.2.1' }, { current, password })
  await expect(change('wrong', GOOD)).rejects.toMatchObject({ issues: [{ path: 'current' }] })
  await expect(change(OTHER, `${email}1`)).rejects.toMatchObject({ issues: [{ path: 'password' }] })
  await change(OTHER, GOOD)
  expect(await sessionCaller(test.app, here, '192.0.2.1')).toMatchObject({ userId })
  await expect(sessionCaller(test.app, there, '192.0.2.1')).rejects.toMatchObject({ code: 'session.ended' })
  expect(await enter(email, GOOD)).toMatchObject({ userId })
  expect(await delivered()).toMatchObject([{ to: email, subject: 'Your password for Espalier was changed' }])
})

it('changes an address once the new one is confirmed, and tells the one before', async () => {
  const { userId, email } = await member()
  const taken = await member()
  const own = { userId, sessionId: '', network: '192.0.2.1' }
  const askFor = (to: string, current = OTHER) => askAddress(test.app, passwords, own, { email: to, current })
  await expect(askFor('new@example.org', 'wrong')).rejects.toMatchObject({ issues: [{ path: 'current' }] })
  await expect(askFor(email)).rejects.toMatchObject({ code: 'address.same' })
  await askFor(taken.email)
  expect(await delivered()).toEqual([])
  await ask(email)
  await askFor('new@example.org')
  const [reset, change] = await delivered()
  expect(change!.to).toBe('new@example.org')
  const { secret } = change!
  expect(await addressView(test.app, secret)).toEqual({ email: 'new@example.org', before: email })
  await expect(resetView(test.app, secret)).rejects.toMatchObject(gone)
  expect(await enter(email, OTHER)).toMatchObject({ userId })
  await confirmAddress(test.app, secret)
  expect(await enter('new@example.org', OTHER)).toMatchObject({ userId })
  await expect(enter(email, OTHER)).rejects.toMatchObject({ code: 'session.refused' })
  await expect(confirmAddress(test.app, secret)).rejects.toMatchObject(gone)
  await expect(resetView(test.app, reset!.secret)).rejects.toMatchObject(gone)
  expect(await delivered()).toMatchObject([{ to: email, subject: 'Your address for Espalier was changed' }])
})

it('refuses an address that was taken while its link was open', async () => {
  const { userId } = await member()
  await askAddress(
    test.app,
    passwords,
    { userId, sessionId: '', network: '192.0.2.1' },
    { email: 'late@example.org', current: OTHER },
  )
  const { secret } = (await delivered())[0]!
  await test.app.db
    .insert(users)
    .values({ id: 'late', email: 'late@example.org', name: 'L', passwordHash: null, createdAt: new Date() })
  await expect(confirmAddress(test.app, secret)).rejects.toMatchObject({ code: 'address.taken' })
})
