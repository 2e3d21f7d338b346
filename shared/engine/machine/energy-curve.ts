import type { EnergyTable } from './energy-table'

/** The largest difference of one column between two tables, and where it lies. */
export interface LargestChange {
  readonly s: number
  readonly from: number
  readonly to: number
}

/**
 * A column at s, linear between rows.
 *
 * @param s 0 to 1
 * @returns in GHz
 */
export function energyAt(table: EnergyTable, column: 'A' | 'B', s: number): number {
  const values = table[column]
  let high = 1
  while (high < table.s.length - 1 && table.s[high]! < s) high++
  const [s0, s1] = [table.s[high - 1]!, table.s[high]!]
  const share = (s - s0) / (s1 - s0)
  return values[high - 1]! * (1 - share) + values[high]! * share
}

/** Shares of the largest value below which a difference is rounding between rows. */
const ROUNDING = 1e-12

/**
 * Where a column differs most. Both are linear between their rows, so it is at a row of one of them; the lowest such s.
 *
 * @returns null where they are the same at every s
 */
export function largestChange(before: EnergyTable, now: EnergyTable, column: 'A' | 'B'): LargestChange | null {
  let largest: LargestChange | null = null
  let most = ROUNDING * Math.max(...before[column], ...now[column])
  for (const s of [...before.s, ...now.s].sort((a, b) => a - b)) {
    const change = { s, from: energyAt(before, column, s), to: energyAt(now, column, s) }
    const size = Math.abs(change.to - change.from)
    if (size <= most) continue
    most = size
    largest = change
  }
  return largest
}
