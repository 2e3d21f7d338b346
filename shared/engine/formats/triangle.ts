import { buildProblem, type Terms } from '../problem/build'
import { exactSum } from '../problem/exact-sum'
import type { Triangle } from './format'

const DEFAULTS = { pairsTried: 4 }

/** How many entries that are not zero stand in either triangle. */
function countsOf({ rows, cols, values }: Terms): { upper: number; lower: number } {
  let upper = 0
  let lower = 0
  for (let k = 0; k < values.length; k++) {
    if (values[k] === 0) continue
    if (rows[k]! < cols[k]!) upper++
    else if (rows[k]! > cols[k]!) lower++
  }
  return { upper, lower }
}

/** The sum of the entries at (row, col), 0 when there are none. */
function cellSum({ rows, cols, values }: Terms, row: number, col: number): number {
  const found: number[] = []
  for (let k = 0; k < values.length; k++) if (rows[k] === row && cols[k] === col) found.push(values[k]!)
  return exactSum(found)
}

/** Whether some of the first entries have no mirror image: a look at a few spares sorting all of them. */
function isPlainlyUneven(terms: Terms): boolean {
  let tried = 0
  for (let k = 0; k < terms.values.length && tried < DEFAULTS.pairsTried; k++) {
    const row = terms.rows[k]!
    const col = terms.cols[k]!
    if (row === col || terms.values[k] === 0) continue
    tried++
    if (cellSum(terms, row, col) !== cellSum(terms, col, row)) return true
  }
  return false
}

/** The entries of one triangle, counted before. */
function sideOf({ rows, cols, values }: Terms, isUpper: boolean, count: number): Terms {
  const side = { rows: new Uint32Array(count), cols: new Uint32Array(count), values: new Float64Array(count) }
  for (let k = 0, place = 0; k < values.length; k++) {
    if (values[k] === 0 || rows[k] === cols[k] || rows[k]! < cols[k]! !== isUpper) continue
    side.rows[place] = rows[k]!
    side.cols[place] = cols[k]!
    side.values[place++] = values[k]!
  }
  return side
}

/** Where the nonzero entries off the diagonal stand, and whether the two triangles mirror each other. */
export function triangleOf(n: number, terms: Terms): Triangle {
  const { upper, lower } = countsOf(terms)
  if (upper === 0) return lower === 0 ? 'diagonal only' : 'lower'
  if (lower === 0) return 'upper'
  if (isPlainlyUneven(terms)) return 'both'
  const above = buildProblem(n, sideOf(terms, true, upper), 0).problem
  const below = buildProblem(n, sideOf(terms, false, lower), 0).problem
  const isMirrored =
    above.values.length === below.values.length &&
    above.values.every(
      (value, k) => value === below.values[k] && above.rows[k] === below.rows[k] && above.cols[k] === below.cols[k],
    )
  return isMirrored ? 'symmetric' : 'both'
}
