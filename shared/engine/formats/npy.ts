/**
 * NumPy array file (`.npy`, NumPy Enhancement Proposal 1): a square matrix of numbers, read by the rule of the dense
 * matrix: it stands for zᵀQz, the coefficient of a pair is Q_ij + Q_ji. All floats of 2, 4 and 8 bytes, integers of 1 to
 * 8 bytes and booleans, either order of bytes, C and Fortran order. The file has no place for anything else: variables
 * are 0 … n − 1, the offset is 0.
 */
import { assembleReading } from './assemble'
import { ByteSource } from './byte-source'
import { countedLabels, isCounted } from './counted'
import { Entries } from './entries'
import { ReadingFault, type ProblemDocument, type ProblemFormat, type ProblemReading, type ReadOptions } from './format'

import { writeDoubles } from './npy-array'
import { isNpy, readNpyHeader } from './npy-header'
import { elementFault, elementReader, elementType, isCoefficient } from './npy-types'
import { Rejections } from './rejections'

const ID = 'npy'
const DEFAULTS = { maxVariables: 5000 }

/** The side of a square matrix. @throws ReadingFault for every other shape */
function sideOf(shape: readonly number[]): number {
  const [rows, cols] = shape
  if (shape.length !== 2 || rows !== cols || rows === undefined) {
    const stated = shape.length === 1 ? `${rows},` : shape.slice(0, 8).join(', ')
    throw new ReadingFault(`the array has the shape (${stated}); a square matrix is needed`)
  }
  if (rows === 0) throw new ReadingFault('the array is empty: there are no variables')
  if (rows > DEFAULTS.maxVariables)
    throw new ReadingFault(
      `a dense matrix has at most ${DEFAULTS.maxVariables} variables, not ${rows}: use scipy.sparse.save_npz`,
    )
  return rows
}

/** The nonzero elements, a line of the array at a time. */
function gather(source: ByteSource): { n: number; entries: Entries } {
  const { descr, fortranOrder, shape } = readNpyHeader(source)
  const type = elementType(descr)
  const read = elementReader(type)
  const n = sideOf(shape)
  const entries = new Entries()
  for (let outer = 0; outer < n; outer++) {
    const bytes = source.take(n * type.size)
    const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
    for (let inner = 0; inner < n; inner++) {
      const value = read(view, inner * type.size)
      if (value === 0) continue
      const [row, col] = fortranOrder ? [inner, outer] : [outer, inner]
      if (!isCoefficient(value))
        throw new ReadingFault(`element [${row}, ${col}]: ${elementFault(type, view, inner * type.size, value)}`)
      entries.add(row, col, value)
    }
  }
  if (source.hasMore()) throw new ReadingFault('more bytes follow the array: save one array alone')
  return { n, entries }
}

function read(chunks: Iterable<Uint8Array>, options: ReadOptions): ProblemReading {
  const { n, entries } = gather(new ByteSource(chunks))
  const gathered = { format: ID, labels: countedLabels(n), ...entries.terms(), isMatrix: true, directives: {} }
  return assembleReading({ ...gathered, header: null, rejections: new Rejections(), issues: [] }, options)
}

/** What of the problem the file could not tell, in words; empty when it can tell all. */
function untold({ form, labels, problem, sense }: ProblemDocument): string[] {
  const missing: string[] = []
  if (form !== 'qubo') missing.push('the Ising form')
  if (sense !== 'min') missing.push('that it is maximised')
  if (problem.offset !== 0) missing.push(`the offset ${problem.offset}`)
  if (!isCounted(labels)) missing.push('the labels')
  return missing
}

/** Writes the upper triangle. */
function write(document: ProblemDocument): Uint8Array {
  const { n, linear, rows, cols, values } = document.problem
  const missing = untold(document)
  if (missing.length > 0)
    throw new RangeError(`a .npy file holds a matrix alone and would lose ${missing.join(', ')}: take .npz`)
  if (n > DEFAULTS.maxVariables)
    throw new RangeError(`a dense matrix has at most ${DEFAULTS.maxVariables} variables, not ${n}: take .npz`)
  const matrix = new Float64Array(n * n)
  for (let i = 0; i < n; i++) matrix[i * n + i] = linear[i]!
  for (let k = 0; k < values.length; k++) matrix[rows[k]! * n + cols[k]!] = values[k]!
  return writeDoubles(matrix, [n, n])
}

export const npy: ProblemFormat = {
  id: ID,
  title: 'NumPy array (.npy)',
  extensions: ['npy'],
  mediaType: 'application/octet-stream',
  sniff: (head) => (isNpy(head) ? 1 : 0),
  read,
  write,
}
