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

/** Buckets of one pass: so few that the places written to stay in the caches. */
const MOST_DIGIT_BITS = 11

/** One stable counting pass over some bits of the rows (`part` 0) or the columns (1). */
function scatter(from: Records, to: Records, part: 0 | 1, shift: number, bits: number): void {
  const { indices, values } = from
  const mask = 2 ** bits - 1
  const next = new Uint32Array(mask + 2)
  for (let p = part; p < indices.length; p += 4) next[((indices[p]! >>> shift) & mask) + 1]!++
  for (let digit = 1; digit <= mask; digit++) next[digit]! += next[digit - 1]!
  for (let p = 0; p < indices.length; p += 4) {
    const place = next[(indices[p + part]! >>> shift) & mask]!++
    to.indices[4 * place] = indices[p]!
    to.indices[4 * place + 1] = indices[p + 1]!
    to.values[2 * place + 1] = values[(p >> 1) + 1]!
  }
}

/** The records in ascending order of rows, then columns, stable: radix sort from the last digit, over memory of both. */
function sorted(records: Records, n: number): Records {
  const bits = Math.max(1, 32 - Math.clz32(n - 1))
  const passes = Math.ceil(bits / MOST_DIGIT_BITS)
  const width = Math.ceil(bits / passes)
  let from = records
  let to = emptyRecords(records.indices.length / 4)
  for (const part of [1, 0] as const)
    for (let pass = 0; pass < passes; pass++) {
      scatter(from, to, part, pass * width, width)
      const filled = to
      to = from
      from = filled
    }
  return from
}

/** Whether the records are in order. */
function isSorted({ indices }: Records): boolean {
  for (let p = 4; p < indices.length; p += 4)
    if (indices[p]! < indices[p - 4]! || (indices[p] === indices[p - 4] && indices[p + 1]! < indices[p - 3]!))
      return false
  return true
}

/** The terms as records with rows ≤ columns. */
function recordsOf({ rows, cols, values }: TypedTerms): Records {
  const records = emptyRecords(values.length)
  for (let k = 0; k < values.length; k++) {
    const row = rows[k]!
    const col = cols[k]!
    records.indices[4 * k] = row < col ? row : col
    records.indices[4 * k + 1] = row < col ? col : row
    records.values[2 * k + 1] = values[k]!
  }
  return records
}

/** How many pairs have terms, of records in order. */
function countPairs({ indices }: Records): number {
  let count = 0
  for (let p = 0; p < indices.length; p += 4)
    if (
      indices[p] !== indices[p + 1] &&
      (p === 0 || indices[p] !== indices[p - 4] || indices[p + 1] !== indices[p - 3])
    )
      count++
  return count
}

/**
 * Builds a problem of n variables from terms in any order and direction: a diagonal term is linear, terms of one
 * variable or pair are summed exactly and rounded once, pairs that come to zero are left out. O(n + terms).
 * @throws RangeError for an index outside 0 … n − 1, lengths that differ, or a value or sum that is not finite
 */
export function buildProblem(n: number, terms: Terms, offset: number): BuiltProblem {
  const checked = checkedTerms(n, terms)
  if (!Number.isFinite(offset)) throw new RangeError(`the offset ${offset} is not finite`)
  const records = recordsOf(checked)
  return mergeRuns(n, isSorted(records) ? records : sorted(records, n), offset)
}

/** Sums each run of equal pairs of sorted terms. */
function mergeRuns(n: number, records: Records, offset: number): BuiltProblem {
  const { indices, values: terms } = records
  const count = indices.length / 4
  const linear = new Float64Array(n)
  const pairs = countPairs(records)
  const rows = new Uint32Array(pairs)
  const cols = new Uint32Array(pairs)
  const values = new Float64Array(pairs)
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
  const interactions =
    kept === pairs
      ? { rows, cols, values }
      : { rows: rows.slice(0, kept), cols: cols.slice(0, kept), values: values.slice(0, kept) }
  return {
    problem: { n, linear, ...interactions, offset: offset + 0 },
    duplicatesSummed: count - distinct,
    zerosDropped,
  }
}
