import { afterAll, beforeAll, expect, it } from 'vitest'
import type { Actor } from '../../server/app'
import { leaveWorkspace, removeMember } from '../../server/services/members'
import { sessionView } from '../../server/services/people'
import { openSession, sessionCaller } from '../../server/services/sessions'
import { foundWorkspace, goToWorkspace, requireShown } from '../../server/services/workspaces'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { newMember } from '../support/people'

const device = { userAgent: 'Firefox/140.0', address: '192.0.2.1' }
let test: TestApp
let owner: Actor
let people = 0

beforeAll(async () => {
  test = await startTestApp(1)
  owner = await newMember(test.app, test.actor, 'Olga', ['owner'])
})
afterAll(() => test?.close())

/** Somebody with two workspaces, signed in to the first. */
async function wanderer() {
  const actor = await newMember(test.app, test.actor, `Wanderer${++people}`, ['reader'])
  const sessionId = await openSession(test.app, actor, device)
  const second = await foundWorkspace(test.app, { userId: actor.userId, sessionId }, 'A second one')
  return { ...actor, sessionId, second }
}

const caller = (sessionId: string) => sessionCaller(test.app, sessionId, '192.0.2.1')

it('makes a workspace, whose owner one is, and goes there', async () => {
  const { sessionId, second, workspaceId } = await wanderer()
  const now = await caller(sessionId)
  expect(now).toMatchObject({ workspaceId: second, roles: ['owner', 'developer', 'steward', 'reviewer'] })
  const view = await sessionView(test.app, now, now.roles)
  expect(view.workspace.name).toBe('A second one')
  expect(view.workspaces.map(({ id }) => id)).toEqual([second, workspaceId])
  expect(view.counts).toEqual({ problems: 0, machines: 0, runSheets: 0, people: 1 })
})

it('goes back and forth, each session for itself, and to nobody else’s', async () => {
  const { userId, sessionId, workspaceId, second } = await wanderer()
  const other = await openSession(test.app, { userId, workspaceId }, device)
  await goToWorkspace(test.app, { userId, sessionId }, workspaceId)
  await goToWorkspace(test.app, { userId, sessionId: other }, second)
  expect(await caller(sessionId)).toMatchObject({ workspaceId, roles: ['reader'] })
  expect(await caller(other)).toMatchObject({ workspaceId: second })
  const stranger = await wanderer()
  for (const id of [stranger.second, 'nothing'])
    await expect(goToWorkspace(test.app, { userId, sessionId }, id)).rejects.toMatchObject({
      kind: 'not found',
      code: 'workspace.missing',
    })
})

it('refuses what is asked for by a page of another workspace', () => {
  expect(() => requireShown(owner, undefined)).not.toThrow()
  expect(() => requireShown(owner, owner.workspaceId)).not.toThrow()
  expect(() => requireShown(owner, 'another')).toThrow('Nothing was done')
})

it('lets sessions go on elsewhere when their person leaves or is removed', async () => {
  const [leaver, removed] = [await wanderer(), await wanderer()]
  await goToWorkspace(test.app, leaver, leaver.workspaceId)
  await leaveWorkspace(test.app, leaver)
  expect(await caller(leaver.sessionId)).toMatchObject({ workspaceId: leaver.second })
  await goToWorkspace(test.app, removed, removed.workspaceId)
  await removeMember(test.app, owner, removed.userId)
  expect(await caller(removed.sessionId)).toMatchObject({ workspaceId: removed.second })
})

it('makes no more than ten an hour for one person', async () => {
  const { userId, sessionId } = await wanderer()
  let refused: unknown
  for (let k = 0; k < 10 && !refused; k++)
    await foundWorkspace(test.app, { userId, sessionId }, `Number ${k}`).catch((error) => (refused = error))
  expect(refused).toMatchObject({ code: 'attempts.many' })
})
