import { afterEach, beforeEach, expect, it, vi } from 'vitest'
import type { NewsReport } from '../../../composables/newsStream'
import { openNewsStream } from '../../../composables/newsStream'

class Source extends EventTarget {
  static readonly CLOSED = 2
  static opened: Source[] = []
  readyState = 1
  constructor(readonly url: string) {
    super()
    Source.opened.push(this)
  }

  close(): void {
    this.readyState = 2
  }

  tell(unread: number): void {
    this.dispatchEvent(new MessageEvent('news', { data: JSON.stringify({ unread, newest: null }) }))
  }

  fail(isGivenUp: boolean): void {
    this.readyState = isGivenUp ? 2 : 0
    this.dispatchEvent(new Event('error'))
  }
}

let reports: NewsReport[]
let status: number | 'none'
const asked = vi.fn(async (_url: string, _options: { headers: Record<string, string> }) => {
  if (status === 'none') throw new TypeError('no network')
  return { status }
})

beforeEach(() => {
  vi.useFakeTimers()
  vi.stubGlobal('EventSource', Source)
  vi.stubGlobal('fetch', asked)
  Source.opened = []
  reports = []
  asked.mockClear()
})
afterEach(() => {
  vi.useRealTimers()
  vi.unstubAllGlobals()
})

const follow = () => openNewsStream('w 1', (report) => reports.push(report))
const source = () => Source.opened.at(-1)!

it('tells what comes for the workspace that is shown, and leaves a broken connection to the browser', async () => {
  follow()
  expect(source().url).toBe('/api/news/events?workspace=w%201')
  source().tell(3)
  source().fail(false)
  source().tell(4)
  await vi.runAllTimersAsync()
  expect(reports).toEqual([3, 4].map((unread) => ({ told: { unread, newest: null } })))
  expect([Source.opened.length, asked.mock.calls.length]).toEqual([1, 0])
})

it.each([401, 409])('is over where the server says %d', async (said) => {
  status = said
  follow()
  source().fail(true)
  await vi.runAllTimersAsync()
  expect(reports).toEqual(['over'])
  expect(asked.mock.calls[0]![1].headers).toEqual({ 'x-espalier-workspace': 'w 1' })
  expect(Source.opened).toHaveLength(1)
})

it('tries again, less and less often, while the server cannot answer, and soon again once it could', async () => {
  follow()
  const waits: number[] = []
  for (const [k, said] of ([502, 'none', 502, 503, 502, 502, 502] as const).entries()) {
    status = said
    source().fail(true)
    const from = Date.now()
    while (Source.opened.length < k + 2) await vi.advanceTimersByTimeAsync(1000)
    waits.push((Date.now() - from) / 1000)
  }
  expect(waits).toEqual([2, 4, 8, 16, 32, 60, 60])
  source().tell(1)
  source().fail(true)
  await vi.advanceTimersByTimeAsync(2000)
  expect(Source.opened).toHaveLength(9)
})

it('does nothing more once it was ended, even while it looks', async () => {
  status = 401
  const end = follow()
  source().fail(true)
  end()
  await vi.runAllTimersAsync()
  expect(reports).toEqual([])
  expect(source().readyState).toBe(2)
})
