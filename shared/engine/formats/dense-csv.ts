/**
 * Dense square matrix: one row a line, cells separated by semicolons, commas, tabs or white space; optionally a row
 * and/or a column of labels; `#` comments and directives as in the coefficient list.
 *
 * The matrix stands for zᵀQz: the diagonal is linear (a_i or h_i), and the coefficient of a pair is Q_ij + Q_ji in
 * both forms, so an upper, a lower and a symmetric matrix are all read by the same rule. Without labels the variables
 * are 0 … n − 1. Every row must be readable: a matrix with a hole has no meaning.
 */
import { negateProblem } from '../problem/negate'
import { assembleReading } from './assemble'
import { writeDirectives } from './directives'
import type { ProblemDocument, ProblemFormat, ProblemReading, ReadingIssue, ReadOptions } from './format'
import { checkLabels, labelClashes, labelFault, quoteLabel } from './labels'
import { MatrixRows, type MatrixRow } from './matrix-rows'
import { LABEL_CORNER, shapeOf, type MatrixShape } from './matrix-shape'
import { formatNumber, isDecimal } from './numbers'
import { bytesOf, holdsText } from './text'

const ID = 'dense-csv'
const DEFAULTS = { maxVariables: 5000 }

/** Sorts out labels and numbers once the shape is known. */
class MatrixReader {
  readonly issues: ReadingIssue[] = []
  labels: string[]
  header: ProblemReading['header'] = null
  private readonly body: readonly MatrixRow[]
  private labelLines: number[]

  constructor(
    private readonly table: MatrixRows,
    private readonly shape: MatrixShape,
  ) {
    this.labels = Array.from({ length: shape.n }, (_, i) => String(i))
    this.body = shape.hasHeader ? table.rows.slice(1) : table.rows
    this.labelLines = this.body.map((row) => row.line)
  }

  read(): void {
    if (this.shape.hasHeader) this.readHeader()
    this.body.forEach((row, index) => this.readRow(row, index))
    this.labels.forEach((label, i) => {
      const fault = labelFault(label)
      if (fault) this.issues.push({ line: this.labelLines[i]!, message: `variable ${i + 1}: ${fault}` })
    })
    this.issues.push(...labelClashes(this.labels, this.labelLines))
  }

  private readHeader(): void {
    const { firstRow: cells, rows } = this.table
    const { line, text } = rows[0]!
    this.labels = cells.length > this.shape.n ? cells.slice(1) : cells
    this.labelLines = this.labels.map(() => line)
    this.header = { line, text: text.trim() }
  }

  private readRow(row: MatrixRow, index: number): void {
    const { n, hasLabelColumn } = this.shape
    const expected = n + (hasLabelColumn ? 1 : 0)
    if (row.width !== expected) {
      const message = `the matrix is not square: line ${row.line} has ${row.width} cells, expected ${expected}`
      this.issues.push({ line: row.line, message })
      return
    }
    if (hasLabelColumn) this.readLabel(row, index)
    const skipped = hasLabelColumn ? 1 : 0
    if (!hasLabelColumn && row.firstFault) this.reject(row, `cell 1: ${row.firstFault}`)
    else if (row.fault) this.reject(row, `cell ${row.fault.cell + 1 - skipped}: ${row.fault.reason}`)
  }

  private readLabel({ first, line }: MatrixRow, index: number): void {
    if (!this.shape.hasHeader) this.labels[index] = first
    else if (this.labels[index] !== first) {
      const message = `row "${first}" (line ${line}) stands where the columns have "${this.labels[index]}"`
      this.issues.push({ line, message })
    }
  }

  private reject({ line, text }: MatrixRow, reason: string): void {
    const { rejections } = this.table
    if (rejections.count === 0) this.issues.push({ line, message: `the matrix is incomplete: line ${line}, ${reason}` })
    const end = text.trimEnd().length
    rejections.add(text, text.length - text.trimStart().length, end, line, reason)
  }

  /** The cells by variable: numbers among the labels are none. */
  terms(): ReturnType<MatrixRows['entries']['terms']> {
    const { rows, cols, values } = this.table.entries.terms()
    const top = this.shape.hasHeader ? 1 : 0
    const left = this.shape.hasLabelColumn ? 1 : 0
    let count = 0
    for (let k = 0; k < values.length; k++) {
      if (rows[k]! < top || cols[k]! < left) continue
      rows[count] = rows[k]! - top
      cols[count] = cols[k]! - left
      values[count++] = values[k]!
    }
    return { rows: rows.subarray(0, count), cols: cols.subarray(0, count), values: values.subarray(0, count) }
  }
}

const NOTHING = { labels: [], rows: [], cols: [], values: [], header: null }

/** Reads a dense matrix; see the head of this file. */
function read(chunks: Iterable<Uint8Array>, options: ReadOptions): ProblemReading {
  const table = new MatrixRows(DEFAULTS.maxVariables)
  table.read(chunks)
  const { directives, rejections } = table
  const common = { format: ID, isMatrix: true, directives, rejections }
  const shape = table.issue ?? shapeOf(table.rows, table.firstRow)
  if ('message' in shape) return assembleReading({ ...common, ...NOTHING, issues: [shape] }, options)
  const reader = new MatrixReader(table, shape)
  reader.read()
  const { labels, header, issues } = reader
  // Rows of another width would put numbers outside the matrix.
  const terms = issues.length > 0 ? NOTHING : reader.terms()
  return assembleReading({ ...common, ...terms, labels, header, issues }, options)
}

/** Writes the upper triangle with a row and a column of labels. */
function writeText({ form, labels, problem, sense }: ProblemDocument): string {
  checkLabels(labels, problem.n)
  if (problem.n > DEFAULTS.maxVariables)
    throw new RangeError(`a dense matrix has at most ${DEFAULTS.maxVariables} variables, not ${problem.n}`)
  const isMax = sense === 'max'
  const { n, linear, rows, cols, values, offset } = negateProblem(problem, { coefficients: isMax, offset: isMax })
  const quoted = labels.map(quoteLabel)
  const lines = writeDirectives({ layout: 'matrix', form, sense, offset })
  lines.push([LABEL_CORNER, ...quoted].join(','))
  let k = 0
  for (let i = 0; i < n; i++) {
    const cells = new Array<string>(n).fill('0')
    cells[i] = formatNumber(linear[i]!)
    for (; k < values.length && rows[k] === i; k++) cells[cols[k]!] = formatNumber(values[k]!)
    lines.push([quoted[i], ...cells].join(','))
  }
  return `${lines.join('\n')}\n`
}

/** How sure the shapes of rows make it: three columns look more like a coefficient list, except under a corner. */
const CONFIDENCE = { corner: 0.9, regular: 0.7, threeColumns: 0.5, oneRow: 0.3 }

/** The share of rows of one width that hold numbers behind their first cell, weighed by what else they could be. */
function sniff(head: Uint8Array): number {
  if (!holdsText(head)) return 0
  const table = new MatrixRows(Number.POSITIVE_INFINITY)
  table.read([head])
  const { layout } = table.directives
  if (layout) return layout === 'matrix' ? 1 : 0
  const { firstRow: first } = table
  const [, second, ...others] = table.rows
  if (table.issue || first.length === 0) return 0
  if (second === undefined) return first.every(isDecimal) ? CONFIDENCE.oneRow : 0
  const body = [second, ...others]
  const regular = body.filter(({ width, fault }) => width === second.width && fault === null)
  const hasCorner = first[0] === '' || first[0]!.toLowerCase() === LABEL_CORNER
  const wide = second.width === 3 ? CONFIDENCE.threeColumns : CONFIDENCE.regular
  return (regular.length / body.length) * (hasCorner ? CONFIDENCE.corner : wide)
}

export const denseCsv: ProblemFormat = {
  id: ID,
  title: 'Dense matrix (CSV)',
  extensions: ['csv', 'tsv', 'txt'],
  mediaType: 'text/csv',
  sniff,
  read,
  write: (document) => bytesOf(writeText(document)),
}
