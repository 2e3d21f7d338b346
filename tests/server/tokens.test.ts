import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { memberships, tokens } from '../../server/database/schema'
import type { Actor } from '../../server/app'
import { createToken, revokeToken, tokenCaller, tokensOf } from '../../server/services/tokens'
import type { Role } from '../../shared/schemas/common'
import { createTokenSchema } from '../../shared/schemas/tokens'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { newMember } from '../support/people'

let test: TestApp
let owner: Actor & { roles: Role[] }
let reviewer: Actor & { roles: Role[] }

beforeAll(async () => {
  test = await startTestApp(1)
  owner = { ...(await newMember(test.app, test.actor, 'Olga', ['owner'])), roles: ['owner'] }
  const roles: Role[] = ['reviewer', 'steward']
  reviewer = { ...(await newMember(test.app, test.actor, 'Rita', roles)), roles }
})
afterAll(() => test?.close())

const input = (given: Record<string, unknown>) => createTokenSchema.parse({ name: 'nightly', ...given })
const list = async (holder: Actor & { roles: Role[] }) =>
  (await tokensOf(test.app, holder, { limit: 50 })).items.map(({ by, role, standing }) => [by.name, role, standing])

it('lets a token act in its one role, and keeps nothing of it but a hash', async () => {
  const made = await createToken(test.app, reviewer, input({ role: 'steward' }))
  expect(made.token).toMatch(/^espalier_[\w-]{43}$/)
  const { userId, workspaceId } = reviewer
  expect(await tokenCaller(test.app, made.token)).toEqual({ userId, workspaceId, tokenId: made.id, roles: ['steward'] })
  const [row] = await test.app.db.select().from(tokens).where(eq(tokens.id, made.id))
  expect(JSON.stringify(row)).not.toContain(made.token.slice(9))
  expect(row!.usedAt).toBeInstanceOf(Date)
  await expect(tokenCaller(test.app, `${made.token.slice(0, -1)}!`)).rejects.toMatchObject({ code: 'token.unknown' })
  await revokeToken(test.app, reviewer, made.id)
  await expect(tokenCaller(test.app, made.token)).rejects.toMatchObject({ code: 'token.unknown' })
})

it('gives no role that its maker does not hold, and opens nothing once the role is lost', async () => {
  await expect(createToken(test.app, reviewer, input({ role: 'owner' }))).rejects.toMatchObject({ code: 'token.role' })
  const made = await createToken(test.app, reviewer, input({ role: 'reviewer' }))
  const grant = (roles: Role[]) =>
    test.app.db.update(memberships).set({ roles }).where(eq(memberships.userId, reviewer.userId))
  await grant(['steward'])
  await expect(tokenCaller(test.app, made.token)).rejects.toMatchObject({ code: 'token.role-lost' })
  expect(await list(owner)).toContainEqual(['Rita', 'reviewer', 'role lost'])
  await grant(reviewer.roles)
  expect((await tokenCaller(test.app, made.token)).roles).toEqual(['reviewer'])
})

it('ends a token at its time', async () => {
  const past = new Date(test.app.now().getTime() - 1000).toISOString()
  const soon = new Date(test.app.now().getTime() + 60_000).toISOString()
  await expect(createToken(test.app, reviewer, input({ role: 'steward', expiresAt: past }))).rejects.toMatchObject({
    code: 'token.expiry',
  })
  const { token } = await createToken(test.app, reviewer, input({ role: 'steward', expiresAt: soon }))
  expect((await tokenCaller(test.app, token)).roles).toEqual(['steward'])
  const later = { ...test.app, now: () => new Date(soon) }
  await expect(tokenCaller(later, token)).rejects.toMatchObject({ code: 'token.expired' })
})

it('shows owners every token and others their own, and lets nobody else end one', async () => {
  const mine = await createToken(test.app, owner, input({ role: 'owner' }))
  expect(new Set((await list(reviewer)).map(([name]) => name))).toEqual(new Set(['Rita']))
  expect(new Set((await list(owner)).map(([name]) => name))).toEqual(new Set(['Rita', 'Olga']))
  await expect(revokeToken(test.app, reviewer, mine.id)).rejects.toMatchObject({ code: 'token.missing' })
  const elsewhere = { ...owner, workspaceId: 'another' }
  await expect(revokeToken(test.app, elsewhere, mine.id)).rejects.toMatchObject({ code: 'token.missing' })
  const theirs = await createToken(test.app, reviewer, input({ role: 'steward' }))
  await revokeToken(test.app, owner, theirs.id)
})

it('gives one person fifty at most', async () => {
  const member = { ...(await newMember(test.app, test.actor, 'Mira', ['reader'])), roles: ['reader' as const] }
  for (let k = 0; k < 50; k++) await createToken(test.app, member, input({ role: 'reader' }))
  await expect(createToken(test.app, member, input({ role: 'reader' }))).rejects.toMatchObject({ code: 'token.many' })
  const first = await tokensOf(test.app, member, { limit: 30 })
  const second = await tokensOf(test.app, member, { limit: 30, cursor: first.nextCursor! })
  expect([first.items.length, second.items.length, second.nextCursor]).toEqual([30, 20, null])
})
