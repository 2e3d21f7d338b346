import { sql } from 'drizzle-orm'
import type { H3Event } from 'h3'
import { afterAll, beforeAll, expect, it } from 'vitest'
import type { Actor } from '../../server/app'
import { auditFile, auditTrail } from '../../server/services/audit'
import { removeProblem } from '../../server/services/problems'
import { audited, noteNothingDone } from '../../server/utils/audited'
import { answerWithProgress } from '../../server/utils/progress'
import { DomainError } from '../../shared/errors'
import { auditQuerySchema } from '../../shared/schemas/audit'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { newMember } from '../support/people'

let test: TestApp
let owner: Actor
let problemId: string
beforeAll(async () => {
  test = await startTestApp(1)
  owner = await newMember(test.app, test.actor, 'Olga', ['owner'])
  problemId = await test.problem('a b 1\n')
})
afterAll(() => test?.close())

function eventOf(method: string, path: string, params: Record<string, string> = {}): H3Event {
  const node = { req: { headers: {}, socket: { remoteAddress: '::ffff:192.0.2.7' } } }
  return { method, context: { matchedRoute: { path }, params }, node } as unknown as H3Event
}
const trail = async (query: Record<string, unknown> = {}) =>
  (await auditTrail(test.app, owner, auditQuerySchema.parse(query))).items
const done = <T>(
  method: string,
  path: string,
  params: Record<string, string>,
  work: () => Promise<T> | T,
  by = owner,
) => audited(eventOf(method, path, params), { app: test.app, tokenId: null, ...by }, work)

it('writes down who did what to which thing, and from where', async () => {
  await done('PATCH', '/api/problems/:id', { id: problemId }, () => ({ ok: true }))
  const made = await done('POST', '/api/problems', {}, async () => ({ id: await test.problem('c d 1\n') }), test.actor)
  expect(
    (await trail()).map(({ by, what, kind, thing, address, token }) => [by.name, what, kind, thing, address, token]),
  ).toEqual([
    ['Developer', 'uploaded', 'problem', { id: made.id, label: 'P-2 Test' }, '192.0.2.7', null],
    ['Olga', 'changed', 'problem', { id: problemId, label: 'P-1 Test' }, '192.0.2.7', null],
  ])
})

it('keeps the name of what is deleted', async () => {
  await done('DELETE', '/api/problems/:id', { id: problemId }, () => removeProblem(test.app, test.actor, problemId))
  expect((await trail())[0]).toMatchObject({ what: 'deleted', thing: { label: 'P-1 Test' } })
})

it('writes nothing down of what failed, was looked at or worked out', async () => {
  const before = (await trail()).length
  await expect(
    done('PATCH', '/api/problems/:id', { id: problemId }, () => {
      throw new Error('no')
    }),
  ).rejects.toThrow('no')
  await done('GET', '/api/problems/:id', { id: problemId }, () => 1)
  await done('POST', '/api/problems/:id/energy', { id: problemId }, () => 1)
  expect(await trail()).toHaveLength(before)
})

it('is filtered by person, kind and day, and told page by page and as a file', async () => {
  const today = new Date().toISOString().slice(0, 10)
  expect(await trail({ by: test.actor.userId })).toHaveLength(1)
  expect(await trail({ kind: 'machine' })).toHaveLength(0)
  expect(await trail({ from: today, to: today })).toHaveLength(3)
  expect(await trail({ to: '2020-01-01' })).toHaveLength(0)
  const first = await auditTrail(test.app, owner, auditQuerySchema.parse({ limit: 2 }))
  expect(first.nextCursor).not.toBeNull()
  expect(first.people.map(({ name }) => name)).toEqual(['Developer', 'Olga'])
  const file = await auditFile(test.app, owner, auditQuerySchema.parse({ limit: 1 }))
  expect(file.trim().split('\n')).toHaveLength(4)
})

it('tells what came of work whose answer was sent meanwhile, and nothing of what failed then or was only tried', async () => {
  const before = (await trail()).length
  const response = { on() {}, writeHead() {}, flushHeaders() {}, write: () => true, end() {} }
  const upload = (work: () => Promise<unknown>) => {
    const event = eventOf('POST', '/api/problems')
    event.node.req.headers.accept = 'application/x-ndjson'
    Object.assign(event.node, { res: response })
    return audited(event, { app: test.app, tokenId: null, ...test.actor }, () => answerWithProgress(event, work))
  }
  const refused = new DomainError('not acceptable', 'problem.lines', 'Line 1 holds no number.')
  await upload(() => Promise.reject(refused))
  const tried = eventOf('POST', '/api/problems')
  await audited(tried, { app: test.app, tokenId: null, ...test.actor }, () => noteNothingDone(tried))
  expect(await trail()).toHaveLength(before)
  const id = await test.problem('e f 1\n')
  await upload(async () => ({ id }))
  expect((await trail())[0]).toMatchObject({ what: 'uploaded', thing: { id } })
})

it('is only ever added to, and is another workspace’s own', async () => {
  await expect(test.app.db.execute(sql`update audit_entries set what = 'nothing'`)).rejects.toThrow()
  await expect(test.app.db.execute(sql`delete from audit_entries`)).rejects.toThrow()
  expect(
    (await auditTrail(test.app, { ...owner, workspaceId: 'elsewhere' }, auditQuerySchema.parse({}))).items,
  ).toEqual([])
})
