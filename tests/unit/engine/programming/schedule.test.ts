import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { Schedule, ScheduleLimits } from '../../../../shared/engine/programming/schedule'
import {
  durationOf,
  sAt,
  scheduleIssues,
  straightSchedule,
  timeAt,
  withPause,
  withQuench,
} from '../../../../shared/engine/programming/schedule'

const free: ScheduleLimits = {
  annealMinMicroseconds: 0.5,
  annealMaxMicroseconds: 2000,
  slopeMaxPerMicrosecond: null,
  schedulePointsMax: 12,
}
const messages = (schedule: Schedule, limits: Partial<ScheduleLimits> = {}) =>
  scheduleIssues(schedule, { ...free, ...limits }).map(({ point, message }) => `${point}: ${message}`)

describe('what a machine refuses', () => {
  it('takes the straight one', () => expect(messages(straightSchedule(20))).toEqual([]))

  it('names the point at which the course is wrong', () => {
    const at = (...points: [number, number][]) => points.map(([microseconds, s]) => ({ microseconds, s }))
    expect(messages(at([0, 0]))).toEqual(['0: a schedule has at least two points, (0 µs, 0) and (T, 1)'])
    expect(messages(at([1, 0], [20, 1]))).toEqual(['0: a schedule begins at 0 µs with s = 0'])
    expect(messages(at([0, 0], [20, 0.9]))).toEqual(['1: a schedule ends with s = 1'])
    expect(messages(at([0, 0], [9, 0.5], [9, 1]))).toEqual(['2: 9 µs does not come after 9 µs'])
    expect(messages(at([0, 0], [5, 0.6], [9, 0.4], [12, 1]))).toEqual([
      '2: s falls from 0.6 to 0.4; it may stand still or rise',
    ])
    expect(messages(at([0, 0], [5, 1.5], [9, 1]))).toEqual([
      '1: s = 1.5 is outside 0 to 1',
      '2: s falls from 1.5 to 1; it may stand still or rise',
    ])
    expect(messages(at([0, 0], [Number.NaN, 1]))).toEqual(['1: a time and an s are needed'])
  })

  it('keeps to the limits of the machine', () => {
    expect(messages(straightSchedule(0.1))).toEqual(['1: the anneal takes 0.1 µs; the machine takes 0.5 to 2000 µs'])
    expect(messages(withPause(straightSchedule(20), 0.5, 5), { schedulePointsMax: null })).toEqual([
      '1: the machine takes no other schedule than the straight one',
    ])
    expect(messages(withPause(straightSchedule(20), 0.5, 5), { schedulePointsMax: 3 })).toEqual([
      '3: 4 points; the machine takes at most 3',
    ])
    expect(messages(withQuench(straightSchedule(20), 0.6, 0.5), { slopeMaxPerMicrosecond: 0.5 })).toEqual([
      '2: s rises by 0.8 a µs; the machine takes at most 0.5',
    ])
    expect(messages(withQuench(straightSchedule(20), 0.6, 0.8), { slopeMaxPerMicrosecond: 0.5 })).toEqual([])
  })
})

it('says s at a time and the time of an s, each undoing the other', () => {
  const schedule = withPause(straightSchedule(10), 0.4, 6)
  expect(durationOf(schedule)).toBe(16)
  expect([-1, 0, 2, 4, 7, 10, 13, 16, 20].map((t) => sAt(schedule, t))).toEqual([0, 0, 0.2, 0.4, 0.4, 0.4, 0.7, 1, 1])
  fc.assert(
    fc.property(fc.double({ min: 0.001, max: 0.999, noNaN: true }), (s) => {
      expect(sAt(schedule, timeAt(schedule, s))).toBeCloseTo(s, 9)
    }),
  )
})

it('pauses and quenches without touching what comes before', () => {
  const places = fc.double({ min: 0.01, max: 0.99, noNaN: true })
  const times = fc.double({ min: 0.1, max: 500, noNaN: true })
  fc.assert(
    fc.property(places, places, times, times, (first, second, pause, quench) => {
      const paused = withPause(straightSchedule(40), first, pause)
      const quenched = withQuench(paused, second, quench)
      for (const schedule of [paused, quenched])
        expect(scheduleIssues(schedule, { ...free, annealMaxMicroseconds: 1e6 })).toEqual([])
      expect(durationOf(paused)).toBeCloseTo(40 + pause, 6)
      expect(durationOf(quenched)).toBeCloseTo(timeAt(paused, second) + quench, 6)
      const before = timeAt(paused, second) / 2
      expect(sAt(quenched, before)).toBeCloseTo(sAt(paused, before), 9)
    }),
  )
  for (const s of [0, 1, Number.NaN]) {
    expect(() => withPause(straightSchedule(1), s, 1)).toThrow(/between s = 0 and s = 1/)
    expect(() => withQuench(straightSchedule(1), s, 1)).toThrow(/between s = 0 and s = 1/)
  }
  expect(() => withPause(straightSchedule(1), 0.5, 0)).toThrow(/takes some time/)
  expect(() => withQuench(straightSchedule(1), 0.5, -1)).toThrow(/takes some time/)
})
