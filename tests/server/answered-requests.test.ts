import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import * as h3 from 'h3'
import { afterAll, beforeAll, beforeEach, expect, it, vi } from 'vitest'
import { beginAnswer, keepAnswer, sweepAnswers } from '../../server/services/answered-requests'
import { createToken } from '../../server/services/tokens'
import { setApp } from '../../server/utils/app'
import * as http from '../../server/utils/http'
import * as progress from '../../server/utils/progress'
import * as route from '../../server/utils/route'
import * as upload from '../../server/utils/upload'
import { createTokenSchema } from '../../shared/schemas/tokens'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { newMember } from '../support/people'

let test: TestApp
let url: string
let authorization: string
const server = createServer()
let runs = 0
/** Held by work that a test wants to be under way. */
let gate: Promise<void>

/** Routes in this process: those of the product where Nitro's own imports suffice, and one that counts its runs. */
async function routes(): Promise<h3.Router> {
  for (const [name, value] of Object.entries({ ...h3, ...http, ...progress, ...route, ...upload }))
    vi.stubGlobal(name, value)
  const { default: problems } = await import('../../server/api/problems/index.post')
  const counted = route.defineRoute('member', async (event) => {
    const body = (await h3.readBody<{ refuse?: boolean }>(event)) ?? {}
    runs++
    await gate
    if (body.refuse) throw h3.createError({ statusCode: 418 })
    h3.setResponseStatus(event, 201)
    return { run: runs }
  })
  return h3.createRouter().post('/api/problems', problems).post('/counted', counted)
}

beforeAll(async () => {
  test = await startTestApp(1)
  setApp(Promise.resolve(test.app))
  const holder = { ...test.actor, roles: ['developer' as const] }
  const input = createTokenSchema.parse({ name: 'tests', role: 'developer' })
  authorization = `Bearer ${(await createToken(test.app, holder, input)).token}`
  server.on('request', h3.toNodeListener(h3.createApp().use(await routes())))
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
  url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`
})
afterAll(async () => {
  server.close()
  vi.unstubAllGlobals()
  await test?.close()
})
beforeEach(() => {
  runs = 0
  gate = Promise.resolve()
})

interface Answer {
  status: number
  body: { id?: string; run?: number; data?: { code: string } }
}

async function post(path: string, key: string, body: BodyInit, more: Record<string, string> = {}): Promise<Answer> {
  const type: Record<string, string> = typeof body === 'string' ? { 'content-type': 'application/json' } : {}
  const headers = { authorization, 'idempotency-key': key, ...type, ...more }
  const response = await fetch(url + path, { method: 'POST', headers, body })
  return { status: response.status, body: (await response.json()) as Answer['body'] }
}

it('answers the same request once, and refuses another one under its key', async () => {
  const first = await post('/counted', 'a', '{"x":1}')
  expect(first).toEqual({ status: 201, body: { run: 1 } })
  expect(await post('/counted', 'a', '{"x":1}')).toEqual(first)
  expect(await post('/counted', 'b', '{"x":1}')).toEqual({ status: 201, body: { run: 2 } })
  for (const [path, body] of [
    ['/counted', '{"x":2}'],
    ['/counted?y=1', '{"x":1}'],
  ] as const)
    expect(await post(path, 'a', body)).toMatchObject({ status: 422, body: { data: { code: 'request.key-reused' } } })
  expect(await post('/counted', 'a', '{"x":1}')).toEqual(first)
  expect(runs).toBe(2)
})

it('does nothing twice when asked several times at once', async () => {
  let open!: () => void
  gate = new Promise((resolve) => (open = resolve))
  const first = post('/counted', 'c', '{}')
  await vi.waitFor(() => expect(runs).toBe(1))
  const others = await Promise.all([post('/counted', 'c', '{}'), post('/counted', 'c', '{}')])
  expect(others.map(({ status, body }) => [status, body.data?.code])).toEqual([
    [409, 'request.being-answered'],
    [409, 'request.being-answered'],
  ])
  open()
  expect(await first).toEqual({ status: 201, body: { run: 1 } })
  expect(await post('/counted', 'c', '{}')).toEqual({ status: 201, body: { run: 1 } })
})

it('tries anew what was refused', async () => {
  expect((await post('/counted', 'd', '{"refuse":true}')).status).toBe(418)
  expect((await post('/counted', 'd', '{"refuse":true}')).status).toBe(418)
  expect(runs).toBe(2)
})

it('knows an upload again whatever stands between its parts', async () => {
  const form = (text: string): FormData => {
    const parts = new FormData()
    parts.append('name', 'Sent twice')
    parts.append('file', new Blob([text]), 'lines.txt')
    return parts
  }
  const first = await post('/api/problems', 'e', form('a b 1\n'))
  expect(first.status).toBe(201)
  expect(await post('/api/problems', 'e', form('a b 1\n'))).toEqual(first)
  expect((await post('/api/problems', 'e', form('a b 2\n'))).body.data?.code).toBe('request.key-reused')
  expect((await post('/api/problems', 'f', form('a b 1\n'))).body.id).not.toBe(first.body.id)
  const streamed = await post('/api/problems', 'g', form('a b 1\n'), { accept: 'application/x-ndjson' })
  expect(streamed.body.data?.code).toBe('request.key-progress')
})

it('takes keys of visible characters only', async () => {
  for (const key of ['with blank', 'x'.repeat(201)])
    expect((await post('/counted', key, '{}')).body.data?.code).toBe('request.key')
  expect(runs).toBe(0)
})

it('keeps an answer for a day, and gives up one that nobody is giving any more after ten minutes', async () => {
  const { app, actor } = test
  const later = (minutes: number) => ({ ...app, now: () => new Date(app.now().getTime() + minutes * 60_000) })
  const kept = { request: 'POST /x 00', status: 201, answer: { id: '1' } }
  expect(await beginAnswer(app, actor, 'day')).toBeNull()
  await expect(beginAnswer(later(9), actor, 'day')).rejects.toMatchObject({ code: 'request.being-answered' })
  expect(await beginAnswer(later(11), actor, 'day')).toBeNull()
  await keepAnswer(app, actor, 'day', kept)
  expect(await beginAnswer(later(23 * 60), actor, 'day')).toEqual(kept)
  expect(await beginAnswer(later(23 * 60), await newMember(app, actor, 'Mira', ['developer']), 'day')).toBeNull()
  await sweepAnswers(later(23 * 60))
  expect(await beginAnswer(app, actor, 'day')).toEqual(kept)
  await sweepAnswers(later(25 * 60))
  expect(await beginAnswer(app, actor, 'day')).toBeNull()
})
