import type { H3Event } from 'h3'
import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest'
import type { Actor, App } from '../../server/app'
import { auditTrail } from '../../server/services/audit'
import { importEmbedding } from '../../server/services/embedding-import'
import { outboxOf } from '../../server/services/mail'
import { changeRoles, removeMember } from '../../server/services/members'
import { rolesIn } from '../../server/services/people'
import { handOver } from '../../server/services/review'
import { createRunSheet, runSheetView } from '../../server/services/run-sheets'
import { makeStandIn, reviewsFor, standInsOf, takeBackStandIn } from '../../server/services/stand-ins'
import { audited } from '../../server/utils/audited'
import { auditQuerySchema } from '../../shared/schemas/audit'
import { createRunSheetSchema } from '../../shared/schemas/run-sheets'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { newMember } from '../support/people'

const missing = { kind: 'forbidden', code: 'role.missing' }
const own = { kind: 'forbidden', code: 'run-sheet.own' }
const DAYS = { startsOn: '2027-03-10', endsOn: '2027-03-12' }
let test: TestApp
let owner: Actor
let maud: Actor
let per: Actor
let embeddingId: string
let people = 0

beforeAll(async () => {
  test = await startTestApp(1)
  owner = await newMember(test.app, test.actor, 'Olga', ['owner'])
  const problemId = await test.problem('a b 1\n')
  const machineId = await test.machine({ kind: 'king', width: 2, height: 2 })
  const chains = { a: [0], b: [1] }
  embeddingId = (await importEmbedding(test.app, test.actor, { problemId, machineId, chains })).id
})
/** A reviewer and a member of each test's own. */
beforeEach(async () => {
  maud = await newMember(test.app, test.actor, `Maud${++people}`, ['reviewer', 'developer'])
  per = await newMember(test.app, test.actor, `Per${people}`, ['developer'])
})
afterAll(() => test?.close())

/** The application at a moment. */
const at = (moment: string): App => ({ ...test.app, now: () => new Date(moment) })
const before = () => at('2027-03-09T23:59:59Z')
const during = () => at('2027-03-11T12:00:00Z')
const after = () => at('2027-03-13T00:00:00Z')

const asking = async (actor: Actor) => ({ ...actor, roles: (await rolesIn(test.app, actor)) ?? [] })
const make = async (by: Actor, input: Partial<Parameters<typeof makeStandIn>[2]> = {}) =>
  makeStandIn(before(), await asking(by), { byId: per.userId, ...DAYS, ...input })

async function submitted(by: Actor = test.actor): Promise<string> {
  const input = createRunSheetSchema.parse({ embeddingId, name: 'Berths', reads: 100 })
  const { id } = await createRunSheet(test.app, by, input)
  await handOver(test.app, by, id, 'submit', '')
  return id
}
const approve = (app: App, actor: Actor, id: string) => handOver(app, actor, id, 'approve', '')
const sendBack = (app: App, actor: Actor, id: string) => handOver(app, actor, id, 'sendBack', 'No.')

it('lets the member decide from the first day to the last, and says in whose place', async () => {
  const [one, two] = [await submitted(), await submitted()]
  await expect(approve(during(), per, one)).rejects.toMatchObject(missing)
  await make(maud)
  await expect(approve(before(), per, one)).rejects.toMatchObject(missing)
  await expect(approve(after(), per, one)).rejects.toMatchObject(missing)
  expect(await reviewsFor(before(), per)).toEqual([])
  expect(await reviewsFor(at('2027-03-10T00:00:00Z'), per)).toMatchObject([{ id: maud.userId }])
  expect(await reviewsFor(at('2027-03-12T23:59:59Z'), per)).toMatchObject([{ id: maud.userId }])
  expect(await reviewsFor(after(), per)).toEqual([])

  expect(await approve(during(), per, one)).toMatchObject({ state: 'approved', for: { id: maud.userId } })
  expect(await sendBack(during(), per, two)).toMatchObject({ state: 'sent back', for: { id: maud.userId } })
  expect((await runSheetView(test.app, per, one)).remarks.at(-1)).toMatchObject({
    ...{ what: 'approved', by: { id: per.userId }, for: { id: maud.userId } },
  })
})

it('leaves a reviewer the right of their own, away or not', async () => {
  await make(maud)
  expect(await approve(during(), maud, await submitted())).toMatchObject({ state: 'approved', for: null })
})

it('lets nobody decide on their own run sheet, nor on that of whom they review for', async () => {
  await make(maud)
  const [theirs, hers] = [await submitted(per), await submitted(maud)]
  for (const step of [approve, sendBack]) {
    await expect(step(during(), per, theirs)).rejects.toMatchObject(own)
    await expect(step(during(), per, hers)).rejects.toMatchObject(own)
  }
})

it('ends when it is taken back, by the reviewer or an owner alone', async () => {
  const id = await submitted()
  const { id: first } = await make(maud)
  const other = await newMember(test.app, test.actor, `Rita${people}`, ['reviewer'])
  const refused = { kind: 'forbidden', code: 'stand-in.others' }
  await expect(takeBackStandIn(during(), await asking(other), first)).rejects.toMatchObject(refused)
  await takeBackStandIn(during(), await asking(maud), first)
  await expect(approve(during(), per, id)).rejects.toMatchObject(missing)
  const { id: second } = await make(maud)
  await takeBackStandIn(before(), await asking(owner), second)
  await expect(takeBackStandIn(before(), await asking(owner), second)).rejects.toMatchObject({ kind: 'not found' })
})

it('ends for good with the role, or with the membership of either', async () => {
  await make(maud)
  await changeRoles(test.app, owner, maud.userId, ['developer'])
  await changeRoles(test.app, owner, maud.userId, ['reviewer'])
  expect(await reviewsFor(during(), per)).toEqual([])
  await make(maud)
  await removeMember(test.app, owner, maud.userId)
  await expect(approve(during(), per, await submitted())).rejects.toMatchObject(missing)
  const again = await newMember(test.app, test.actor, `Mia${people}`, ['reviewer'])
  await make(again)
  await removeMember(test.app, owner, per.userId)
  expect(await reviewsFor(during(), per)).toEqual([])
  expect((await standInsOf(during(), owner, { limit: 50 })).items.filter(({ by }) => by.id === per.userId)).toEqual([])
})

it('is made by a reviewer for themselves, and by an owner for any reviewer', async () => {
  const other = await newMember(test.app, test.actor, `Rita${people}`, ['reviewer'])
  await expect(make(other, { forId: maud.userId })).rejects.toMatchObject({ code: 'stand-in.others' })
  await make(owner, { forId: maud.userId })
  expect(
    (await standInsOf(during(), per, { limit: 50 })).items.find((item) => item.for.id === maud.userId),
  ).toMatchObject({
    ...{ ...DAYS, by: { id: per.userId }, isOn: true },
  })
})

it.each<[string, () => Partial<Parameters<typeof makeStandIn>[2]>, object]>([
  ['no reviewer', () => ({ forId: per.userId }), { code: 'stand-in.reviewer', issues: [{ path: 'forId' }] }],
  ['the same person', () => ({ forId: maud.userId, byId: maud.userId }), { code: 'stand-in.same' }],
  ['no member', () => ({ forId: maud.userId, byId: 'nobody' }), { kind: 'not found', code: 'member.missing' }],
  ['days the wrong way round', () => ({ forId: maud.userId, endsOn: '2027-03-09' }), { code: 'stand-in.days' }],
  [
    'days that are over',
    () => ({ forId: maud.userId, startsOn: '2027-01-01', endsOn: '2027-01-02' }),
    { code: 'stand-in.over' },
  ],
  ['years', () => ({ forId: maud.userId, endsOn: '2029-01-01' }), { code: 'stand-in.long' }],
])('is not made with %s', async (_what, input, refused) => {
  await expect(make(owner, input())).rejects.toMatchObject(refused)
})

it('puts the reviews of one person into one pair of hands a day', async () => {
  await make(maud)
  await expect(make(maud, { startsOn: '2027-03-12', endsOn: '2027-03-20' })).rejects.toMatchObject({
    ...{ kind: 'wrong state', code: 'stand-in.overlaps' },
  })
  await make(maud, { startsOn: '2027-03-13', endsOn: '2027-03-20' })
})

it('tells the member, of what waits meanwhile too, and the audit trail in whose place it was done', async () => {
  await make(maud)
  const id = (
    await createRunSheet(test.app, test.actor, createRunSheetSchema.parse({ embeddingId, name: 'Told', reads: 100 }))
  ).id
  await handOver(during(), test.actor, id, 'submit', '')
  const { items } = await outboxOf(test.app, owner, { limit: 200 })
  const name = `Per${people}`
  const subjects = items.filter(({ to }) => to.name === name).map(({ subject }) => subject)
  expect(subjects.sort()).toEqual([
    expect.stringMatching(/^RS-\d+ waits for review: Told/),
    expect.stringMatching(/^You review for Maud/),
  ])

  const node = { req: { headers: {}, socket: { remoteAddress: '192.0.2.7' } } }
  const context = { matchedRoute: { path: '/api/run-sheets/:id/approve' }, params: { id } }
  const event = { method: 'POST', context, node } as unknown as H3Event
  await audited(event, { app: during(), tokenId: null, ...per }, () => approve(during(), per, id))
  const [entry] = (await auditTrail(test.app, owner, auditQuerySchema.parse({ by: per.userId }))).items
  expect(entry!.what).toBe(`approved (for Maud${people})`)
})
