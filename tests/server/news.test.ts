import { afterAll, beforeAll, expect, it } from 'vitest'
import type { Actor, App } from '../../server/app'
import { insertMembership } from '../../server/database/repositories/people'
import { setSessionWorkspace } from '../../server/database/repositories/sessions'
import { news } from '../../server/database/schema'
import type { Letter } from '../../server/mail/letter'
import { importEmbedding } from '../../server/services/embedding-import'
import { outboxOf, tell } from '../../server/services/mail'
import { wishMails } from '../../server/services/mail-wishes'
import { leaveWorkspace } from '../../server/services/members'
import { newsOf, readAllNews, readNews, sweepNews, unreadNews } from '../../server/services/news'
import { createWorkspace } from '../../server/services/people'
import { removeAccount } from '../../server/services/person-removal'
import { addRemark } from '../../server/services/run-sheet-remarks'
import { createRunSheet, removeRunSheet } from '../../server/services/run-sheets'
import { leaveSession, openSession } from '../../server/services/sessions'
import { deleteWorkspaceForGood } from '../../server/services/workspace-deletion'
import type { NewsTold } from '../../shared/schemas/news'
import { newsQuerySchema } from '../../shared/schemas/news'
import { createRunSheetSchema } from '../../shared/schemas/run-sheets'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { emptyFolder } from '../support/folders'
import { newMember } from '../support/people'
import { startPostgres } from '../support/postgres'
import { until } from '../support/server'

const DAY_MS = 86_400_000

let postgres: Awaited<ReturnType<typeof startPostgres>>
let test: TestApp
/** Another process of the same installation. */
let other: TestApp
let people = 0

// On a server, which several processes share and where transactions go on at the same time.
beforeAll(async () => {
  postgres = await startPostgres()
  test = await startTestApp(1, emptyFolder(), undefined, postgres.url)
  other = await startTestApp(1, emptyFolder(), test.actor, postgres.url)
  await newMember(test.app, test.actor, 'Owner', ['owner'])
})
afterAll(async () => {
  await other?.close()
  await test?.close()
  await postgres?.stop()
})

const member = (workspaceId = test.actor.workspaceId) =>
  newMember(test.app, { userId: '', workspaceId }, `Member${++people}`, ['developer'])

async function alsoIn({ userId }: Actor): Promise<Actor> {
  return test.app.db.transaction(async (tx) => {
    const workspaceId = await createWorkspace(test.app, tx, 'Elsewhere')
    await insertMembership(tx, { userId, workspaceId, roles: ['owner'], createdAt: new Date() })
    return { userId, workspaceId }
  })
}

const letter = (change: Partial<Letter> = {}): Letter => ({
  kind: 'run sheet remark',
  subject: 'Wim on RS-4: Berths',
  parts: [{ text: 'Wim wrote on RS-4, Berths:' }, { quote: 'Fewer reads.\nWill do.' }],
  action: { label: 'Open RS-4', path: '/run-sheets/review' },
  because: 'you prepared it',
  ...change,
})
const at = (app: App, time: Date): App => ({ ...app, now: () => time })
const write = (to: Actor, change: Partial<Letter> = {}, app = test.app) =>
  app.db.transaction((tx) => tell(app, tx, { ...to, by: null }, new Map([[to.userId, letter(change)]])))
const list = (actor: Actor, query: Record<string, unknown> = {}, app = test.app) =>
  newsOf(app, actor, newsQuerySchema.parse({ limit: 200, ...query }))
const titles = async (actor: Actor, query = {}) => (await list(actor, query)).items.map(({ title }) => title)

async function runSheet(): Promise<string> {
  const problemId = await test.problem('a b 1\n')
  const machineId = await test.machine({ kind: 'king', width: 2, height: 2 })
  const chains = { a: [0], b: [1] }
  const { id: embeddingId } = await importEmbedding(test.app, test.actor, { problemId, machineId, chains })
  const input = createRunSheetSchema.parse({ embeddingId, name: 'Berths', reads: 100 })
  return (await createRunSheet(test.app, test.actor, input)).id
}

it('is written with the mail, in words of its own, or not at all', async () => {
  const ann = await member()
  await write(ann)
  expect(await list(ann)).toMatchObject({
    items: [
      {
        kind: 'run sheet remark',
        title: 'Wim on RS-4: Berths',
        text: 'Wim wrote on RS-4, Berths:',
        quote: 'Fewer reads.\nWill do.',
        path: '/run-sheets/review',
        isGone: false,
        readAt: null,
      },
    ],
    nextCursor: null,
    unread: 1,
  })
  const mails = async () => (await outboxOf(test.app, test.actor, { limit: 200 })).items.length
  const before = await mails()
  const failing = test.app.db.transaction(async (tx) => {
    await tell(test.app, tx, { ...ann, by: null }, new Map([[ann.userId, letter()]]))
    throw new Error('no')
  })
  await expect(failing).rejects.toThrow('no')
  expect([await mails(), (await list(ann)).items.length]).toEqual([before, 1])
})

it('is for members, and never for who did it', async () => {
  const [ann, bea, stranger] = [await member(), await member(), await alsoIn(await member())]
  const told = new Map([ann, bea, stranger].map(({ userId }) => [userId, letter()]))
  await leaveWorkspace(test.app, { ...stranger, workspaceId: test.actor.workspaceId })
  await test.app.db.transaction((tx) => tell(test.app, tx, { ...ann, by: bea.userId }, told))
  expect(await titles(ann)).toHaveLength(1)
  for (const one of [bea, stranger, { ...stranger, workspaceId: ann.workspaceId }])
    expect(await titles(one)).toEqual([])
})

it('comes also where no mail is wanted, and once where mail would come for another reason', async () => {
  const ann = await member()
  const id = await runSheet()
  const remark = `@[${test.actor.userId}] and @[${ann.userId}]`
  for (const actor of [test.actor, ann]) await wishMails(test.app, actor, ['run sheet remark'])
  const wim = await member()
  await addRemark(test.app, wim, id, remark)
  const [mail] = (await outboxOf(test.app, ann, { limit: 1 })).items
  expect(mail).toMatchObject({ kind: 'run sheet remark', to: { name: 'Developer' } })
  for (const actor of [test.actor, ann])
    expect((await list(actor)).items.filter(({ path }) => path.endsWith(id))).toMatchObject([{ kind: 'mention' }])
})

it('says what is gone, and still tells of it', async () => {
  const ann = await member()
  const id = await runSheet()
  await addRemark(test.app, test.actor, id, `@[${ann.userId}], look.`)
  expect((await list(ann)).items).toMatchObject([{ isGone: false, quote: expect.stringContaining('look.') }])
  await removeRunSheet(test.app, test.actor, id)
  expect((await list(ann)).items).toMatchObject([{ isGone: true, title: expect.stringContaining('RS-') }])
})

it('is read by its own person in its own workspace only', async () => {
  const [ann, bea] = [await member(), await member()]
  const elsewhere = await alsoIn(ann)
  await write(ann)
  await write(elsewhere)
  const [item] = (await list(ann)).items
  const missing = { kind: 'not found', code: 'news.missing' }
  for (const actor of [bea, elsewhere]) {
    await expect(readNews(test.app, actor, item!.id)).rejects.toMatchObject(missing)
    await readAllNews(test.app, bea)
  }
  expect(await unreadNews(test.app, ann)).toEqual({ unread: 1 })
  expect(await readNews(other.app, ann, item!.id)).toEqual({ unread: 0 })
  const { readAt } = (await list(ann)).items[0]!
  await readNews(at(test.app, new Date(Date.now() + DAY_MS)), ann, item!.id)
  expect((await list(ann)).items[0]!.readAt).toBe(readAt)
  expect(await unreadNews(test.app, elsewhere)).toEqual({ unread: 1 })
})

it('is listed newest first, page by page, however much is read or comes meanwhile', async () => {
  const ann = await member()
  const start = Date.now() - DAY_MS
  // Three of each moment, so that pages end between items of one time.
  for (let k = 0; k < 12; k++)
    await write(ann, { subject: `${k}` }, at(test.app, new Date(start + Math.floor(k / 3) * 1000)))
  const seen: string[] = []
  let cursor: string | null = null
  for (let page = 0; page === 0 || cursor; page++) {
    const shown = await list(ann, { unread: 'true', limit: 5, ...(cursor ? { cursor } : {}) })
    seen.push(...shown.items.map(({ title }) => title))
    for (const { id } of shown.items) await readNews(test.app, ann, id)
    await write(ann, { subject: 'later' })
    cursor = shown.nextCursor
  }
  expect(new Set(seen).size).toBe(12)
  expect(seen).toHaveLength(12)
  expect(seen.map((title) => Math.floor(Number(title) / 3))).toEqual([3, 3, 3, 2, 2, 2, 1, 1, 1, 0, 0, 0])
  expect((await titles(ann)).slice(0, 3)).toEqual(['later', 'later', 'later'])
  await expect(list(ann, { cursor: 'none of ours' })).rejects.toMatchObject({ code: 'list.cursor' })
})

it('is read all at once up to what was seen, whoever else does the same', async () => {
  const ann = await member()
  const start = Date.now() - DAY_MS
  for (let k = 0; k < 4; k++) await write(ann, { subject: `${k}` }, at(test.app, new Date(start + k)))
  const upTo = new Date(start + 2).toISOString()
  const answers = await Promise.all(
    Array.from({ length: 8 }, (_, k) => readAllNews((k % 2 ? other : test).app, ann, upTo)),
  )
  expect(answers).toEqual(answers.map(() => ({ unread: 1 })))
  expect(await titles(ann, { unread: 'true' })).toEqual(['3'])
  expect(new Set((await list(ann)).items.slice(1).map(({ readAt }) => readAt)).size).toBe(1)
  expect(await readAllNews(test.app, ann)).toEqual({ unread: 0 })
})

it('goes with membership, account and workspace', async () => {
  const [leaves, ends] = [await member(), await member()]
  for (const actor of [leaves, ends]) await write(actor)
  await leaveWorkspace(test.app, leaves)
  const again = { ...leaves, roles: ['reader' as const], createdAt: new Date() }
  await test.app.db.transaction((tx) => insertMembership(tx, again))
  expect(await list(leaves)).toMatchObject({ items: [], unread: 0 })
  await test.app.db.transaction((tx) => removeAccount(tx, ends.userId))
  const elsewhere = await alsoIn(await member())
  await write(elsewhere)
  await test.app.db.transaction((tx) => deleteWorkspaceForGood(test.app, tx, elsewhere.workspaceId))
  const left = (await test.app.db.select().from(news)).map(({ userId }) => userId)
  for (const { userId } of [leaves, ends, elsewhere]) expect(left).not.toContain(userId)
})

it('is kept for a month once read, and for a quarter of a year unread', async () => {
  const ann = await member()
  const now = Date.now()
  const daysAgo = (days: number) => at(test.app, new Date(now - days * DAY_MS))
  for (const days of [91, 89, 60, 40]) await write(ann, { subject: `${days}` }, daysAgo(days))
  const items = (await list(ann)).items
  const idOf = (title: string) => items.find((item) => item.title === title)!.id
  await readNews(daysAgo(31), ann, idOf('60'))
  await readNews(daysAgo(29), ann, idOf('40'))
  await sweepNews(at(test.app, new Date(now)))
  expect(await titles(ann)).toEqual(['40', '89'])
})

const device = { userAgent: 'Firefox/140.0', address: '192.0.2.1' }

/** Follows somebody’s news in the other process. */
async function follow(actor: Actor) {
  const sessionId = await openSession(test.app, actor, device)
  const told: NewsTold[] = []
  let isOver = false
  const end = other.app.newsWatch.follow({
    ...{ ...actor, sessionId },
    told: (news) => told.push(news),
    over: () => (isOver = true),
  })
  await until(() => told.length > 0, 5, 'the first number')
  return { sessionId, told, isOver: () => isOver, end }
}

it('is told within seconds to whoever follows, whichever process writes or reads it', async () => {
  const [ann, bea] = [await member(), await member()]
  const [hers, beas] = [await follow(ann), await follow(bea)]
  expect(hers.told).toEqual([{ unread: 0, newest: null }])
  await write(ann, { subject: 'One' })
  await until(() => hers.told.length === 2, 5, 'the news')
  expect(hers.told[1]).toMatchObject({ unread: 1, newest: { title: 'One', readAt: null } })
  await write(ann, { subject: 'Two' })
  await until(() => hers.told.at(-1)!.newest!.title === 'Two', 5, 'more news')
  await readAllNews(test.app, ann)
  await until(() => hers.told.at(-1)!.unread === 0, 5, 'that it was read')
  expect(hers.told.at(-1)!.newest).toMatchObject({ title: 'Two', readAt: expect.any(String) })
  expect(beas.told).toEqual([{ unread: 0, newest: null }])
  const before = hers.told.length
  hers.end()
  await write(ann)
  await write(bea)
  await until(() => beas.told.length === 2, 5, 'her news')
  expect(hers.told).toHaveLength(before)
  beas.end()
})

it('is told no more once a session ended, went elsewhere, or its person left', async () => {
  const [ann, bea, cyd] = [await member(), await member(), await member()]
  const followed = [await follow(ann), await follow(bea), await follow(cyd)]
  await leaveSession(test.app, followed[0]!.sessionId)
  await setSessionWorkspace(test.app.db, followed[1]!.sessionId, (await alsoIn(bea)).workspaceId)
  await leaveWorkspace(test.app, cyd)
  await until(() => followed.every(({ isOver }) => isOver()), 5, 'three ends')
  for (const actor of [ann, bea]) await write(actor)
  const last = await follow(await member())
  expect(followed.map(({ told }) => told.length)).toEqual([1, 1, 1])
  other.app.newsWatch.stop()
  expect(last.isOver()).toBe(true)
  let isOver = false
  other.app.newsWatch.follow({ ...ann, sessionId: '-', told: () => undefined, over: () => (isOver = true) })
  expect(isOver).toBe(true)
})
