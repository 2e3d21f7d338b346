import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Actor } from '../../server/app'
import { createAccount, createWorkspace } from '../../server/services/people'
import { formerName, removeOwnAccount } from '../../server/services/person-removal'
import { askDeletion, COOLING_DAYS, sweepWorkspaces, takeDeletionBack } from '../../server/services/workspace-deletion'
import { invite } from '../../server/services/invitations'
import { record } from '../../server/services/audit'
import { DEEDS } from '../../shared/audit'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { newMember, plainPasswords } from '../support/people'

const SITE = { origin: 'http://localhost', hostname: 'localhost', address: 'http://localhost' }
const DAY_MS = 24 * 60 * 60 * 1000

let test: TestApp
let owner: Actor
let problemId: string
let formerId: string

const rows = async (table: string, where = 'true') =>
  (await test.app.database.executeSql(`select * from ${table} where ${where}`)).rows
const removal = (actor: Actor, current = 'a word') =>
  removeOwnAccount(
    test.app,
    plainPasswords,
    { userId: actor.userId, sessionId: '-', network: '192.0.2.7' },
    { current },
    SITE,
  )
/** The app some days later. */
const later = (days: number) => ({ ...test.app, now: () => new Date(Date.now() + days * DAY_MS) })

beforeAll(async () => {
  test = await startTestApp(1)
  owner = await newMember(test.app, test.actor, 'Olga', ['owner'], 'hash of a word')
  problemId = await test.problem('a b 1\nb c 1\n')
})
afterAll(() => test?.close())

describe('removing an account', () => {
  let leaver: Actor

  it('is refused without the password, and to the only owner', async () => {
    leaver = await newMember(test.app, owner, 'Lena', ['developer'], 'hash of a word')
    await expect(removal(leaver, 'another word')).rejects.toMatchObject({ code: 'password.current' })
    await expect(removal(owner)).rejects.toMatchObject({ code: 'account.last-owner' })
    expect(await rows('users', 'email is null')).toEqual([])
  })

  it('takes the name and the addresses out, and leaves what was done', async () => {
    const made = { deed: DEEDS['POST /api/problems']!, thingId: problemId, known: undefined, tokenId: null }
    await record(test.app, leaver, { ...made, address: '192.0.2.7' })
    const changed = { deed: DEEDS['PATCH /api/people/:id']!, thingId: leaver.userId, known: undefined, tokenId: null }
    await record(test.app, owner, { ...changed, address: '192.0.2.1' })
    await test.app.database.executeSql(`update problems set created_by = '${leaver.userId}'`)
    await removal(leaver)
    formerId = leaver.userId
    const [person] = await rows('users', `id = '${leaver.userId}'`)
    expect(person).toMatchObject({ email: null, password_hash: null, name: formerName(leaver.userId) })
    expect(await rows('memberships', `user_id = '${leaver.userId}'`)).toEqual([])
    expect(await rows('problems', `created_by = '${leaver.userId}'`)).toHaveLength(1)
    const theirs = await rows('audit_entries', `"by" = '${leaver.userId}' order by at`)
    expect(theirs.map(({ what, address }) => [what, address])).toEqual([
      ['uploaded', ''],
      ['removed their own account', ''],
    ])
    const [about] = await rows('audit_entries', `thing_id = '${leaver.userId}'`)
    expect(about).toMatchObject({ thing: formerName(leaver.userId), address: '192.0.2.1' })
    const everything = await Promise.all(
      ['users', 'mails', 'audit_entries', 'invitations', 'attempts'].map((table) => rows(table)),
    )
    expect(JSON.stringify(everything)).not.toMatch(/lena/i)
  })

  it('leaves the trail closed to any other change', async () => {
    const change = test.app.database.executeSql(`update audit_entries set thing = 'another'`)
    await expect(change).rejects.toThrow('only ever added')
    const other = test.app.database.executeSql(
      `set espalier.removing_person = 'on'; update audit_entries set what = 'nothing'`,
    )
    await expect(other).rejects.toThrow('only ever added')
    await test.app.database.executeSql(`set espalier.removing_person = 'off'`)
  })
})

describe('deleting a workspace', () => {
  it('asks for its name, tells the members, and can be taken back', async () => {
    const member = await newMember(test.app, owner, 'Mats', ['developer'])
    await expect(askDeletion(test.app, owner, 'Tests')).rejects.toMatchObject({ code: 'workspace.name' })
    const at = await askDeletion(test.app, owner, 'Test')
    expect(at.getTime() - Date.now()).toBeGreaterThan((COOLING_DAYS - 0.1) * DAY_MS)
    expect(await askDeletion(later(3), owner, 'Test')).toEqual(at)
    const told = await rows('mails', `kind = 'workspace deletion'`)
    expect(told.map(({ to_user_id }) => to_user_id)).toContain(member.userId)
    expect(told.map(({ to_user_id }) => to_user_id)).not.toContain(owner.userId)
    await takeDeletionBack(test.app, owner)
    await sweepWorkspaces(later(COOLING_DAYS + 1))
    expect(await rows('workspaces')).toHaveLength(1)
  })

  it('happens when its time has come, with every row, array and account of it, and nothing of another', async () => {
    const { app } = test
    const elsewhere = await app.db.transaction(async (tx) => {
      const workspaceId = await createWorkspace(app, tx, 'Elsewhere')
      const account = { name: 'Ewa', email: 'ewa@works.example.org', passwordHash: '-', workspaceId }
      return { workspaceId, userId: await createAccount(app, tx, { ...account, roles: ['owner'] }) }
    })
    await invite(app, owner, { email: 'later@works.example.org', roles: ['reader'] })
    await app.database.executeSql(
      `insert into memberships (workspace_id, user_id, roles, created_at) values ('${owner.workspaceId}', '${elsewhere.userId}', '{reader}', now())`,
    )
    await askDeletion(app, owner, 'Test')
    await sweepWorkspaces(later(COOLING_DAYS - 1))
    expect(await rows('problems')).toHaveLength(1)
    await sweepWorkspaces(later(COOLING_DAYS + 1))
    expect((await rows('workspaces')).map(({ name }) => name)).toEqual(['Elsewhere'])
    // Whoever was removed before is a name that says nothing.
    expect((await rows('users', `id <> '${formerId}'`)).map(({ name }) => name)).toEqual(['Ewa'])
    for (const table of ['problems', 'blobs', 'counters', 'audit_entries', 'mails', 'invitations'])
      expect(await rows(table), table).toEqual([])
  })
})
