import { energiesAt } from '#shared/engine/machine/energies-at'
import type { EnergyTable } from '#shared/engine/machine/energy-table'
import { durationOf, sAt } from '#shared/engine/programming/schedule'
import type { Schedule, SchedulePoint } from '#shared/engine/programming/schedule'
import type { ChartSeries } from '../ui/chart/types'

/** How a schedule is drawn and changed by hand. */

/** Decimals kept of a time in µs and of s: finer than any machine sets them, and readable. */
const DECIMALS = { microseconds: 3, s: 4 } as const

const rounded = (value: number, decimals: number): number => Number(value.toFixed(decimals))

/** A point as it is written down. */
export const tidy = ({ microseconds, s }: SchedulePoint): SchedulePoint => ({
  microseconds: rounded(microseconds, DECIMALS.microseconds),
  s: rounded(s, DECIMALS.s),
})

/**
 * A point moved to a place, as far as its neighbours let it: the first stays, the last keeps s = 1, times keep their
 * order, s never falls.
 */
export function movedPoint(schedule: Schedule, index: number, to: SchedulePoint): Schedule {
  const [before, after] = [schedule[index - 1], schedule[index + 1]]
  if (!before) return schedule
  const step = 10 ** -DECIMALS.microseconds
  const least = before.microseconds + step
  const most = after ? after.microseconds - step : Infinity
  const moved = tidy({
    microseconds: Math.min(most, Math.max(least, to.microseconds)),
    s: after ? Math.min(after.s, Math.max(before.s, to.s)) : 1,
  })
  return schedule.map((point, k) => (k === index ? moved : point))
}

/** A point in the middle of the longest piece: the place with most room. */
export function withPoint(schedule: Schedule): Schedule {
  let longest = 1
  const length = (k: number) => schedule[k]!.microseconds - schedule[k - 1]!.microseconds
  for (let k = 2; k < schedule.length; k++) if (length(k) > length(longest)) longest = k
  const [from, to] = [schedule[longest - 1]!, schedule[longest]!]
  const middle = tidy({ microseconds: (from.microseconds + to.microseconds) / 2, s: (from.s + to.s) / 2 })
  return [...schedule.slice(0, longest), middle, ...schedule.slice(longest)]
}

/** Times at which the energies bend: points of the schedule, and rows of the table that it passes between them. */
const SAMPLES = 200

/** A and B over the time of a schedule, in GHz. */
export function energiesOver(schedule: Schedule, table: EnergyTable): ChartSeries[] {
  const whole = durationOf(schedule)
  const times = [
    ...schedule.map(({ microseconds }) => microseconds),
    ...Array.from({ length: SAMPLES + 1 }, (_, k) => (k / SAMPLES) * whole),
  ]
  const order = [...new Set(times)].sort((a, b) => a - b)
  return (['A', 'B'] as const).map((column) => ({
    name: column,
    stroke: column === 'A' ? 'solid' : 'dashed',
    marker: 'none',
    tone: column === 'A' ? 'slate' : 'leaf',
    points: order.map((time) => ({ x: time, y: energiesAt(table, sAt(schedule, time))[column] })),
    labelAt: (column === 'A' ? 0.12 : 0.82) * whole,
  }))
}
