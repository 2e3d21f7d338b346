/**
 * Sparse matrix of SciPy (`.npz`, as `scipy.sparse.save_npz` writes it): a ZIP archive of NumPy arrays, compressed or
 * not, of the kinds csr, csc and coo. The matrix stands for zᵀQz as a dense one does; elements given twice are summed.
 *
 * SciPy passes over entries it does not know, so that the file can carry what the matrix lacks: `form`, `sense`,
 * `convention` (words), `offset` (one number) and `labels` (one text a variable). Without labels the variables are
 * 0 … n − 1.
 */
import { negateProblem } from '../problem/negate'
import { isZip, readZip, writeZip } from './archive'
import { assembleReading } from './assemble'
import { collected } from './chunks'
import { countedLabels, isCounted } from './counted'
import { readDirective, type Directives } from './directives'
import { ReadingFault, type ProblemDocument, type ProblemFormat, type ProblemReading, type ReadOptions } from './format'
import { checkLabels, labelClashes, labelFault } from './labels'
import { readNpyArray, writeDoubles, writeIntegers, writeTexts, writeWord, type NpyArray } from './npy-array'
import { Rejections } from './rejections'
import { repeatedElements, sparseElements } from './sparse-arrays'

const ID = 'npz'
const SUFFIX = '.npy'
const MATRIX = ['format', 'shape', 'data', 'indices', 'indptr', 'row', 'col', 'coords']
const WORDS = ['form', 'sense', 'convention'] as const
const WANTED = new Set([...MATRIX, ...WORDS, 'offset', 'labels'].map((name) => name + SUFFIX))
const LIMITS = { labelBytes: 256 * 2 ** 20 }

function arraysOf(bytes: Uint8Array): Map<string, NpyArray> {
  const arrays = new Map<string, NpyArray>()
  for (const [entry, contents] of readZip(bytes, (name) => WANTED.has(name))) {
    const name = entry.slice(0, -SUFFIX.length)
    arrays.set(name, readNpyArray(name, contents))
  }
  return arrays
}

function directivesOf(arrays: ReadonlyMap<string, NpyArray>): Directives {
  const directives: Directives = {}
  for (const key of WORDS) {
    const [word, ...others] = arrays.get(key)?.texts() ?? []
    const fault =
      others.length > 0 ? `${key} is more than one word` : word && readDirective(`${key}: ${word}`, directives)
    if (fault) throw new ReadingFault(`the archive: ${fault}`)
  }
  const offset = arrays.get('offset')
  if (!offset) return directives
  if (offset.count !== 1) throw new ReadingFault('offset in the archive is not one number')
  return { ...directives, offset: offset.coefficients()[0]! + 0 }
}

/** @throws ReadingFault for a label that is none, or two of one variable */
function labelsOf(array: NpyArray | undefined, n: number): string[] {
  if (!array) return countedLabels(n)
  if (array.count !== n) throw new ReadingFault(`the archive has ${array.count} labels for ${n} variables`)
  const labels = array.texts()
  labels.forEach((label, k) => {
    const fault = labelFault(label)
    if (fault) throw new ReadingFault(`labels[${k}]: ${fault}`)
  })
  const clash = labelClashes(labels, [...labels.keys()], 'variable')[0]
  if (clash) throw new ReadingFault(clash.message)
  return labels
}

function read(chunks: Iterable<Uint8Array>, options: ReadOptions): ProblemReading {
  const arrays = arraysOf(collected(chunks))
  const { n, ...terms } = sparseElements(arrays)
  const labels = labelsOf(arrays.get('labels'), n)
  const gathered = { format: ID, labels, ...terms, isMatrix: true, directives: directivesOf(arrays) }
  const reading = assembleReading({ ...gathered, header: null, rejections: new Rejections(), issues: [] }, options)
  return { ...reading, duplicatesSummed: repeatedElements(n, terms) }
}

function checkLabelBytes(labels: readonly string[]): void {
  const longest = labels.reduce((length, label) => Math.max(length, label.length), 0)
  if (4 * longest * labels.length > LIMITS.labelBytes)
    throw new RangeError('the labels are too long for a .npz file, which gives each the room of the longest')
}

/** Writes the upper triangle in coordinates, linear coefficients on the diagonal. */
function write({ form, labels, problem, sense }: ProblemDocument): Uint8Array {
  checkLabelBytes(labels)
  checkLabels(labels, problem.n)
  const isMax = sense === 'max'
  const { n, linear, rows, cols, values, offset } = negateProblem(problem, { coefficients: isMax, offset: isMax })
  const diagonal = Array.from(linear.keys()).filter((i) => linear[i] !== 0)
  const arrays = new Map([
    ['row', writeIntegers([...diagonal, ...rows])],
    ['col', writeIntegers([...diagonal, ...cols])],
    ['format', writeWord('coo')],
    ['shape', writeIntegers([n, n])],
    ['data', writeDoubles(Float64Array.from([...diagonal.map((i) => linear[i]!), ...values]))],
    ['form', writeTexts([form], [])],
    ['sense', writeTexts([sense], [])],
    ['offset', writeDoubles(Float64Array.of(offset), [])],
  ])
  if (!isCounted(labels)) arrays.set('labels', writeTexts(labels))
  return writeZip(new Map([...arrays].map(([name, bytes]) => [name + SUFFIX, bytes])))
}

export const npz: ProblemFormat = {
  id: ID,
  title: 'SciPy sparse matrix (.npz)',
  extensions: ['npz'],
  mediaType: 'application/octet-stream',
  sniff: (head) => (isZip(head) ? 1 : 0),
  read,
  write,
}
