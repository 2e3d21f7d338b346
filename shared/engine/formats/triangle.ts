import { buildProblem, type Terms } from '../problem/build'
import type { Triangle } from './format'

/** Where the nonzero entries off the diagonal stand, and whether the two triangles mirror each other. */
export function triangleOf(n: number, terms: Terms): Triangle {
  const upper: { rows: number[]; cols: number[]; values: number[] } = { rows: [], cols: [], values: [] }
  const lower: { rows: number[]; cols: number[]; values: number[] } = { rows: [], cols: [], values: [] }
  for (let k = 0; k < terms.values.length; k++) {
    const row = terms.rows[k]!
    const col = terms.cols[k]!
    if (row === col || terms.values[k] === 0) continue
    const side = row < col ? upper : lower
    side.rows.push(row)
    side.cols.push(col)
    side.values.push(terms.values[k]!)
  }
  if (upper.values.length === 0) return lower.values.length === 0 ? 'diagonal only' : 'lower'
  if (lower.values.length === 0) return 'upper'
  const above = buildProblem(n, upper, 0).problem
  const below = buildProblem(n, lower, 0).problem
  const mirrored =
    above.values.length === below.values.length &&
    above.values.every(
      (value, k) => value === below.values[k] && above.rows[k] === below.rows[k] && above.cols[k] === below.cols[k],
    )
  return mirrored ? 'symmetric' : 'both'
}
