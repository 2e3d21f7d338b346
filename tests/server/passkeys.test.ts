import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, expect, it } from 'vitest'
import type { App } from '../../server/app'
import { users } from '../../server/database/schema'
import { auditTrail } from '../../server/services/audit'
import { sweepChallenges } from '../../server/services/challenges'
import { askPasskey, requirePasskey } from '../../server/services/passkey-checks'
import { signInByPasskey } from '../../server/services/passkey-sign-in'
import { addPasskey, beginPasskey, passkeysOf, removePasskey, renamePasskey } from '../../server/services/passkeys'
import { openSession } from '../../server/services/sessions'
import { entryOf } from '../../server/services/sign-in'
import { auditQuerySchema } from '../../shared/schemas/audit'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import type { Faults } from '../support/authenticator'
import { authenticator } from '../support/authenticator'
import { newMember, plainPasswords as passwords } from '../support/people'

const site = { address: 'https://espalier.example', origin: 'https://espalier.example', hostname: 'espalier.example' }
const refused = { kind: 'unauthenticated', code: 'session.passkey' }
const gone = { kind: 'not acceptable', code: 'challenge.gone' }
let test: TestApp
let people = 0
let networks = 0

beforeAll(async () => {
  test = await startTestApp(1)
})
afterAll(() => test?.close())

const network = () => `192.0.2.${++networks}`
const later = (minutes: number): App => ({ ...test.app, now: () => new Date(Date.now() + minutes * 60_000) })

/** Somebody signed in, with a password. */
async function member() {
  const actor = await newMember(test.app, test.actor, `Keeper${++people}`, ['reader'], 'hash of right')
  const sessionId = await openSession(test.app, actor, { userAgent: '', address: '192.0.2.1' })
  return { ...actor, sessionId, network: network() }
}
type Member = Awaited<ReturnType<typeof member>>

const begin = (own: Member, current = 'right', app = test.app) => beginPasskey(app, passwords, own, { current }, site)

async function added(own: Member, name = 'Phone') {
  const device = authenticator(site)
  const { id } = await addPasskey(test.app, own.userId, device.make(await begin(own), name), site)
  return { device, id }
}

const enter = async (device: ReturnType<typeof authenticator>, faults: Faults = {}, app = test.app) =>
  requirePasskey(app, site, device.use(await askPasskey(test.app, site, network()), faults), network())

const withoutPassword = ({ userId }: Member) =>
  test.app.db.update(users).set({ passwordHash: null }).where(eq(users.id, userId))

it('signs in whoever’s passkey it is, with nothing typed, and says when it was used', async () => {
  const own = await member()
  const { device } = await added(own, 'Lock of the laptop')
  expect(await passkeysOf(test.app, own.userId)).toMatchObject({
    hasPassword: true,
    items: [{ name: 'Lock of the laptop', usedAt: null }],
  })
  const { id } = await enter(device)
  expect(await entryOf(test.app, id)).toEqual({ userId: own.userId, workspaceId: own.workspaceId })
  expect((await passkeysOf(test.app, own.userId)).items[0]!.usedAt).not.toBeNull()
})

it('takes one answer to what it asked, and none after five minutes', async () => {
  const { device } = await added(await member())
  const used = device.use(await askPasskey(test.app, site, network()))
  await requirePasskey(test.app, site, used, network())
  await expect(requirePasskey(test.app, site, used, network())).rejects.toMatchObject(gone)
  const asked = await askPasskey(test.app, site, network())
  await sweepChallenges(later(4))
  await expect(requirePasskey(later(6), site, device.use(asked), network())).rejects.toMatchObject(gone)
})

it('takes no answer twice at once', async () => {
  const { device } = await added(await member())
  const used = device.use(await askPasskey(test.app, site, network()))
  const both = await Promise.allSettled([1, 2].map(() => requirePasskey(test.app, site, used, network())))
  expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected'])
})

it('refuses a copy, another site’s answer, one without asking who is there, and one for somebody else', async () => {
  const own = await member()
  const { device } = await added(own)
  await enter(device, { counter: 7 })
  const other = Buffer.from((await member()).userId).toString('base64url')
  for (const faults of [{ counter: 7 }, { counter: 3 }, { counter: 0 }])
    await expect(enter(device, faults)).rejects.toMatchObject(refused)
  await expect(enter(device, { counter: 8, origin: 'https://espa1ier.example' })).rejects.toMatchObject(refused)
  await expect(enter(device, { counter: 8, unverified: true })).rejects.toMatchObject(refused)
  await expect(enter(device, { counter: 8, userHandle: other })).rejects.toMatchObject(refused)
  await expect(enter(authenticator(site), { userHandle: '' })).rejects.toMatchObject(refused)
  expect((await enter(device, { counter: 8 })).id).toBe(own.userId)
})

it('keeps none that was made for another site, without asking who is there, by another, or before', async () => {
  const [own, other] = [await member(), await member()]
  const bad = { kind: 'not acceptable', code: 'passkey.unreadable' }
  for (const faults of [{ origin: 'https://espa1ier.example' }, { unverified: true }]) {
    const made = authenticator(site).make(await begin(own), 'Phone', faults)
    await expect(addPasskey(test.app, own.userId, made, site)).rejects.toMatchObject(bad)
  }
  const device = authenticator(site)
  const theirs = device.make(await begin(other), 'Phone')
  await expect(addPasskey(test.app, own.userId, theirs, site)).rejects.toMatchObject({ code: 'challenge.other' })
  await addPasskey(test.app, own.userId, device.make(await begin(own), 'Phone'), site)
  const again = device.make(await begin(own), 'Phone')
  await expect(addPasskey(test.app, own.userId, again, site)).rejects.toMatchObject({ code: 'passkey.known' })
})

it('asks anew who it is before one is made', async () => {
  const [own, other] = [await member(), await member()]
  await expect(begin(own, 'wrong')).rejects.toMatchObject({ code: 'password.current', issues: [{ path: 'current' }] })
  const { device } = await added(own)
  const theirs = (await added(other)).device
  const by = async (given: typeof device) =>
    beginPasskey(test.app, passwords, own, { passkey: given.use(await askPasskey(test.app, site, network())) }, site)
  expect(await by(device)).toHaveProperty('challengeId')
  await expect(by(theirs)).rejects.toMatchObject({ kind: 'forbidden', code: 'passkey.other' })
})

it('takes a fresh session for it where there is neither password nor passkey', async () => {
  const own = await member()
  await withoutPassword(own)
  expect(await beginPasskey(test.app, passwords, own, {}, site)).toHaveProperty('challengeId')
  await expect(beginPasskey(later(11), passwords, own, {}, site)).rejects.toMatchObject({ code: 'proof.old' })
  const device = authenticator(site)
  const made = device.make(await beginPasskey(test.app, passwords, own, {}, site), 'Phone')
  await addPasskey(test.app, own.userId, made, site)
  await expect(beginPasskey(test.app, passwords, own, {}, site)).rejects.toMatchObject({ code: 'password.current' })
})

it('renames and removes one’s own alone, and never the last way in', async () => {
  const [own, other] = [await member(), await member()]
  const { device, id } = await added(own)
  const missing = { kind: 'not found', code: 'passkey.missing' }
  await expect(renamePasskey(test.app, other.userId, id, 'Mine')).rejects.toMatchObject(missing)
  await expect(removePasskey(test.app, other.userId, id)).rejects.toMatchObject(missing)
  await renamePasskey(test.app, own.userId, id, 'Old phone')
  expect((await passkeysOf(test.app, own.userId)).items).toMatchObject([{ name: 'Old phone' }])
  await withoutPassword(own)
  await expect(removePasskey(test.app, own.userId, id)).rejects.toMatchObject({ code: 'sign-in.last' })
  expect((await enter(device)).id).toBe(own.userId)
  await test.app.db.update(users).set({ passwordHash: 'hash of right' }).where(eq(users.id, own.userId))
  await removePasskey(test.app, own.userId, id)
  await expect(enter(device)).rejects.toMatchObject(refused)
})

it('signs in, and writes down a refusal of a passkey that is known', async () => {
  const own = await member()
  const { device } = await added(own)
  const work: Promise<void>[] = []
  const asking = () => ({ site, network: network(), later: (done: Promise<void>) => void work.push(done) })
  const signIn = async (by: typeof device, faults: Faults = {}) =>
    signInByPasskey(test.app, by.use(await askPasskey(test.app, site, network()), faults), asking())
  expect(await signIn(device)).toEqual({ userId: own.userId, workspaceId: own.workspaceId })
  await expect(signIn(device, { origin: 'https://espa1ier.example' })).rejects.toMatchObject(refused)
  await expect(signIn(authenticator(site), { userHandle: '' })).rejects.toMatchObject(refused)
  await Promise.all(work)
  const { items } = await auditTrail(test.app, own, auditQuerySchema.parse({ kind: 'sign-in' }))
  expect(items).toMatchObject([
    { by: { id: own.userId }, what: 'was refused at signing in: the passkey did not prove itself' },
  ])
})

it('lets nobody try for ever', async () => {
  const { device } = await added(await member())
  await enter(device)
  const outcomes: string[] = []
  for (let k = 0; k < 11; k++)
    outcomes.push(
      await enter(device, { counter: 0 }).then(
        () => 'in',
        (error: { code: string }) => error.code,
      ),
    )
  expect(outcomes).toEqual([...Array.from({ length: 10 }, () => 'session.passkey'), 'attempts.many'])
  const from = network()
  for (let k = 0; k < 60; k++) await askPasskey(test.app, site, from)
  await expect(askPasskey(test.app, site, from)).rejects.toMatchObject({ code: 'attempts.many' })
})
