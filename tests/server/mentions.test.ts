import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, expect, it } from 'vitest'
import type { Actor } from '../../server/app'
import { users } from '../../server/database/schema'
import { importEmbedding } from '../../server/services/embedding-import'
import { outboxOf } from '../../server/services/mail'
import { wishMails } from '../../server/services/mail-wishes'
import { leaveWorkspace } from '../../server/services/members'
import { createWorkspace } from '../../server/services/people'
import { handOver } from '../../server/services/review'
import { reviewQueue } from '../../server/services/review-queue'
import { addRemark } from '../../server/services/run-sheet-remarks'
import { createRunSheet, runSheetView } from '../../server/services/run-sheets'
import { CHOSEN_MAIL_KINDS } from '../../shared/schemas/mail'
import { createRunSheetSchema } from '../../shared/schemas/run-sheets'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { newMember } from '../support/people'

let test: TestApp
let writer: Actor
let mia: Actor
let sheetId: string

beforeAll(async () => {
  test = await startTestApp(1)
  writer = await newMember(test.app, test.actor, 'Wim', ['owner'])
  mia = await newMember(test.app, test.actor, 'Mia', ['reader'])
  const problemId = await test.problem('a b 1\n')
  const machineId = await test.machine({ kind: 'king', width: 2, height: 2 })
  const { id: embeddingId } = await importEmbedding(test.app, test.actor, {
    problemId,
    machineId,
    chains: { a: [0], b: [1] },
  })
  const input = createRunSheetSchema.parse({ embeddingId, name: 'Berths', reads: 100 })
  sheetId = (await createRunSheet(test.app, test.actor, input)).id
})
afterAll(() => test?.close())

const outbox = async () => (await outboxOf(test.app, writer, { limit: 200 })).items

/** Writes a remark. @returns whom it was told, by which kind of message */
async function say(remark: string, by = writer) {
  const before = (await outbox()).length
  await addRemark(test.app, by, sheetId, remark)
  const items = await outbox()
  return items
    .slice(0, items.length - before)
    .map(({ to, kind }) => `${to.name}: ${kind}`)
    .sort()
}
const last = async () => (await runSheetView(test.app, writer, sheetId)).remarks.at(-1)!

it('tells who is mentioned, and by name in the message', async () => {
  const text = `@[${mia.userId}], is this right? @[${mia.userId}]`
  expect(await say(text)).toEqual(['Developer: run sheet remark', 'Mia: mention'])
  const message = (await outbox()).find(({ kind }) => kind === 'mention')!
  expect(message.subject).toMatch(/^Wim names you on RS-1/)
  expect(message.text).toContain('> @Mia, is this right? @Mia')
  expect(message.text).toContain('you are named in the remark')
  expect(await last()).toMatchObject({ text, mentions: [{ id: mia.userId, name: 'Mia' }] })
})

it('tells nobody twice, nor who wrote it', async () => {
  expect(await say(`@[${test.actor.userId}] and @[${writer.userId}]`)).toEqual(['Developer: mention'])
})

it('honours what somebody does not want', async () => {
  const but = (unwanted: string[]) => CHOSEN_MAIL_KINDS.filter((kind) => !unwanted.includes(kind))
  const both = `@[${mia.userId}] @[${test.actor.userId}]`
  for (const actor of [mia, test.actor]) await wishMails(test.app, actor, but(['mention']))
  expect(await say(both)).toEqual(['Developer: run sheet remark'])
  for (const actor of [mia, test.actor]) await wishMails(test.app, actor, but(['run sheet remark']))
  expect(await say(both)).toEqual(['Developer: mention', 'Mia: mention'])
  for (const actor of [mia, test.actor]) await wishMails(test.app, actor, CHOSEN_MAIL_KINDS)
})

it('tells whom the remark of a hand-over mentions, beside those whom it concerns', async () => {
  const rita = await newMember(test.app, test.actor, 'Rita', ['reviewer'])
  const before = (await outbox()).length
  const text = `@[${mia.userId}] and @[${rita.userId}], look at the gauges.`
  await handOver(test.app, test.actor, sheetId, 'submit', text)
  const items = await outbox()
  const told = items.slice(0, items.length - before)
  expect(told.map(({ to, kind }) => `${to.name}: ${kind}`).sort()).toEqual([
    'Mia: mention',
    'Rita: run sheet handed over',
  ])
  for (const message of told) expect(message.text).toContain('> @Mia and @Rita, look at the gauges.')
  expect(await last()).toMatchObject({ text, mentions: [{ name: 'Mia' }, { name: 'Rita' }] })
  expect((await reviewQueue(test.app, rita, { limit: 10 })).items[0]!.remark).toBe(
    '@Mia and @Rita, look at the gauges.',
  )
  const stranger = handOver(test.app, rita, sheetId, 'sendBack', '@[nobody], change it.')
  await expect(stranger).rejects.toMatchObject({ code: 'remark.mentions' })
  expect((await runSheetView(test.app, writer, sheetId)).state).toBe('in review')
})

it('shows the name that a person has now, also once they left', async () => {
  await say(`@[${mia.userId}]`)
  await test.app.db.update(users).set({ name: 'Mia Lorn' }).where(eq(users.id, mia.userId))
  await leaveWorkspace(test.app, mia)
  expect((await last()).mentions).toEqual([{ id: mia.userId, name: 'Mia Lorn' }])
})

it('takes none of somebody who is no member, or was never', async () => {
  const elsewhere = await test.app.db.transaction((tx) => createWorkspace(test.app, tx, 'Elsewhere'))
  const stranger = await newMember(test.app, { userId: '', workspaceId: elsewhere }, 'Stran', ['reader'])
  const refused = { kind: 'not acceptable', code: 'remark.mentions', issues: [{ path: 'remark' }] }
  const before = (await runSheetView(test.app, writer, sheetId)).remarks.length
  for (const id of [stranger.userId, mia.userId, 'nobody']) await expect(say(`@[${id}]`)).rejects.toMatchObject(refused)
  const many = Array.from({ length: 21 }, (_, k) => `@[person-${k}]`).join(' ')
  await expect(say(many)).rejects.toMatchObject({ code: 'remark.mentions' })
  expect((await runSheetView(test.app, writer, sheetId)).remarks).toHaveLength(before)
})
