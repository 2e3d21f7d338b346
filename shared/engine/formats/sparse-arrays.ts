/** The arrays of SciPy's sparse matrices as elements: compressed by row (csr), by column (csc), or in coordinates (coo). */
import type { Terms } from '../problem/build'
import { ReadingFault } from './format'
import { MAX_STATED_VARIABLES } from './counted'
import type { NpyArray } from './npy-array'

/** Elements of a square matrix of n rows. */
export interface SparseElements extends Terms {
  readonly n: number
  readonly rows: Uint32Array
  readonly cols: Uint32Array
  readonly values: Float64Array
}

type Arrays = ReadonlyMap<string, NpyArray>

function needed(arrays: Arrays, name: string): NpyArray {
  const array = arrays.get(name)
  if (!array) throw new ReadingFault(`the archive has no entry "${name}", which a SciPy sparse matrix has`)
  return array
}

/** The number of rows. @throws ReadingFault unless the matrix is square and not too large */
function sideOf(shape: NpyArray): number {
  const lengths = shape.indices(2 ** 32)
  const [rows, cols] = lengths
  if (lengths.length !== 2 || rows !== cols)
    throw new ReadingFault(`the matrix has the shape (${lengths.slice(0, 8).join(', ')}); a square one is needed`)
  if (rows === 0) throw new ReadingFault('the matrix is empty: there are no variables')
  if (rows! > MAX_STATED_VARIABLES)
    throw new ReadingFault(`the matrix has ${rows} rows; at most ${MAX_STATED_VARIABLES} variables are taken`)
  return rows!
}

function sameLength(...arrays: readonly NpyArray[]): void {
  const [first, ...others] = arrays
  const odd = others.find(({ count }) => count !== first!.count)
  if (odd)
    throw new ReadingFault(
      `the archive has ${first!.count} elements in ${first!.name}, but ${odd.count} in ${odd.name}`,
    )
}

/** The line of each element, from where the lines begin among the elements. */
function spread(starts: Uint32Array): Uint32Array {
  const lines = new Uint32Array(starts.at(-1)!)
  for (let line = 0; line + 1 < starts.length; line++) {
    if (starts[line + 1]! < starts[line]!)
      throw new ReadingFault(`indptr[${line + 1}] is ${starts[line + 1]}, below indptr[${line}], ${starts[line]}`)
    lines.fill(line, starts[line], starts[line + 1])
  }
  return lines
}

function compressed(arrays: Arrays, n: number, values: Float64Array): { lines: Uint32Array; places: Uint32Array } {
  const indices = needed(arrays, 'indices')
  sameLength(needed(arrays, 'data'), indices)
  const starts = needed(arrays, 'indptr').indices(values.length + 1)
  if (starts.length !== n + 1 || starts[0] !== 0)
    throw new ReadingFault(`indptr has ${starts.length} elements from ${starts[0]}, expected ${n + 1} from 0`)
  const lines = spread(starts)
  return { lines, places: indices.indices(n).subarray(0, lines.length) }
}

/**
 * The elements of the matrix that the arrays hold.
 * @throws ReadingFault when they hold none that is square, or contradict each other
 */
export function sparseElements(arrays: Arrays): SparseElements {
  const kind = needed(arrays, 'format').texts().join()
  if (!['csr', 'csc', 'coo'].includes(kind))
    throw new ReadingFault(
      `the matrix is of the kind "${kind.slice(0, 20)}"; save it after .tocsr(), .tocsc() or .tocoo()`,
    )
  if (arrays.has('coords')) throw new ReadingFault('the array has other than two dimensions; a square matrix is needed')
  const n = sideOf(needed(arrays, 'shape'))
  const values = needed(arrays, 'data').coefficients()
  if (kind === 'coo') {
    const [row, col] = [needed(arrays, 'row'), needed(arrays, 'col')]
    sameLength(needed(arrays, 'data'), row, col)
    return { n, rows: row.indices(n), cols: col.indices(n), values }
  }
  const { lines, places } = compressed(arrays, n, values)
  const [rows, cols] = kind === 'csr' ? [lines, places] : [places, lines]
  return { n, rows, cols, values: values.subarray(0, lines.length) }
}

/** How many elements stand where an earlier one stands. O(n + elements). */
export function repeatedElements(n: number, { rows, cols }: Omit<SparseElements, 'n' | 'values'>): number {
  const next = new Uint32Array(n + 1)
  for (let k = 0; k < rows.length; k++) next[rows[k]! + 1]!++
  for (let row = 0; row < n; row++) next[row + 1]! += next[row]!
  const byRow = new Uint32Array(rows.length)
  for (let k = 0; k < rows.length; k++) byRow[next[rows[k]!]!++] = k
  const lastRow = new Uint32Array(n)
  let repeated = 0
  for (const k of byRow) {
    if (lastRow[cols[k]!] === rows[k]! + 1) repeated++
    lastRow[cols[k]!] = rows[k]! + 1
  }
  return repeated
}
