import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest'
import type { Actor, App } from '../../server/app'
import { createMailer } from '../../server/mail/create-mailer'
import { hostedMailer } from '../../server/mail/hosted'
import type { Mailer } from '../../server/mail/mailer'
import { MailRefused } from '../../server/mail/mailer'
import { deliverDue, openPost } from '../../server/mail/post'
import type { HostedRoute } from '../../server/mail/settings'
import { mailSettingsOf } from '../../server/mail/settings'
import { outboxOf, tell } from '../../server/services/mail'
import type { MailView } from '../../shared/schemas/mail'
import { outboxQuerySchema } from '../../shared/schemas/mail'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { dyingAfter } from '../support/mailers'
import type { MailService } from '../support/mail-service'
import { startMailService } from '../support/mail-service'
import { newMember } from '../support/people'
import { until } from '../support/server'

const SITE = 'https://espalier.brackwater.example/plan'
const MINUTE = 60_000

let test: TestApp
let service: MailService
let route: HostedRoute
let mailer: Mailer
let ann: Actor
const environment = () => ({
  RESEND_API_KEY: service.key,
  RESEND_BASE_URL: service.url,
  MAIL_FROM: 'Espalier <espalier@brackwater.example>',
  PUBLIC_URL: SITE,
})
beforeAll(async () => {
  test = await startTestApp(1)
  ann = await newMember(test.app, test.actor, 'Ann', ['reader'])
  service = await startMailService()
  const settings = mailSettingsOf(environment(), SITE)
  route = settings.route as HostedRoute
  mailer = createMailer(route)
  await (await openPost(test.app, settings)).stop()
})
afterAll(async () => {
  await service.close()
  await test.close()
})
beforeEach(async () => {
  service.refusals = []
  await deliverDue(at(60 * 24 * 30), mailer)
  service.taken.length = 0
  service.asked = 0
})

/** The same application some minutes later. */
const at = (minutes: number): App => ({ ...test.app, now: () => new Date(Date.now() + minutes * MINUTE) })

const write = (subject = 'A calibration broke an embedding') =>
  test.app.db.transaction((tx) =>
    tell(
      test.app,
      tx,
      { workspaceId: test.actor.workspaceId, by: null },
      new Map([
        [
          ann.userId,
          {
            kind: 'embedding broken' as const,
            subject,
            parts: [{ text: 'Words, “quoted” & <plain>.' }],
            action: { label: 'Open the machine', path: '/machines/alder#broken' },
            because: 'you made the embedding',
          },
        ],
      ]),
    ),
  )
const newest = async (): Promise<MailView> =>
  (await outboxOf(test.app, test.actor, outboxQuerySchema.parse({ limit: 1 }))).items[0]!

it('gets a message as text and as HTML, for one person, and is asked once', async () => {
  await write()
  await deliverDue(test.app, mailer)
  expect(await newest()).toMatchObject({ state: 'sent', attempts: 1, reason: null })
  expect(service.taken).toEqual([
    {
      from: 'Espalier <espalier@brackwater.example>',
      to: 'ann@works.example.org',
      subject: 'A calibration broke an embedding',
      text: expect.stringContaining(`Words, “quoted” & <plain>.\n\nOpen the machine:\n${SITE}/machines/alder#broken\n`),
      html: expect.stringContaining('Words, “quoted” &amp; &lt;plain&gt;.'),
      headers: { 'Auto-Submitted': 'auto-generated' },
    },
  ])
  expect(service.taken[0]!.text).toContain('You get this because you made the embedding.')
  await deliverDue(at(10_000), mailer)
  expect(service.asked).toBe(1)
})

it('delivers a message once, although it is sent again where the process ended before it noted the answer', async () => {
  await write()
  void deliverDue(test.app, dyingAfter(mailer))
  await until(() => service.taken.length === 1)
  await deliverDue(at(1.1), mailer)
  expect(await newest()).toMatchObject({ state: 'sent', attempts: 2 })
  expect(service.asked).toBe(2)
  expect(service.taken).toHaveLength(1)
})

it('is waited for, within the attempt, where requests come too fast', async () => {
  const body = { statusCode: 429, name: 'rate_limit_exceeded', message: 'too many requests' }
  service.refusals = [{ status: 429, body, headers: { 'retry-after': '1' } }]
  await write('Slowly')
  const start = Date.now()
  await deliverDue(test.app, mailer)
  expect(Date.now() - start).toBeGreaterThan(990)
  expect(await newest()).toMatchObject({ state: 'sent', attempts: 1 })
  service.refusals = [{ status: 429, body, headers: { 'retry-after': '3600' } }]
  await write('Much later')
  await deliverDue(test.app, mailer)
  expect(await newest()).toMatchObject({ state: 'waiting', attempts: 1, reason: expect.stringContaining('429') })
})

it.each([
  [
    'a quota that is used up',
    { status: 429, body: { statusCode: 429, name: 'daily_quota_exceeded', message: 'tomorrow' } },
    'the mail service answered 429 daily_quota_exceeded: tomorrow',
  ],
  [
    'a sender not known',
    { status: 403, body: { statusCode: 403, name: 'validation_error', message: 'not verified' } },
    'the mail service answered 403 validation_error: not verified',
  ],
  [
    'a fault of its own',
    { status: 500, body: { statusCode: 500, name: 'internal_server_error', message: 'oh' } },
    'the mail service answered 500 internal_server_error: oh',
  ],
  ['a page of a proxy', { status: 502, body: '<html>' }, 'the mail service answered 502'],
  ['a refusal that says nothing', { status: 500, body: 'null' }, 'gave no answer that can be read'],
  ['a yes that says nothing', { status: 200, body: '{}' }, 'gave no answer that can be read'],
  ['a yes that is no JSON', { status: 200, body: 'OK' }, 'gave no answer that can be read'],
])('is asked again later after %s', async (_, refusal, reason) => {
  service.refusals = [refusal]
  await write()
  await deliverDue(test.app, mailer)
  expect(await newest()).toMatchObject({ state: 'waiting', attempts: 1, reason: expect.stringContaining(reason) })
  await deliverDue(at(1.1), mailer)
  expect(await newest()).toMatchObject({ state: 'sent', attempts: 2, reason: null })
  expect(service.taken).toHaveLength(1)
})

it('is asked again later where the key is not known, without telling the key', async () => {
  await write()
  await deliverDue(test.app, createMailer({ ...route, key: 're_other-secret' }))
  const { state, reason } = await newest()
  expect({ state, reason }).toEqual({
    state: 'waiting',
    reason: 'the mail service answered 401 invalid_api_key: API key is invalid',
  })
})

it('is asked again later where it cannot be reached, or says nothing', async () => {
  const gone = await startMailService()
  await gone.close()
  await write('Nobody there')
  await deliverDue(test.app, createMailer({ ...route, url: gone.url }))
  expect(await newest()).toMatchObject({ state: 'waiting', reason: expect.stringContaining('within 45 s') })
  service.refusals = [{ status: 200 }]
  await write('Silence')
  await deliverDue(test.app, hostedMailer(route, 200))
  expect(await newest()).toMatchObject({
    subject: 'Silence',
    state: 'waiting',
    reason: expect.stringContaining('within 0.2 s'),
  })
})

it('is not asked again after it refused a message for good', async () => {
  service.refusals = [
    { status: 422, body: { statusCode: 422, name: 'validation_error', message: 'the address cannot be' } },
  ]
  await write()
  await deliverDue(test.app, mailer)
  expect(await newest()).toMatchObject({
    state: 'given up',
    reason: 'the mail service answered 422 validation_error: the address cannot be',
  })
  await deliverDue(at(10_000), mailer)
  expect(service.asked).toBe(1)
})

it('does not deliver a message again that it took with another sender', async () => {
  const mail = { id: 'the same', to: 'ann@works.example.org', subject: 'One', text: 'One.', html: '<p>One.</p>' }
  await mailer.send(mail)
  const withAnotherSender = createMailer({ ...route, from: 'other@brackwater.example' })
  await expect(withAnotherSender.send(mail)).rejects.toThrow(MailRefused)
  expect(service.taken).toHaveLength(1)
})

it('is given nothing for what is no single address', async () => {
  for (const to of ['a@b.example, c@d.example', 'Ann <a@b.example>', 'nobody'])
    await expect(mailer.send({ id: 'x', to, subject: 's', text: 't', html: 'h' })).rejects.toThrow('not a mail address')
  expect(service.asked).toBe(0)
})

it('gets what waited for it after a restart, by the process itself', async () => {
  await write('After the restart')
  const post = await openPost(test.app, mailSettingsOf(environment(), SITE))
  await until(() => service.taken.length === 1, 20, 'the message')
  await post.stop()
  await until(async () => (await newest()).state === 'sent')
})
