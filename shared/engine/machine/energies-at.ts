import type { EnergyTable } from './energy-table'

/** A(s) and B(s) in GHz, linear between the rows of a table without issues. @param s 0 … 1 */
export function energiesAt({ s: points, A, B }: EnergyTable, s: number): { A: number; B: number } {
  let row = 1
  while (row < points.length - 1 && points[row]! < s) row++
  const [from, to] = [points[row - 1]!, points[row]!]
  const share = Math.min(1, Math.max(0, (s - from) / (to - from)))
  const between = (values: readonly number[]) => values[row - 1]! + share * (values[row]! - values[row - 1]!)
  return { A: between(A), B: between(B) }
}
