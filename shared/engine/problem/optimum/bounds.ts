import { coefficientTotal } from './grid'
import type { Problem } from '../problem'

/**
 * A lower bound on a QUBO without its offset, in one pass: with every interaction shared equally between its two
 * variables, E(x) = Σ_i x_i (a_i + ½ Σ_j b_ij x_j) ≥ Σ_i min(0, a_i + ½ Σ_j min(0, b_ij)); and the same with all
 * spins, −Σ|h_i| − Σ|J_ij| above the mean energy. The larger of both, lowered by what rounding may have added.
 */
export function quickLowerBound(qubo: Problem): number {
  const { linear, rows, cols, values } = qubo
  const least = linear.slice()
  const fields = linear.map((value) => value / 2)
  let mean = 0
  let spins = 0
  for (let k = 0; k < values.length; k++) {
    const value = values[k]!
    for (const v of [rows[k]!, cols[k]!]) {
      if (value < 0) least[v]! += value / 2
      fields[v]! += value / 4
    }
    mean += value / 4
    spins += Math.abs(value) / 4
  }
  for (const value of linear) mean += value / 2
  const bySharing = least.reduce((sum, value) => sum + Math.min(0, value), 0)
  const bySpins = mean - spins - fields.reduce((sum, value) => sum + Math.abs(value), 0)
  const rounding = coefficientTotal(qubo) * (linear.length + values.length) * 2 ** -51
  return Math.max(bySharing, bySpins) - rounding
}
