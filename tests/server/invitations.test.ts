import { and, eq } from 'drizzle-orm'
import { afterAll, beforeAll, expect, it } from 'vitest'
import type { Actor } from '../../server/app'
import { findUser } from '../../server/database/repositories/people'
import { invitations, mails, memberships } from '../../server/database/schema'
import { createMailer } from '../../server/mail/create-mailer'
import { deliverDue, openPost } from '../../server/mail/post'
import { acceptInvitation, acceptSignedIn, invitedView } from '../../server/services/accept-invitation'
import { invitationsOf, invite, resendInvitation, withdrawInvitation } from '../../server/services/invitations'
import { outboxOf } from '../../server/services/mail'
import { createWorkspace } from '../../server/services/people'
import { openSession, sessionCaller } from '../../server/services/sessions'
import { signIn } from '../../server/services/sign-in'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { startMailServer } from '../support/mail-server'
import { newMember, plainPasswords as passwords } from '../support/people'

const GOOD = 'lichen wall ferry north'
const SITE = 'https://espalier.example'
let test: TestApp
let owner: Actor
let elsewhere: Actor

beforeAll(async () => {
  test = await startTestApp(1)
  owner = await newMember(test.app, test.actor, 'Olga', ['owner'])
  const workspaceId = await test.app.db.transaction((tx) => createWorkspace(test.app, tx, 'Elsewhere'))
  elsewhere = await newMember(test.app, { userId: '', workspaceId }, 'Else', ['owner'])
  await (await openPost(test.app, { route: null, site: SITE })).stop()
})
afterAll(() => test?.close())

const secretOf = (link: string | null) => {
  expect(link).toMatch(/^https:\/\/espalier\.example\/invitations\/[\w-]{43}$/)
  return link!.split('/').at(-1)!
}
const invited = async (email: string, by = owner) =>
  secretOf((await invite(test.app, by, { email, roles: ['reader', 'steward'] })).link)
const accept = (secret: string, password = GOOD, name = 'Nora', app = test.app) =>
  acceptInvitation(app, passwords, secret, { name, password }, '192.0.2.1')
const rolesOf = async ({ userId, workspaceId }: Actor) =>
  (
    await test.app.db
      .select({ roles: memberships.roles })
      .from(memberships)
      .where(and(eq(memberships.userId, userId), eq(memberships.workspaceId, workspaceId)))
  )[0]?.roles
const gone = { kind: 'not found', code: 'invitation.gone' }

it('lets somebody join who is signed in with the address, without a password, and nobody else', async () => {
  const { app } = test
  const user = (await findUser(app.db, elsewhere.userId))!
  const secret = await invited(user.email)
  const session = (actor: Actor) => openSession(app, actor, { userAgent: '', address: '192.0.2.1' })
  const [theirs, another] = [await session(elsewhere), await session(owner)]
  await expect(acceptSignedIn(app, { ...owner, sessionId: another }, secret)).rejects.toMatchObject({
    kind: 'forbidden',
    code: 'invitation.address',
  })
  const joined = await acceptSignedIn(app, { ...elsewhere, sessionId: theirs }, secret)
  expect(joined).toEqual({ userId: elsewhere.userId, workspaceId: owner.workspaceId })
  expect(await rolesOf(joined)).toEqual(['reader', 'steward'])
  expect((await sessionCaller(app, theirs, '192.0.2.1')).workspaceId).toBe(owner.workspaceId)
  await expect(acceptSignedIn(app, { ...elsewhere, sessionId: theirs }, secret)).rejects.toMatchObject(gone)
})

it('lets a newcomer join once, with the roles of the invitation, and keeps a hash alone', async () => {
  const secret = await invited('nora@example.org')
  expect(JSON.stringify(await test.app.db.select().from(invitations))).not.toContain(secret)
  expect(await test.app.db.select().from(mails)).toEqual([])
  expect(await invitedView(test.app, secret)).toMatchObject({ email: 'nora@example.org', hasAccount: false })
  await expect(accept(secret, 'short')).rejects.toMatchObject({ code: 'password.weak' })
  await expect(accept(secret, GOOD, '')).rejects.toMatchObject({ code: 'invitation.name' })
  const nora = await accept(secret)
  expect(await rolesOf(nora)).toEqual(['reader', 'steward'])
  await expect(accept(secret)).rejects.toMatchObject(gone)
  const given = { email: 'nora@example.org', password: GOOD }
  expect(await signIn(test.app, passwords, given, '192.0.2.1', () => {})).toEqual(nora)
  expect((await invitationsOf(test.app, owner, { limit: 50 })).items).toEqual([])
  await expect(invited('nora@example.org')).rejects.toMatchObject({ code: 'invitation.member' })
})

it('lets somebody with an account join a second workspace with its password alone', async () => {
  const secret = await invited('nora@example.org', elsewhere)
  expect(await invitedView(test.app, secret)).toMatchObject({ workspace: 'Elsewhere', hasAccount: true })
  await expect(accept(secret, 'another good password')).rejects.toMatchObject({ code: 'session.refused' })
  const nora = await accept(secret, GOOD, '')
  expect(nora.workspaceId).toBe(elsewhere.workspaceId)
  expect(await rolesOf(nora)).toEqual(['reader', 'steward'])
})

it('gives the same answer to a link that is unknown, expired, withdrawn or replaced', async () => {
  const secret = await invited('omar@example.org')
  const late = { ...test.app, now: () => new Date(Date.now() + 7 * 86_400_000 + 1000) }
  const { id } = (await invitationsOf(test.app, owner, { limit: 50 })).items[0]!
  expect((await invitationsOf(late, owner, { limit: 50 })).items[0]).toMatchObject({ hasExpired: true })
  const answers = [await accept(secret, GOOD, 'Omar', late).catch((error: Error) => error.message)]
  const renewed = secretOf((await resendInvitation(test.app, owner, id)).link)
  answers.push(await accept(secret).catch((error: Error) => error.message))
  await expect(withdrawInvitation(test.app, elsewhere, id)).rejects.toMatchObject({ code: 'invitation.missing' })
  expect(await invitedView(test.app, renewed)).toMatchObject({ email: 'omar@example.org' })
  await withdrawInvitation(test.app, owner, id)
  answers.push(await accept(renewed).catch((error: Error) => error.message))
  answers.push(await accept('unknown').catch((error: Error) => error.message))
  expect(new Set(answers).size).toBe(1)
  expect(answers[0]).toMatch(/no open invitation/)
})

it('is used once by two who accept at the same time', async () => {
  const secret = await invited('twice@example.org')
  const outcomes = await Promise.allSettled([accept(secret), accept(secret)])
  expect(outcomes.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected'])
})

it('refuses a second invitation of the same address, and more than sixty an hour', async () => {
  await invited('pia@example.org')
  await expect(invited('pia@example.org')).rejects.toMatchObject({ code: 'invitation.open' })
  let refused: unknown
  for (let k = 0; k < 60 && !refused; k++) await invited(`many-${k}@example.org`).catch((error) => (refused = error))
  expect(refused).toMatchObject({ code: 'attempts.many' })
})

it('sends the link by mail where there is a server, shows it in no outbox, and forgets it once it is sent', async () => {
  const server = await startMailServer()
  const from = 'Espalier <espalier@example.org>'
  await (await openPost(test.app, { route: { by: 'smtp', url: server.url, from }, site: SITE })).stop()
  const made = await invite(test.app, elsewhere, { email: 'quin@example.org', roles: ['reader'] })
  expect(made.link).toBeNull()
  await deliverDue(test.app, createMailer({ by: 'smtp', url: server.url, from }))
  const { mail, to } = server.taken[0]!
  expect(to).toEqual(['quin@example.org'])
  expect(mail.text).toContain('You get this because Else gave this address')
  const secret = secretOf(/https:\S+\/invitations\/\S+/.exec(mail.text!)![0])
  expect((await accept(secret, GOOD, 'Quin')).workspaceId).toBe(elsewhere.workspaceId)
  expect((await outboxOf(test.app, elsewhere, { limit: 50 })).items).toEqual([])
  expect(await test.app.db.select().from(mails)).toMatchObject([{ state: 'sent', text: '', html: '' }])
  await server.close()
})
