import { afterAll, beforeAll, expect, it } from 'vitest'
import type { Actor } from '../../server/app'
import { tagsInUse } from '../../server/services/library'
import { invitationsOf, invite } from '../../server/services/invitations'
import { membersOf } from '../../server/services/people'
import { editProblem } from '../../server/services/problems'
import { openSession, sessionsOf } from '../../server/services/sessions'
import { makeStandIn, standInsOf } from '../../server/services/stand-ins'
import type { Page, PageQuery } from '../../shared/schemas/common'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { newMember } from '../support/people'

let test: TestApp
let owner: Actor & { roles: ['owner'] }
const members: Actor[] = []

beforeAll(async () => {
  test = await startTestApp(1)
  owner = { ...(await newMember(test.app, test.actor, 'Olga', ['owner'])), roles: ['owner'] }
  for (let k = 0; k < 6; k++) members.push(await newMember(test.app, test.actor, `Member ${k}`, ['reviewer']))
})
afterAll(() => test?.close())

/** Goes through a list two at a time, and holds that every page but the last is full and none says anything twice. */
async function through<T>(read: (query: PageQuery) => Promise<Page<T>>): Promise<T[]> {
  const seen: T[] = []
  let cursor: string | undefined
  do {
    const page = await read({ limit: 2, cursor })
    seen.push(...page.items)
    if (page.nextCursor !== null) expect(page.items).toHaveLength(2)
    cursor = page.nextCursor ?? undefined
  } while (cursor !== undefined)
  expect(seen).toEqual((await read({ limit: 200 })).items)
  return seen
}

it('people, by name', async () => {
  const names = (await through((query) => membersOf(test.app, owner, query))).map(({ name }) => name)
  expect(names).toEqual(['Developer', ...members.map((_, k) => `Member ${k}`), 'Olga'])
})

it('invitations, newest first', async () => {
  const emails = [1, 2, 3, 4, 5].map((k) => `guest${k}@example.org`)
  for (const email of emails) await invite(test.app, owner, { email, roles: ['reader'] })
  const open = await through((query) => invitationsOf(test.app, owner, query))
  expect(open.map(({ email }) => email).sort()).toEqual(emails)
})

it('sessions, each marked whether it asks', async () => {
  const ids: string[] = []
  for (let k = 0; k < 4; k++)
    ids.push(await openSession(test.app, owner, { userAgent: `Browser ${k}`, address: '192.0.2.1' }))
  const listed = await through((query) => sessionsOf(test.app, owner.userId, ids[3]!, query))
  expect(listed.filter(({ isThis }) => isThis).map(({ id }) => id)).toEqual([ids[3]])
  expect(listed.map(({ id }) => id).sort()).toEqual(ids.sort())
})

it('reviews in other hands, the earliest first', async () => {
  const day = (from: number) => new Date(test.app.now().getTime() + from * 86_400_000).toISOString().slice(0, 10)
  for (const [k, { userId }] of members.entries())
    await makeStandIn(test.app, owner, {
      forId: userId,
      byId: test.actor.userId,
      startsOn: day(9 - k),
      endsOn: day(10),
    })
  const handed = await through((query) => standInsOf(test.app, owner, query))
  expect(handed.map((item) => item.for.name)).toEqual([5, 4, 3, 2, 1, 0].map((k) => `Member ${k}`))
})

it('tags in use, by the alphabet', async () => {
  const id = await test.problem('a b 1\n')
  await editProblem(test.app, test.actor, id, { tags: { add: ['ferry', 'Berths', 'crew'], remove: [] } })
  const tags = await through((query) => tagsInUse(test.app, test.actor, query))
  expect(tags.map(({ tag }) => tag)).toEqual(['Berths', 'crew', 'ferry'])
})
