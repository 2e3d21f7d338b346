/**
 * Matrix Market exchange format (R. F. Boisvert, R. Pozo & K. A. Remington, The Matrix Market exchange formats: initial
 * design, NISTIR 5935, 1996): coordinate and array layouts of real or integer values, general or symmetric.
 *
 * The matrix stands for zᵀQz as in a dense matrix: the diagonal is linear and the coefficient of a pair is Q_ij + Q_ji. A
 * symmetric file holds one triangle for both, so that an entry off its diagonal counts twice. Rows and columns count from 1
 * and so do the labels, unless comments name the variables; comments may carry directives (see `directives.ts`).
 */
import { buildProblem } from '../problem/build'
import { negateProblem } from '../problem/negate'
import { assembleReading, firstRowsOf } from './assemble'
import { MAX_STATED_VARIABLES } from './counted'
import { writeDirectives } from './directives'
import type { ProblemDocument, ProblemFormat, ProblemReading, ReadOptions } from './format'
import { checkLabels, labelClashes, labelFault } from './labels'
import { isBanner } from './matrix-market-header'
import { MatrixMarketReader } from './matrix-market-reader'
import { writeNames } from './numbered-names'
import { formatNumber } from './numbers'
import { bytesOf, holdsText, textOf } from './text'

const ID = 'matrix-market'
const BANNER = '%%MatrixMarket matrix coordinate real general'

/** Entries beyond the first of a cell: rows and columns are told apart as the two sides of a bipartite graph. */
function duplicateCells(n: number, rows: Uint32Array, cols: Uint32Array, values: Float64Array): number {
  return buildProblem(2 * n, { rows, cols: cols.map((col) => n + col), values }, 0).duplicatesSummed
}

/** What a symmetric file states: each entry off the diagonal half of what it stands for. */
function statedRows(labels: string[], { entries, kind }: MatrixMarketReader): [string, string, number][] {
  const isHalved = kind?.symmetry === 'symmetric'
  return firstRowsOf({ labels, ...entries.terms() }).map(([a, b, value]) => [
    a,
    b,
    isHalved && a !== b ? value / 2 : value,
  ])
}

/** Reads a Matrix Market file; see the head of this file. */
function read(chunks: Iterable<Uint8Array>, options: ReadOptions): ProblemReading {
  const reader = new MatrixMarketReader()
  reader.read(chunks)
  const { directives, rejections, issues, kind, sizeLine } = reader
  const n = reader.size?.n ?? 0
  const { labels, lines } = reader.names.labels(n, sizeLine)
  if (reader.names.count > 0) {
    labels.forEach((label, i) => {
      const fault = labelFault(label)
      if (fault) issues.push({ line: lines[i]!, message: `variable ${i + 1}: ${fault}` })
    })
    issues.push(...labelClashes(labels, lines))
  }
  const terms = reader.entries.terms()
  const known = {
    duplicatesSummed: kind?.layout === 'coordinate' ? duplicateCells(n, terms.rows, terms.cols, terms.values) : 0,
    firstRows: statedRows(labels, reader),
    ...(kind?.symmetry === 'symmetric' && { triangle: 'symmetric' as const }),
  }
  return assembleReading(
    { format: ID, labels, ...terms, isMatrix: true, directives, header: null, rejections, issues, known },
    options,
  )
}

/** Writes the upper triangle as coordinates; zeros are not written, and every variable is there by the size alone. */
function write({ form, labels, problem, sense }: ProblemDocument): Uint8Array {
  checkLabels(labels, problem.n)
  if (problem.n > MAX_STATED_VARIABLES)
    throw new RangeError(`a Matrix Market file has at most ${MAX_STATED_VARIABLES} variables here, not ${problem.n}`)
  if (problem.n === 0) throw new RangeError('a Matrix Market file needs at least one variable')
  const isMax = sense === 'max'
  const { n, linear, rows, cols, values, offset } = negateProblem(problem, { coefficients: isMax, offset: isMax })
  const said = writeDirectives({ form, sense, offset }).map((line) => line.replace('#', '%'))
  const entries: string[] = []
  for (let i = 0; i < n; i++) if (linear[i] !== 0) entries.push(`${i + 1} ${i + 1} ${formatNumber(linear[i]!)}`)
  for (let k = 0; k < values.length; k++) entries.push(`${rows[k]! + 1} ${cols[k]! + 1} ${formatNumber(values[k]!)}`)
  const names = writeNames(labels).map((line) => `% ${line}`)
  return bytesOf([BANNER, ...said, ...names, `${n} ${n} ${entries.length}`, ...entries, ''].join('\n'))
}

export const matrixMarket: ProblemFormat = {
  id: ID,
  title: 'Matrix Market',
  extensions: ['mtx'],
  mediaType: 'text/plain',
  sniff: (head) => (holdsText(head) && isBanner(textOf(head.subarray(0, 64)).replace(/^\uFEFF/, '')) ? 1 : 0),
  read,
  write,
}
