import { describe, expect, it } from 'vitest'
import { MOST_TRIES, outcomeOf } from '../../../../server/bridge/answers'
import type { OutboundAnswer } from '../../../../server/bridge/outbound'
import { OutboundRefused } from '../../../../server/bridge/outbound'

const NOW = new Date('2026-12-02T12:00:00Z')
const answer = (status: number, more: Partial<OutboundAnswer> = {}): OutboundAnswer => ({
  ...{ status, retryAfter: null, location: null, text: '' },
  ...more,
})
const minutes = (outcome: ReturnType<typeof outcomeOf>): number | null =>
  outcome.state === 'waiting' ? (outcome.nextAttemptAt.getTime() - NOW.getTime()) / 60_000 : null

describe('what follows from a try', () => {
  it('is that the call is taken, by any status of success', () => {
    for (const status of [200, 201, 202, 204, 299]) expect(outcomeOf(answer(status), 1, NOW).state).toBe('taken')
  })

  it('is another after 1, 5, 15, 60, 180, 360 and 720 minutes, and none after the eighth', () => {
    const tries = Array.from({ length: MOST_TRIES }, (_, k) => outcomeOf(answer(503), k + 1, NOW))
    expect(tries.map(minutes)).toEqual([1, 5, 15, 60, 180, 360, 720, null])
    expect(tries.at(-1)).toEqual({ state: 'given up', reason: 'it answered 503' })
  })

  it('is another for what may be over the next time, and none for a refusal', () => {
    for (const status of [408, 425, 429, 500, 502, 504, 599]) expect(minutes(outcomeOf(answer(status), 1, NOW))).toBe(1)
    for (const status of [400, 401, 403, 404, 409, 410, 413, 422, 451])
      expect(outcomeOf(answer(status), 1, NOW)).toEqual({ state: 'given up', reason: `it answered ${status}` })
    expect(minutes(outcomeOf(new Error('connect ECONNREFUSED'), 1, NOW))).toBe(1)
    expect(outcomeOf(new OutboundRefused('not public'), 1, NOW)).toEqual({ state: 'given up', reason: 'not public' })
  })

  it('is none for a redirect, which is told', () => {
    const { state, reason } = outcomeOf(answer(308, { location: 'https://bridge.example/new' }), 1, NOW)
    expect(state).toBe('given up')
    expect(reason).toContain('308, a redirect to https://bridge.example/new')
  })

  it.each([
    ['120', 2],
    ['30', 1],
    ['Wed, 02 Dec 2026 12:10:00 GMT', 10],
    ['Wed, 02 Dec 2026 11:00:00 GMT', 1],
    ['9999999', 720],
    ['soon', 1],
    ['-5', 1],
  ])('waits as long as Retry-After: %s asks for, within limits', (retryAfter, expected) => {
    expect(minutes(outcomeOf(answer(429, { retryAfter }), 1, NOW))).toBe(expected)
  })
})
