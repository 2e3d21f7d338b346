import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import type { Actor, App } from '../../server/app'
import { createMailer } from '../../server/mail/create-mailer'
import type { Letter } from '../../server/mail/letter'
import type { Mailer } from '../../server/mail/mailer'
import { deliverDue, openPost } from '../../server/mail/post'
import { importEmbedding } from '../../server/services/embedding-import'
import { outboxOf, tell } from '../../server/services/mail'
import { handOver } from '../../server/services/review'
import { createRunSheet } from '../../server/services/run-sheets'
import type { MailState, MailView } from '../../shared/schemas/mail'
import { outboxQuerySchema } from '../../shared/schemas/mail'
import { createRunSheetSchema } from '../../shared/schemas/run-sheets'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { dyingAfter } from '../support/mailers'
import type { MailServer } from '../support/mail-server'
import { startMailServer } from '../support/mail-server'
import { newMember } from '../support/people'
import { until } from '../support/server'

const FROM = 'Espalier <espalier@brackwater.example>'
const SITE = 'https://espalier.brackwater.example/plan'
const MINUTE = 60_000

let test: TestApp
let server: MailServer
let mailer: Mailer
let reviewer: Actor
let ann: Actor
beforeAll(async () => {
  test = await startTestApp(1)
  reviewer = await newMember(test.app, test.actor, 'Reviewer', ['reviewer'])
  ann = await newMember(test.app, test.actor, 'Ann', ['reader'])
  server = await startMailServer()
  mailer = createMailer({ by: 'smtp', url: server.url, from: FROM })
  // Tells the database that there is a mail server; the looks themselves are the test's.
  await (await openPost(test.app, { route: { by: 'smtp', url: server.url, from: FROM }, site: SITE })).stop()
})
afterAll(async () => {
  await server.close()
  await test.close()
})
beforeEach(async () => {
  server.answer = 'take'
  server.onTaken = () => undefined
  await deliverDue(at(60 * 24 * 30), mailer)
  server.taken.length = 0
})

/** The same application some minutes later. */
const at = (minutes: number): App => ({ ...test.app, now: () => new Date(Date.now() + minutes * MINUTE) })

const letter = (change: Partial<Letter> = {}): Letter => ({
  kind: 'embedding broken',
  subject: 'A calibration broke an embedding',
  parts: [{ text: 'Words.' }, { list: [{ text: 'E-1', path: '/embeddings/one', under: ['2 of 40 chains damaged'] }] }],
  action: { label: 'Open the machine', path: '/machines/alder#broken' },
  because: 'you made the embedding',
  ...change,
})
const write = (change: Partial<Letter> = {}, by: string | null = null, app = test.app) =>
  app.db.transaction((tx) =>
    tell(app, tx, { workspaceId: test.actor.workspaceId, by }, new Map([[ann.userId, letter(change)]])),
  )
const outbox = async (state?: MailState): Promise<MailView[]> =>
  (await outboxOf(test.app, test.actor, outboxQuerySchema.parse({ state, limit: 200 }))).items
const newest = async (): Promise<MailView> => (await outbox())[0]!

describe('a message', () => {
  it('reaches one person as text and as HTML that say the same, with a link and the reason', async () => {
    await write()
    await deliverDue(test.app, mailer)
    expect(await newest()).toMatchObject({ state: 'sent', attempts: 1, reason: null, nextAttemptAt: null })
    const [{ mail, to }] = server.taken as [MailServer['taken'][number]]
    expect(to).toEqual(['ann@works.example.org'])
    expect(mail.from?.text).toBe('"Espalier" <espalier@brackwater.example>')
    expect(mail.messageId).toBe(`<${(await newest()).id}@brackwater.example>`)
    expect(mail.headers.get('auto-submitted')).toBe('auto-generated')
    const link = `${SITE}/machines/alder#broken`
    expect(mail.text).toContain(`Open the machine:\n${link}\n`)
    expect(mail.text).toContain(`- E-1\n  ${SITE}/embeddings/one\n  2 of 40 chains damaged`)
    expect(mail.text).toContain('You get this because you made the embedding.')
    expect(mail.html).toContain(`<a href="${link}"`)
    expect(mail.html).toContain('2 of 40 chains damaged')
    expect(mail.html).toContain('You get this because you made the embedding.')
    expect(mail.html).not.toMatch(/<img|<script|<link|url\(/)
  })

  it('takes nothing from what people typed but words', async () => {
    const nasty = 'Ann\r\nBcc: all@works.example.org\r\n\r\n<script>alert("1")</script>\u202Egnp'
    await write({ subject: nasty, parts: [{ text: nasty }, { quote: nasty }], because: nasty })
    await deliverDue(test.app, mailer)
    const [{ mail, raw, to }] = server.taken as [MailServer['taken'][number]]
    expect(to).toEqual(['ann@works.example.org'])
    expect(mail.bcc).toBeUndefined()
    expect(raw.split('\r\n\r\n')[0]).not.toMatch(/^Bcc:/m)
    expect(mail.subject).toBe('Ann Bcc: all@works.example.org <script>alert("1")</script> gnp')
    expect(mail.html).not.toContain('<script>')
    expect(mail.html).toContain('&lt;script&gt;')
    expect(mail.text).not.toContain('\u202E')
  })

  it('is not written to whoever did it, nor to somebody of another workspace, nor when nothing came of it', async () => {
    const before = (await outbox()).length
    await write({}, ann.userId)
    await test.app.db.transaction((tx) =>
      tell(test.app, tx, { workspaceId: 'elsewhere', by: null }, new Map([[ann.userId, letter()]])),
    )
    const undone = test.app.db.transaction(async (tx) => {
      await tell(test.app, tx, { workspaceId: ann.workspaceId, by: null }, new Map([[ann.userId, letter()]]))
      throw new Error('rolled back')
    })
    await expect(undone).rejects.toThrow('rolled back')
    expect((await outbox()).length).toBe(before)
    expect(await outboxOf(test.app, { ...test.actor, workspaceId: 'elsewhere' }, outboxQuerySchema.parse({}))).toEqual({
      items: [],
      nextCursor: null,
      counts: { waiting: 0, sent: 0, kept: 0, 'given up': 0 },
    })
  })
})

describe('a mail server', () => {
  it('that says not now is asked again after a minute, then five, then thirty', async () => {
    server.answer = { at: 'text', code: 451 }
    await write()
    for (const [minutes, attempts] of [
      [0, 1],
      [0.5, 1],
      [1.1, 2],
      [5, 2],
      [6.2, 3],
      [30, 3],
    ] as const) {
      await deliverDue(at(minutes), mailer)
      expect(await newest()).toMatchObject({ state: 'waiting', attempts, reason: expect.stringContaining('451') })
    }
    server.answer = 'take'
    await deliverDue(at(37), mailer)
    expect(await newest()).toMatchObject({ state: 'sent', attempts: 4, reason: null })
    await deliverDue(at(10_000), mailer)
    expect(server.taken).toHaveLength(1)
  })

  it('that refuses a message for good is not asked again', async () => {
    for (const stage of ['envelope', 'text'] as const) {
      server.answer = { at: stage, code: 550 }
      await write()
      await deliverDue(test.app, mailer)
      expect(await newest()).toMatchObject({
        state: 'given up',
        attempts: 1,
        reason: expect.stringContaining('550'),
        nextAttemptAt: null,
      })
    }
    server.answer = 'take'
    await deliverDue(at(10_000), mailer)
    expect(server.taken).toEqual([])
  })

  it('that cannot be reached is tried for two days, then given up', async () => {
    const gone = await startMailServer()
    const lost = createMailer({ by: 'smtp', url: gone.url, from: FROM })
    await gone.close()
    await write()
    let minutes = 0
    let attempts = 0
    for (; (await newest()).state === 'waiting'; minutes += 30) {
      await deliverDue(at(minutes), lost)
      attempts = (await newest()).attempts
    }
    expect(attempts).toBe(9)
    expect(minutes / 60).toBeGreaterThan(40)
    expect(minutes / 60).toBeLessThan(50)
    expect(await newest()).toMatchObject({ state: 'given up', reason: expect.stringContaining('ECONNREFUSED') })
  })

  it('gets a message once from several processes', async () => {
    for (let i = 0; i < 6; i++) await write({ subject: `Number ${i}` })
    await Promise.all(Array.from({ length: 4 }, () => deliverDue(test.app, mailer)))
    expect(server.taken.map(({ mail }) => mail.subject).sort()).toEqual(
      Array.from({ length: 6 }, (_, i) => `Number ${i}`),
    )
  })

  it('gets a message again, recognisably, where the process ended before it noted the answer', async () => {
    await write()
    void deliverDue(test.app, dyingAfter(mailer))
    await until(() => server.taken.length === 1)
    await deliverDue(test.app, mailer)
    expect(server.taken).toHaveLength(1)
    expect(await newest()).toMatchObject({ state: 'waiting', attempts: 1 })
    await deliverDue(at(1.1), mailer)
    expect(await newest()).toMatchObject({ state: 'sent', attempts: 2 })
    expect(new Set(server.taken.map(({ mail }) => mail.messageId)).size).toBe(1)
  })

  it('gets what waited for it after a restart, by the process itself', async () => {
    await write({ subject: 'After the restart' })
    const post = await openPost(test.app, { route: { by: 'smtp', url: server.url, from: FROM }, site: SITE })
    await until(() => server.taken.length === 1, 20, 'the message')
    await post.stop()
    expect(server.taken[0]!.mail.subject).toBe('After the restart')
    expect(await newest()).toMatchObject({ state: 'sent' })
  })

  it('that is no longer there leaves messages to be read in the product', async () => {
    await write({ subject: 'Waits' })
    await openPost(test.app, { route: null, site: SITE })
    await write({ subject: 'Kept at once' })
    expect((await outbox('kept')).slice(0, 2).map(({ subject, attempts }) => [subject, attempts])).toEqual([
      ['Kept at once', 0],
      ['Waits', 0],
    ])
    await deliverDue(test.app, mailer)
    expect(server.taken).toEqual([])
    await (await openPost(test.app, { route: { by: 'smtp', url: server.url, from: FROM }, site: SITE })).stop()
    // Old news is not sent when there is a server again.
    await deliverDue(at(10_000), mailer)
    expect(server.taken).toEqual([])
  })
})

it('tells the people concerned of every hand-over of a run sheet', async () => {
  const { app, actor } = test
  const problemId = await test.problem('a b 1\n')
  const machineId = await test.machine({ kind: 'square', width: 2, height: 2 })
  const { id: embeddingId } = await importEmbedding(app, actor, { problemId, machineId, chains: { a: [0], b: [1] } })
  const both = await newMember(app, actor, 'Both', ['developer', 'reviewer'])
  const { id, number } = await createRunSheet(app, both, createRunSheetSchema.parse({ embeddingId, name: 'Berths' }))
  const said: Record<string, string[]> = {}
  const step = async (who: Actor, name: Parameters<typeof handOver>[3], remark: string) => {
    await handOver(app, who, id, name, remark)
    await deliverDue(app, mailer)
    const taken = server.taken.splice(0)
    for (const { mail } of taken) if (remark) expect(mail.text).toContain(`> ${remark}`)
    for (const { mail } of taken) expect(mail.text).toContain(`${SITE}/run-sheets/${id}\n`)
    said[name] = taken.map(({ mail, to }) => `${to[0]}: ${mail.subject}`)
  }
  await step(both, 'submit', 'First run.')
  expect(said.submit).toEqual([`reviewer@works.example.org: RS-${number} waits for review: Berths`])
  await step(reviewer, 'sendBack', 'More reads, please.')
  expect(said.sendBack).toEqual([`both@works.example.org: RS-${number} was sent back: Berths`])
  await step(both, 'submit', '')
  await step(reviewer, 'approve', '')
  expect(said.approve).toEqual([`both@works.example.org: RS-${number} is approved: Berths`])
  await step(actor, 'issue', '')
  expect(said.issue!.sort()).toEqual([
    `both@works.example.org: RS-${number} is issued: Berths`,
    `reviewer@works.example.org: RS-${number} is issued: Berths`,
  ])
})
