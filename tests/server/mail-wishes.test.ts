import { afterAll, beforeAll, expect, it } from 'vitest'
import type { Actor } from '../../server/app'
import type { Letter } from '../../server/mail/letter'
import { writeLetter } from '../../server/mail/letter'
import { invitationLetter } from '../../server/mail/letters'
import { outboxOf, tell } from '../../server/services/mail'
import { mailWishes, wishMails } from '../../server/services/mail-wishes'
import { createWorkspace } from '../../server/services/people'
import { insertMembership } from '../../server/database/repositories/people'
import type { ChosenMailKind } from '../../shared/schemas/mail'
import { CHOSEN_MAIL_KINDS, mailWishesSchema } from '../../shared/schemas/mail'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { newMember } from '../support/people'

let test: TestApp
let ann: Actor
let bea: Actor

beforeAll(async () => {
  test = await startTestApp(1)
  ann = await newMember(test.app, test.actor, 'Ann', ['developer'])
  bea = await newMember(test.app, test.actor, 'Bea', ['reviewer'])
})
afterAll(() => test?.close())

const letter = (kind: ChosenMailKind): Letter => ({
  kind,
  subject: `About: ${kind}`,
  parts: [{ text: 'Something was done.' }],
  action: { label: 'Open it', path: '/run-sheets/1' },
  because: 'you prepared it',
})

/** Tells both of each kind. @returns who was written to, about what */
async function told(workspaceId = test.actor.workspaceId) {
  const before = (await outboxOf(test.app, { ...ann, workspaceId }, { limit: 200 })).items.length
  await test.app.db.transaction(async (tx) => {
    for (const kind of CHOSEN_MAIL_KINDS) {
      const letters = new Map([ann, bea].map(({ userId }) => [userId, letter(kind)]))
      await tell(test.app, tx, { workspaceId, by: null }, letters)
    }
  })
  const { items } = await outboxOf(test.app, { ...ann, workspaceId }, { limit: 200 })
  return items
    .slice(0, items.length - before)
    .map(({ to, kind }) => `${to.name}: ${kind}`)
    .sort()
}

const all = (name: string) => CHOSEN_MAIL_KINDS.map((kind) => `${name}: ${kind}`)

it('writes about everything to who said nothing', async () => {
  expect(await mailWishes(test.app, ann)).toEqual({ wanted: [...CHOSEN_MAIL_KINDS] })
  expect(await told()).toEqual([...all('Ann'), ...all('Bea')].sort())
})

it('leaves out what somebody does not want, for them and this workspace alone, until they want it again', async () => {
  await wishMails(test.app, ann, ['run sheet remark'])
  expect(await mailWishes(test.app, ann)).toEqual({ wanted: ['run sheet remark'] })
  expect(await told()).toEqual(['Ann: run sheet remark', ...all('Bea')].sort())
  const elsewhere = await test.app.db.transaction(async (tx) => {
    const workspaceId = await createWorkspace(test.app, tx, 'Elsewhere')
    const joined = { userId: ann.userId, workspaceId, roles: ['reader' as const], createdAt: new Date() }
    await insertMembership(tx, joined)
    return workspaceId
  })
  expect(await told(elsewhere)).toEqual(all('Ann').sort())
  await wishMails(test.app, ann, CHOSEN_MAIL_KINDS)
  expect(await told()).toEqual([...all('Ann'), ...all('Bea')].sort())
})

it('takes no kinds that cannot be chosen', () => {
  expect(mailWishesSchema.safeParse({ wanted: ['invitation'] }).success).toBe(false)
  expect(mailWishesSchema.safeParse({ wanted: [] }).success).toBe(true)
})

it('ends letters that may be unwanted with where that is said, and no others', () => {
  const site = 'https://espalier.example'
  for (const kind of CHOSEN_MAIL_KINDS) {
    const { text, html } = writeLetter(letter(kind), site)
    expect(text).toContain(`Choose which messages you get: ${site}/account#messages`)
    expect(html).toContain(`href="${site}/account#messages"`)
  }
  const { text, html } = writeLetter(invitationLetter('Works', 'Ann', ['reader'], '/invitations/x'), site)
  expect(text + html).not.toContain('/account')
})
