import { energiesAt } from '../machine/energies-at'
import type { EnergyTable } from '../machine/energy-table'
import { thermalGigahertz } from '../machine/energy-units'

/** A piecewise-linear schedule: at t[k] the anneal is at s[k], linear in between. t rises from its first value; its unit does not matter. */
export interface SchedulePoints {
  readonly t: readonly number[]
  readonly s: readonly number[]
}

/** From beginning to end at one pace. */
export const STRAIGHT: SchedulePoints = { t: [0, 1], s: [0, 1] }

/** s at a time, linear between the points; before the first and after the last it stays. */
function progressAt({ t, s }: SchedulePoints, time: number): number {
  if (time <= t[0]!) return s[0]!
  let k = 1
  while (k < t.length - 1 && t[k]! < time) k++
  const share = Math.min(1, (time - t[k - 1]!) / (t[k]! - t[k - 1]!))
  return s[k - 1]! + share * (s[k]! - s[k - 1]!)
}

/** @throws RangeError for fewer than two points, times that do not rise or s outside 0 … 1 */
export function requireSchedule({ t, s }: SchedulePoints): void {
  if (t.length < 2 || t.length !== s.length)
    throw new RangeError('a schedule has at least two points, each with t and s')
  for (let k = 0; k < t.length; k++) {
    if (!(Number.isFinite(t[k]!) && (k === 0 || t[k]! > t[k - 1]!)))
      throw new RangeError(`times of a schedule must rise: ${t[k]} at point ${k + 1}`)
    if (!(s[k]! >= 0 && s[k]! <= 1)) throw new RangeError(`s must be from 0 to 1, not ${s[k]} at point ${k + 1}`)
  }
}

/** A and B of every sweep: sweep k stands for the middle of the k-th of as many equal parts of the time. */
export function energiesOfSweeps(
  schedule: SchedulePoints,
  table: EnergyTable,
  sweeps: number,
): { A: Float64Array; B: Float64Array } {
  const [first, last] = [schedule.t[0]!, schedule.t.at(-1)!]
  const A = new Float64Array(sweeps)
  const B = new Float64Array(sweeps)
  for (let k = 0; k < sweeps; k++) {
    const s = progressAt(schedule, first + ((k + 0.5) / sweeps) * (last - first))
    const at = energiesAt(table, s)
    A[k] = at.A
    B[k] = at.B
  }
  return { A, B }
}

/**
 * The machine's own temperature in programmed units at the end of the anneal, kT / (B(1)/2): there
 * H/h = B(1)/2 · (Σ h σz + Σ J σz σz), so programmed energies count in units of B(1)/2. Null where B(1) is 0.
 */
export function programmedTemperature(temperatureMillikelvin: number, table: EnergyTable): number | null {
  const { B } = energiesAt(table, 1)
  return B > 0 ? thermalGigahertz(temperatureMillikelvin) / (B / 2) : null
}
