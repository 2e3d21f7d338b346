import { describe, expect, it } from 'vitest'
import {
  durationOf,
  quenchAt,
  sAt,
  scheduleIssues,
  straightSchedule,
} from '../../../../shared/engine/programming/schedule'
import { createRandom } from '../../../../shared/engine/random'

const limits = {
  annealMinMicroseconds: 0.01,
  annealMaxMicroseconds: 10_000,
  slopeMaxPerMicrosecond: 2,
  schedulePointsMax: 12,
}

describe('a quench of a series', () => {
  it('follows the sheet’s own rate up to s, then goes as steep as it is told', () => {
    expect(quenchAt(straightSchedule(20), 0.25, 0.375)).toEqual([
      { microseconds: 0, s: 0 },
      { microseconds: 5, s: 0.25 },
      { microseconds: 5.375, s: 1 },
    ])
  })

  it('keeps a pause before it, and leaves what comes after s out', () => {
    const paused = [
      { microseconds: 0, s: 0 },
      { microseconds: 4, s: 0.4 },
      { microseconds: 14, s: 0.4 },
      { microseconds: 20, s: 1 },
    ]
    expect(quenchAt(paused, 0.7, 0.15)).toEqual([
      ...paused.slice(0, 3),
      { microseconds: 17, s: 0.7 },
      { microseconds: 17.15, s: 1 },
    ])
    expect(quenchAt(paused, 0.2, 1).length).toBe(3)
  })

  it('is taken by a machine whose steepest slope it is made for, whatever s and rate', () => {
    const random = createRandom(8)
    for (let k = 0; k < 400; k++) {
      const s = Number((0.001 + 0.998 * random.float()).toFixed(4))
      const whole = 0.5 + 200 * random.float()
      const schedule = quenchAt(straightSchedule(whole), s, (1 - s) / limits.slopeMaxPerMicrosecond)
      expect(scheduleIssues(schedule, limits), `s = ${s} of ${whole} µs`).toEqual([])
      expect(Math.abs(sAt(schedule, s * whole) - s)).toBeLessThan(0.01)
      expect(durationOf(schedule)).toBeLessThan(s * whole + (1 - s) / 2 + 0.003)
      for (const { microseconds } of schedule) expect(microseconds).toBe(Number(microseconds.toFixed(3)))
    }
  })

  it('refuses an s outside and a quench without time', () => {
    expect(() => quenchAt(straightSchedule(20), 1, 1)).toThrow(RangeError)
    expect(() => quenchAt(straightSchedule(20), 0.5, 0)).toThrow(RangeError)
  })
})
