import { energiesAt } from './energies-at'
import type { EnergyTable } from './energy-table'

/** The largest difference of one column between two tables, and where it lies. */
export interface LargestChange {
  readonly s: number
  readonly from: number
  readonly to: number
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
    const change = { s, from: energiesAt(before, s)[column], to: energiesAt(now, s)[column] }
    const size = Math.abs(change.to - change.from)
    if (size <= most) continue
    most = size
    largest = change
  }
  return largest
}
