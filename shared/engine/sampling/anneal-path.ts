import type { EnergyTable } from '../machine/energy-table'

/** A piecewise-linear schedule: at t[k] the anneal is at s[k], linear in between. t rises from its first value; its unit does not matter. */
export interface SchedulePoints {
  readonly t: readonly number[]
  readonly s: readonly number[]
}

/** From beginning to end at one pace. */
export const STRAIGHT: SchedulePoints = { t: [0, 1], s: [0, 1] }

/** Value of the polyline through (xs, ys) at x, xs rising; its ends go on level. */
function polylineAt(xs: readonly number[], ys: readonly number[], x: number): number {
  if (x <= xs[0]!) return ys[0]!
  let k = 1
  while (k < xs.length && xs[k]! < x) k++
  if (k === xs.length) return ys.at(-1)!
  const share = (x - xs[k - 1]!) / (xs[k]! - xs[k - 1]!)
  return ys[k - 1]! + share * (ys[k]! - ys[k - 1]!)
}

/** A(s) and B(s) in the unit of the table, linear between its rows. */
export const energiesAt = (table: EnergyTable, s: number): { A: number; B: number } => ({
  A: polylineAt(table.s, table.A, s),
  B: polylineAt(table.s, table.B, s),
})

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
    const s = polylineAt(schedule.t, schedule.s, first + ((k + 0.5) / sweeps) * (last - first))
    const at = energiesAt(table, s)
    A[k] = at.A
    B[k] = at.B
  }
  return { A, B }
}

/** k_B / h in GHz a kelvin (CODATA 2018: k_B = 1.380649e−23 J/K and h = 6.62607015e−34 J s, both exact). */
export const GIGAHERTZ_PER_KELVIN = 1.380649e-23 / 6.62607015e-34 / 1e9

/**
 * The machine's own temperature in programmed units at the end of the anneal, kT / (B(1)/2): there
 * H/h = B(1)/2 · (Σ h σz + Σ J σz σz), so programmed energies count in units of B(1)/2. Null where B(1) is 0.
 */
export function programmedTemperature(temperatureMillikelvin: number, table: EnergyTable): number | null {
  const { B } = energiesAt(table, 1)
  return B > 0 ? (temperatureMillikelvin * 1e-3 * GIGAHERTZ_PER_KELVIN) / (B / 2) : null
}
