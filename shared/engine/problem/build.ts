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

/** Terms whose indices are known to be whole numbers of at least 0. */
interface TypedTerms {
  readonly rows: Uint32Array
  readonly cols: Uint32Array
  readonly values: Float64Array
}

function typedIndices(indices: ArrayLike<number>, n: number): Uint32Array {
  if (indices instanceof Uint32Array) return indices
  for (let k = 0; k < indices.length; k++)
    if (!Number.isInteger(indices[k]) || indices[k]! < 0)
      throw new RangeError(`term ${k} names the variable ${indices[k]}, outside 0 … ${n - 1}`)
  return new Uint32Array(indices)
}

function checkedTerms(n: number, terms: Terms): TypedTerms {
  if (!Number.isInteger(n) || n < 0 || n > MAX_VARIABLES)
    throw new RangeError(`a problem has 0 … ${MAX_VARIABLES} variables, not ${n}`)
  if (terms.rows.length !== terms.values.length || terms.cols.length !== terms.values.length)
    throw new RangeError(
      `terms differ in length: ${terms.rows.length} rows, ${terms.cols.length} columns, ${terms.values.length} values`,
    )
  const rows = typedIndices(terms.rows, n)
  const cols = typedIndices(terms.cols, n)
  const values = terms.values instanceof Float64Array ? terms.values : new Float64Array(terms.values)
  for (let k = 0; k < values.length; k++) {
    if (rows[k]! >= n || cols[k]! >= n)
      throw new RangeError(`term ${k} joins ${rows[k]} and ${cols[k]}, outside 0 … ${n - 1}`)
    if (!Number.isFinite(values[k])) throw new RangeError(`term ${k} has the value ${values[k]}, which is not finite`)
  }
  return { rows, cols, values }
}

/**
 * Terms one behind the other, 16 bytes each: row and column in `indices`, then the value. Sorting scatters its writes, and
 * one place in memory a term costs half of what three do.
 */
interface Records {
  /** indices[4 k] and indices[4 k + 1] are row and column of term k. */
  readonly indices: Uint32Array
  /** values[2 k + 1] is the value of term k. */
  readonly values: Float64Array
}

function emptyRecords(count: number): Records {
  const buffer = new ArrayBuffer(16 * count)
  return { indices: new Uint32Array(buffer), values: new Float64Array(buffer) }
}

/** Sums of counts: where the terms of each key begin once they are in order. */
function beginnings(counts: Uint32Array): Uint32Array {
  for (let v = 1; v < counts.length; v++) counts[v]! += counts[v - 1]!
  return counts
}

/** The terms with rows ≤ columns, in ascending order of columns by one stable counting pass. */
function uprightByCols({ rows, cols, values }: TypedTerms, n: number): Records {
  const count = values.length
  const counts = new Uint32Array(n + 1)
  for (let k = 0; k < count; k++) counts[Math.max(rows[k]!, cols[k]!) + 1]!++
  const next = beginnings(counts)
  const sorted = emptyRecords(count)
  for (let k = 0; k < count; k++) {
    const row = rows[k]!
    const col = cols[k]!
    const high = row < col ? col : row
    const place = next[high]!++
    sorted.indices[4 * place] = row < col ? row : col
    sorted.indices[4 * place + 1] = high
    sorted.values[2 * place + 1] = values[k]!
  }
  return sorted
}

/** The terms in ascending order of rows by one stable counting pass. */
function byRows({ indices, values }: Records, n: number): Records {
  const counts = new Uint32Array(n + 1)
  for (let p = 0; p < indices.length; p += 4) counts[indices[p]! + 1]!++
  const next = beginnings(counts)
  const sorted = emptyRecords(indices.length / 4)
  for (let p = 0; p < indices.length; p += 4) {
    const place = next[indices[p]!]!++
    sorted.indices[4 * place] = indices[p]!
    sorted.indices[4 * place + 1] = indices[p + 1]!
    sorted.values[2 * place + 1] = values[p / 2 + 1]!
  }
  return sorted
}

/** Whether no term points backwards and all are in order. */
function isSorted({ rows, cols }: TypedTerms): boolean {
  for (let k = 0; k < rows.length; k++) {
    if (rows[k]! > cols[k]!) return false
    if (k > 0 && (rows[k]! < rows[k - 1]! || (rows[k] === rows[k - 1] && cols[k]! < cols[k - 1]!))) return false
  }
  return true
}

function recordsOf({ rows, cols, values }: TypedTerms): Records {
  const records = emptyRecords(values.length)
  for (let k = 0; k < values.length; k++) {
    records.indices[4 * k] = rows[k]!
    records.indices[4 * k + 1] = cols[k]!
    records.values[2 * k + 1] = values[k]!
  }
  return records
}

/**
 * Builds a problem of n variables from terms in any order and direction: a diagonal term is linear, terms of one
 * variable or pair are summed exactly and rounded once, pairs that come to zero are left out. O(n + terms).
 * @throws RangeError for an index outside 0 … n − 1, lengths that differ, or a value or sum that is not finite
 */
export function buildProblem(n: number, terms: Terms, offset: number): BuiltProblem {
  const checked = checkedTerms(n, terms)
  if (!Number.isFinite(offset)) throw new RangeError(`the offset ${offset} is not finite`)
  const sorted = isSorted(checked) ? recordsOf(checked) : byRows(uprightByCols(checked, n), n)
  return mergeRuns(n, sorted, offset)
}

/** Sums each run of equal pairs of sorted terms. */
function mergeRuns(n: number, { indices, values: terms }: Records, offset: number): BuiltProblem {
  const count = indices.length / 4
  const linear = new Float64Array(n)
  const rows = new Uint32Array(count)
  const cols = new Uint32Array(count)
  const values = new Float64Array(count)
  const sum = new ExactSum()
  let kept = 0
  let distinct = 0
  let zerosDropped = 0
  for (let p = 0; p < count; distinct++) {
    const row = indices[4 * p]!
    const col = indices[4 * p + 1]!
    let value = terms[2 * p++ + 1]! + 0
    if (p < count && indices[4 * p] === row && indices[4 * p + 1] === col) {
      sum.reset()
      sum.add(value)
      while (p < count && indices[4 * p] === row && indices[4 * p + 1] === col) sum.add(terms[2 * p++ + 1]!)
      value = sum.value()
    }
    if (!Number.isFinite(value)) throw new RangeError(`the terms of ${row} and ${col} sum beyond the range of doubles`)
    if (row === col) linear[row] = value
    else if (value === 0) zerosDropped++
    else {
      rows[kept] = row
      cols[kept] = col
      values[kept++] = value
    }
  }
  const pairs =
    kept === count
      ? { rows, cols, values }
      : { rows: rows.slice(0, kept), cols: cols.slice(0, kept), values: values.slice(0, kept) }
  return { problem: { n, linear, ...pairs, offset: offset + 0 }, duplicatesSummed: count - distinct, zerosDropped }
}
