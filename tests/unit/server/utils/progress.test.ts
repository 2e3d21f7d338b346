import { createServer, type Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import { createApp, defineEventHandler, setResponseStatus, toNodeListener } from 'h3'
import { afterEach, expect, it } from 'vitest'
import { answerWithProgress, type Telling } from '../../../../server/utils/progress'
import { DomainError } from '../../../../shared/errors'

let server: Server | undefined
afterEach(() => server?.close())

/** Serves work at an address of its own. */
async function serving(work: (telling: Telling<number>) => Promise<unknown>): Promise<string> {
  const app = createApp()
  app.use(
    defineEventHandler((event) =>
      answerWithProgress<number, unknown>(event, async (telling) => {
        const result = await work(telling)
        if (!event.node.res.headersSent) setResponseStatus(event, 201)
        return result
      }),
    ),
  )
  server = createServer(toNodeListener(app))
  await new Promise<void>((resolve) => server!.listen(0, '127.0.0.1', resolve))
  return `http://127.0.0.1:${(server.address() as AddressInfo).port}/`
}

const LINES = { accept: 'application/x-ndjson, application/json' }
const linesOf = (text: string): unknown[] =>
  text
    .trimEnd()
    .split('\n')
    .map((line) => JSON.parse(line) as unknown)

it('answers as ever where no progress is asked for', async () => {
  const response = await fetch(await serving(async ({ tell }) => (tell(1), { read: 7 })))
  expect([response.status, await response.json()]).toEqual([201, { read: 7 }])
})

it('tells progress line by line, then the outcome', async () => {
  const url = await serving(async ({ tell }) => (tell(1), tell(2), { read: 'a\nb' }))
  const response = await fetch(url, { headers: LINES })
  expect(response.headers.get('content-type')).toContain('application/x-ndjson')
  expect(linesOf(await response.text())).toEqual([{ progress: 1 }, { progress: 2 }, { done: { read: 'a\nb' } }])
})

it('tells a refusal as the last line', async () => {
  const url = await serving(() =>
    Promise.reject(
      new DomainError('not acceptable', 'problem.unreadable', 'line 3 is wrong', [{ line: 3, message: 'wrong' }]),
    ),
  )
  const data = { code: 'problem.unreadable', message: 'line 3 is wrong', issues: [{ line: 3, message: 'wrong' }] }
  const response = await fetch(url, { headers: LINES })
  expect(linesOf(await response.text())).toEqual([{ failed: { statusCode: 422, data } }])
})

it('ends the work of a client that has gone', async () => {
  let begun!: () => void
  const isBegun = new Promise<void>((resolve) => (begun = resolve))
  let ended!: (value: string) => void
  const isEnded = new Promise<string>((resolve) => (ended = resolve))
  const url = await serving(({ signal }) => {
    begun()
    return new Promise((resolve) =>
      signal.addEventListener('abort', () => {
        ended('ended')
        resolve(null)
      }),
    )
  })
  const client = new AbortController()
  const answer = fetch(url, { headers: LINES, signal: client.signal })
    .then((response) => response.text())
    .catch(() => 'gone')
  await isBegun
  client.abort()
  expect(await isEnded).toBe('ended')
  expect(await answer).toBe('gone')
})
