import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { memberships, sessions } from '../../server/database/schema'
import type { Actor } from '../../server/app'
import {
  endOtherSessions,
  endSession,
  leaveSession,
  openSession,
  sessionCaller,
  sessionsOf,
  sweepSessions,
} from '../../server/services/sessions'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { newMember } from '../support/people'

const DAY_MS = 86_400_000
const device = { userAgent: 'Firefox/140.0', address: '192.0.2.1' }
let test: TestApp
let mira: Actor

beforeAll(async () => {
  test = await startTestApp(1)
  mira = await newMember(test.app, test.actor, 'Mira', ['reader'])
})
afterAll(() => test?.close())

/** The application so many days from now. */
const after = (days: number) => {
  const now = new Date(Date.now() + days * DAY_MS)
  return { ...test.app, now: () => now }
}
const ended = { kind: 'unauthenticated', code: 'session.ended' }

it('answers who asks until the session is left', async () => {
  const sessionId = await openSession(test.app, mira, device)
  expect(await sessionCaller(test.app, sessionId, '192.0.2.1')).toEqual({ ...mira, sessionId, roles: ['reader'] })
  await leaveSession(test.app, sessionId)
  await expect(sessionCaller(test.app, sessionId, '192.0.2.1')).rejects.toMatchObject(ended)
})

it('ends what was not used for a fortnight, keeps what is used, and ends that too after ninety days', async () => {
  const unused = await openSession(test.app, mira, device)
  const used = await openSession(test.app, mira, device)
  for (let day = 10; day < 90; day += 10) await sessionCaller(after(day), used, '198.51.100.7')
  expect((await sessionsOf(after(85), mira.userId, used, { limit: 50 })).items).toMatchObject([
    { id: used, address: '198.51.100.7' },
  ])
  await expect(sessionCaller(after(15), unused, '192.0.2.1')).rejects.toMatchObject(ended)
  await expect(sessionCaller(after(91), used, '192.0.2.1')).rejects.toMatchObject(ended)
  await sweepSessions(after(15))
  const kept = await test.app.db.select({ id: sessions.id }).from(sessions).where(eq(sessions.userId, mira.userId))
  expect(kept).toEqual([{ id: used }])
})

it('lists one’s own alone, marks the one that asks, and ends one or all others', async () => {
  const [first, second, third] = [
    await openSession(test.app, mira, device),
    await openSession(test.app, mira, device),
    await openSession(test.app, mira, device),
  ]
  const theirs = await openSession(test.app, test.actor, device)
  const listed = (await sessionsOf(test.app, mira.userId, second, { limit: 50 })).items
  expect(listed.map(({ id }) => id)).not.toContain(theirs)
  expect(listed.filter(({ isThis }) => isThis).map(({ id }) => id)).toEqual([second])
  await expect(endSession(test.app, mira.userId, theirs)).rejects.toMatchObject({ code: 'session.missing' })
  await endSession(test.app, mira.userId, first)
  expect((await sessionsOf(test.app, mira.userId, second, { limit: 50 })).items.map(({ id }) => id)).toContain(third)
  await endOtherSessions(test.app, mira.userId, second)
  expect((await sessionsOf(test.app, mira.userId, second, { limit: 50 })).items.map(({ id }) => id)).toEqual([second])
  expect(await sessionCaller(test.app, theirs, '192.0.2.1')).toMatchObject(test.actor)
})

it('opens nothing for somebody who left the workspace', async () => {
  const leaver = await newMember(test.app, test.actor, 'Leo', ['reader'])
  const id = await openSession(test.app, leaver, device)
  await test.app.db.delete(memberships).where(eq(memberships.userId, leaver.userId))
  await expect(sessionCaller(test.app, id, '192.0.2.1')).rejects.toMatchObject(ended)
})
