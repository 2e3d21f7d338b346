import { afterAll, beforeAll, expect, it } from 'vitest'
import { auditTrail } from '../../server/services/audit'
import { createAccount } from '../../server/services/people'
import type { Passwords } from '../../server/services/people'
import { signIn } from '../../server/services/sign-in'
import { auditQuerySchema } from '../../shared/schemas/audit'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'

/** Notes what was verified against, so that a missing account can be seen to cost the same. */
const verified: string[] = []
const passwords: Passwords = {
  hash: async (password) => `hash of ${password}`,
  verify: async (hash, password) => {
    verified.push(hash)
    return hash === `hash of ${password}`
  },
}
let test: TestApp
let network = 0
/** What went on after the answers. */
const left: Promise<void>[] = []

beforeAll(async () => {
  test = await startTestApp(1)
  const { workspaceId } = test.actor
  for (const name of ['ann', 'bea', 'cay', 'dot'])
    await test.app.db.transaction((tx) =>
      createAccount(test.app, tx, {
        ...{ name, email: `${name}@example.org`, passwordHash: 'hash of right', workspaceId },
        roles: ['reader'],
      }),
    )
})
afterAll(() => test?.close())

const attempt = (name: string, password: string, from = `192.0.2.${++network}`, app = test.app) =>
  signIn(app, passwords, { email: `${name}@example.org`, password }, from, (work) => left.push(work)).then(
    () => 'in',
    (error: { code: string; message: string }) => `${error.code}: ${error.message}`,
  )

it('says and does the same whether there is such an account or not', async () => {
  const outcomes = { ann: [] as string[], nobody: [] as string[] }
  for (let k = 0; k < 11; k++) {
    outcomes.ann.push(await attempt('ann', 'wrong'))
    outcomes.nobody.push(await attempt('nobody', 'wrong'))
  }
  expect(outcomes.ann).toEqual(outcomes.nobody)
  expect(outcomes.ann[9]).toMatch(/^session.refused/)
  expect(outcomes.ann[10]).toMatch(/^attempts.many: Too many attempts. Wait 15 min/)
  expect(verified.length).toBe(20)
})

it('writes down, after the answer, whose sign-in was refused, and nothing of nobody', async () => {
  const told = async () =>
    (await auditTrail(test.app, test.actor, auditQuerySchema.parse({ kind: 'sign-in' }))).items.map(
      ({ by, what, address }) => [by.name, what, address],
    )
  await Promise.all(left)
  const before = (await told()).length
  await attempt('dot', 'wrong', '192.0.2.200')
  await attempt('nobody else', 'wrong', '192.0.2.200')
  await Promise.all(left)
  expect((await told()).slice(0, -before || undefined)).toEqual([
    ['dot', 'was refused at signing in: wrong password', '192.0.2.200'],
  ])
  // The eleventh attempt above was not looked at, and is not in the trail.
  expect(before).toBe(10)
})

it('refuses the right password too until the time is over', async () => {
  expect(await attempt('ann', 'right')).toMatch(/^attempts.many/)
  const later = new Date(Date.now() + 15 * 60_000 + 1000)
  expect(await attempt('ann', 'right', undefined, { ...test.app, now: () => later })).toBe('in')
})

it('counts anew after a success', async () => {
  for (let round = 0; round < 3; round++) {
    for (let k = 0; k < 9; k++) await attempt('bea', 'wrong')
    expect(await attempt('bea', 'right')).toBe('in')
  }
})

it('lets none slip through that are made at once', async () => {
  const outcomes = await Promise.all(Array.from({ length: 25 }, () => attempt('cay', 'wrong')))
  expect(outcomes.filter((text) => text.startsWith('session.refused'))).toHaveLength(10)
})

it('counts what comes from one address of the network, whatever account is tried', async () => {
  const outcomes: string[] = []
  for (let k = 0; k < 61; k++) outcomes.push(await attempt(`guess-${k}`, 'wrong', '203.0.113.9'))
  expect(outcomes.filter((text) => text.startsWith('session.refused'))).toHaveLength(60)
  expect(outcomes[60]).toMatch(/^attempts.many/)
  expect(await attempt('bea', 'right', '203.0.113.10')).toBe('in')
})
