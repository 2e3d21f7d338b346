import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { Schedule } from '../../../../shared/engine/programming/schedule'
import { scheduleIssues, straightSchedule, withPause } from '../../../../shared/engine/programming/schedule'
import { energiesOver, movedPoint, tidy, withPoint } from '../../../../utils/run-sheet/schedule'

const free = {
  annealMinMicroseconds: 0,
  annealMaxMicroseconds: 1e9,
  slopeMaxPerMicrosecond: null,
  schedulePointsMax: 1000,
}

describe('moving a point', () => {
  const schedule = withPause(straightSchedule(20), 0.5, 10)

  it('puts it where it is dragged', () => {
    expect(movedPoint(schedule, 1, { microseconds: 4.00049, s: 0.30004 })[1]).toEqual({ microseconds: 4, s: 0.3 })
  })

  it('keeps the first, s = 1 at the last, and the order, wherever it is dragged to', () => {
    const anywhere = fc.record({
      microseconds: fc.double({ min: -100, max: 100, noNaN: true }),
      s: fc.double({ min: -2, max: 2, noNaN: true }),
    })
    fc.assert(
      fc.property(fc.nat(3), anywhere, (index, to) => {
        const moved = movedPoint(schedule, index, to)
        expect(scheduleIssues(moved, free)).toEqual([])
        expect(moved.filter((point, k) => point !== schedule[k]).length).toBeLessThanOrEqual(1)
      }),
    )
    expect(movedPoint(schedule, 0, { microseconds: 5, s: 0.5 })).toBe(schedule)
    expect(movedPoint(schedule, 3, { microseconds: 50, s: 0.2 })[3]).toEqual({ microseconds: 50, s: 1 })
  })
})

it('adds points where the piece is longest', () => {
  let schedule: Schedule = withPause(straightSchedule(20), 0.5, 30).map(tidy)
  schedule = withPoint(schedule)
  expect(schedule[2]).toEqual({ microseconds: 25, s: 0.5 })
  for (let k = 0; k < 20; k++) schedule = withPoint(schedule)
  expect(scheduleIssues(schedule, free)).toEqual([])
  expect(schedule).toHaveLength(25)
})

it('draws the energies along the time', () => {
  const table = { s: [0, 1], A: [8, 0], B: [0, 10] }
  const [A, B] = energiesOver(withPause(straightSchedule(10), 0.25, 10), table)
  const at = (series: typeof A, time: number) => series!.points.find(({ x }) => x === time)!.y
  expect([at(A, 0), at(A, 2.5), at(A, 12.5), at(A, 20)]).toEqual([8, 6, 6, 0])
  expect([at(B, 0), at(B, 2.5), at(B, 12.5), at(B, 20)]).toEqual([0, 2.5, 2.5, 10])
})
