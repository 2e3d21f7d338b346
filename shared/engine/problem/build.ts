import { ExactSum } from './exact-sum'
import type { Problem } from './problem'

/** Pair keys stay exact integers, and graphs of problems stay buildable, up to this many variables. */
export const MAX_VARIABLES = 2 ** 26

/** Coefficients as they come: term k is values[k]·z_{rows[k]}·z_{cols[k]}; rows[k] = cols[k] is a linear term. */
export interface Terms {
  readonly rows: ArrayLike<number>
  readonly cols: ArrayLike<number>
  readonly values: ArrayLike<number>
}

/** A problem and what happened on the way to it. */
export interface BuiltProblem {
  readonly problem: Problem
  /** Terms beyond the first of each variable or pair, direction disregarded. */
  readonly duplicatesSummed: number
  /** Pairs left out because their (summed) value is zero. Linear zeros need no dropping. */
  readonly zerosDropped: number
}

function checkTerms(n: number, terms: Terms): void {
  const { rows, cols, values } = terms
  if (!Number.isInteger(n) || n < 0 || n > MAX_VARIABLES)
    throw new RangeError(`a problem has 0 … ${MAX_VARIABLES} variables, not ${n}`)
  if (rows.length !== values.length || cols.length !== values.length)
    throw new RangeError(`terms differ in length: ${rows.length} rows, ${cols.length} columns, ${values.length} values`)
  for (let k = 0; k < values.length; k++) {
    const row = rows[k]!
    const col = cols[k]!
    if (!Number.isInteger(row) || !Number.isInteger(col) || row < 0 || col < 0 || row >= n || col >= n)
      throw new RangeError(`term ${k} joins ${row} and ${col}, outside 0 … ${n - 1}`)
    if (!Number.isFinite(values[k])) throw new RangeError(`term ${k} has the value ${values[k]}, which is not finite`)
  }
}

/** One stable counting pass: `order` rearranged by ascending key. */
function sortedBy(order: Uint32Array, keys: Uint32Array, n: number): Uint32Array {
  const next = new Uint32Array(n + 1)
  for (let k = 0; k < keys.length; k++) next[keys[k]! + 1]!++
  for (let v = 0; v < n; v++) next[v + 1]! += next[v]!
  const sorted = new Uint32Array(order.length)
  for (let p = 0; p < order.length; p++) sorted[next[keys[order[p]!]!]!++] = order[p]!
  return sorted
}

/**
 * Builds a problem of n variables from terms in any order and direction: a diagonal term is linear, terms of one
 * variable or pair are summed exactly and rounded once, pairs that come to zero are left out. O(n + terms).
 * @throws RangeError for an index outside 0 … n − 1, lengths that differ, or a value or sum that is not finite
 */
export function buildProblem(n: number, terms: Terms, offset: number): BuiltProblem {
  checkTerms(n, terms)
  if (!Number.isFinite(offset)) throw new RangeError(`the offset ${offset} is not finite`)
  const count = terms.values.length
  // Copies in typed arrays: the passes below are several times faster on them than on what the caller brings.
  const low = Uint32Array.from(terms.rows)
  const high = Uint32Array.from(terms.cols)
  const order = new Uint32Array(count)
  for (let k = 0; k < count; k++) {
    order[k] = k
    if (low[k]! <= high[k]!) continue
    const row = low[k]!
    low[k] = high[k]!
    high[k] = row
  }
  const sorted = sortedBy(sortedBy(order, high, n), low, n)
  return mergeRuns(n, low, high, Float64Array.from(terms.values), sorted, offset)
}

/** Sums each run of equal pairs in sorted order. */
function mergeRuns(
  n: number,
  low: Uint32Array,
  high: Uint32Array,
  values: Float64Array,
  order: Uint32Array,
  offset: number,
): BuiltProblem {
  const count = order.length
  const linear = new Float64Array(n)
  const rows = new Uint32Array(count)
  const cols = new Uint32Array(count)
  const summed = new Float64Array(count)
  const sum = new ExactSum()
  let kept = 0
  let distinct = 0
  let zerosDropped = 0
  for (let p = 0; p < count; distinct++) {
    const row = low[order[p]!]!
    const col = high[order[p]!]!
    let value = values[order[p++]!]! + 0
    if (p < count && low[order[p]!] === row && high[order[p]!] === col) {
      sum.reset()
      sum.add(value)
      while (p < count && low[order[p]!] === row && high[order[p]!] === col) sum.add(values[order[p++]!]!)
      value = sum.value()
    }
    if (!Number.isFinite(value)) throw new RangeError(`the terms of ${row} and ${col} sum beyond the range of doubles`)
    if (row === col) linear[row] = value
    else if (value === 0) zerosDropped++
    else {
      rows[kept] = row
      cols[kept] = col
      summed[kept++] = value
    }
  }
  const problem = {
    n,
    linear,
    rows: rows.slice(0, kept),
    cols: cols.slice(0, kept),
    values: summed.slice(0, kept),
    offset: offset + 0,
  }
  return { problem, duplicatesSummed: count - distinct, zerosDropped }
}
