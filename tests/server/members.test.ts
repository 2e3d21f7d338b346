import { afterAll, beforeAll, expect, it } from 'vitest'
import type { Actor } from '../../server/app'
import { changeRoles, leaveWorkspace, removeMember } from '../../server/services/members'
import { createWorkspace, membersOf, rolesIn } from '../../server/services/people'
import { openSession, sessionCaller } from '../../server/services/sessions'
import { createToken, tokenCaller } from '../../server/services/tokens'
import { emptyFolder } from '../support/folders'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { newMember } from '../support/people'
import { startPostgres } from '../support/postgres'

const device = { userAgent: 'Firefox/140.0', address: '192.0.2.1' }
const lastOwner = { kind: 'wrong state', code: 'member.last-owner' }
let test: TestApp
let postgres: Awaited<ReturnType<typeof startPostgres>>
let people = 0

// On a server, where transactions go on at the same time; in the embedded database they never do.
beforeAll(async () => {
  postgres = await startPostgres()
  test = await startTestApp(1, emptyFolder(), undefined, postgres.url)
})
afterAll(async () => {
  await test?.close()
  await postgres?.stop()
})

/** A workspace of its own with so many owners and one reader. */
async function workspace(owners: number) {
  const id = await test.app.db.transaction((tx) => createWorkspace(test.app, tx, 'One more'))
  const member = (roles: Parameters<typeof newMember>[3]) =>
    newMember(test.app, { userId: '', workspaceId: id }, `Member${++people}`, roles)
  const held: Actor[] = []
  for (let k = 0; k < owners; k++) held.push(await member(['owner', 'developer']))
  return { owners: held, reader: await member(['reader']) }
}

const ownersOf = async (actor: Actor) =>
  (await membersOf(test.app, actor, { limit: 50 })).items.filter(({ roles }) => roles.includes('owner')).length

it('gives other roles, which hold at once, also for who is signed in', async () => {
  const { owners, reader } = await workspace(1)
  const session = await openSession(test.app, reader, device)
  await changeRoles(test.app, owners[0]!, reader.userId, ['steward', 'reviewer'])
  expect((await sessionCaller(test.app, session, '192.0.2.1')).roles).toEqual(['steward', 'reviewer'])
})

it('changes nobody of another workspace, and nothing for who is no owner any more', async () => {
  const [here, there] = [await workspace(2), await workspace(1)]
  const missing = { kind: 'not found', code: 'member.missing' }
  await expect(changeRoles(test.app, here.owners[0]!, there.reader.userId, ['owner'])).rejects.toMatchObject(missing)
  await expect(removeMember(test.app, here.owners[0]!, there.reader.userId)).rejects.toMatchObject(missing)
  const former = here.owners[1]!
  await changeRoles(test.app, here.owners[0]!, former.userId, ['reader'])
  await expect(changeRoles(test.app, former, former.userId, ['owner'])).rejects.toMatchObject({ kind: 'forbidden' })
  await expect(removeMember(test.app, former, here.reader.userId)).rejects.toMatchObject({ kind: 'forbidden' })
})

it('ends sessions and tokens of who is removed, and the tokens stay ended when they come back', async () => {
  const { owners, reader } = await workspace(1)
  const session = await openSession(test.app, reader, device)
  const input = { name: 'script', role: 'reader' as const, expiresAt: null }
  const { token } = await createToken(test.app, { ...reader, roles: ['reader'] }, input)
  expect(await tokenCaller(test.app, token)).toMatchObject(reader)
  await removeMember(test.app, owners[0]!, reader.userId)
  await expect(sessionCaller(test.app, session, '192.0.2.1')).rejects.toMatchObject({ code: 'session.ended' })
  await expect(tokenCaller(test.app, token)).rejects.toMatchObject({ code: 'token.unknown' })
  expect(await rolesIn(test.app, reader)).toBeUndefined()
})

it('keeps the last owner, who can go once there is another', async () => {
  const { owners, reader } = await workspace(1)
  const owner = owners[0]!
  await expect(changeRoles(test.app, owner, owner.userId, ['developer'])).rejects.toMatchObject(lastOwner)
  await expect(removeMember(test.app, owner, owner.userId)).rejects.toMatchObject(lastOwner)
  await expect(leaveWorkspace(test.app, owner)).rejects.toMatchObject(lastOwner)
  await changeRoles(test.app, owner, reader.userId, ['owner'])
  await leaveWorkspace(test.app, owner)
  expect(await ownersOf(reader)).toBe(1)
  expect(await rolesIn(test.app, owner)).toBeUndefined()
})

it('leaves one of two owners who demote, remove or leave at the same time', async () => {
  const ways: ((actor: Actor, other: Actor) => Promise<void>)[] = [
    (actor, other) => changeRoles(test.app, actor, other.userId, ['reader']),
    (actor, other) => removeMember(test.app, actor, other.userId),
    (actor) => leaveWorkspace(test.app, actor),
    (actor) => changeRoles(test.app, actor, actor.userId, ['reader']),
  ]
  for (const way of [...ways, ...ways, ...ways]) {
    const { owners, reader } = await workspace(2)
    const [ann, bea] = owners as [Actor, Actor]
    const outcomes = await Promise.allSettled([way(ann, bea), way(bea, ann)])
    expect(outcomes.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected'])
    expect(await ownersOf(reader)).toBe(1)
  }
})
