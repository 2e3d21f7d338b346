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
import { collected } from './chunks'
import { writeDirectives } from './directives'
import type { ProblemDocument, ProblemFormat, ProblemReading, ReadingIssue, ReadOptions } from './format'
import { checkLabels, labelClashes, labelFault, quoteLabel } from './labels'
import { LABEL_CORNER, type MatrixShape } from './matrix-shape'
import { cellsOf, gatherRows, shapeOf, type Table, type TableRow } from './matrix-table'
import { formatNumber, isDecimal, numberFault, parseNumber } from './numbers'
import { bytesOf, holdsText, textOf } from './text'

const ID = 'dense-csv'
const DEFAULTS = { maxVariables: 5000 }

class MatrixReader {
  readonly rows: number[] = []
  readonly cols: number[] = []
  readonly values: number[] = []
  readonly issues: ReadingIssue[] = []
  labels: string[]
  header: ProblemReading['header'] = null
  private readonly body: readonly TableRow[]
  private labelLines: number[]

  constructor(
    private readonly table: Table,
    private readonly shape: MatrixShape,
  ) {
    this.labels = Array.from({ length: shape.n }, (_, i) => String(i))
    this.body = shape.hasHeader ? table.rows.slice(1) : table.rows
    this.labelLines = this.body.map((row) => row.line)
  }

  read(): void {
    if (this.shape.hasHeader) this.readHeader(this.table.rows[0]!)
    this.body.forEach((row, index) => this.readRow(row, index))
    this.labels.forEach((label, i) => {
      const fault = labelFault(label)
      if (fault) this.issues.push({ line: this.labelLines[i]!, message: `variable ${i + 1}: ${fault}` })
    })
    this.issues.push(...labelClashes(this.labels, this.labelLines))
  }

  private readHeader(row: TableRow): void {
    const cells = cellsOf(this.table, row)
    this.labels = cells.length > this.shape.n ? cells.slice(1) : cells
    this.labelLines = this.labels.map(() => row.line)
    this.header = { line: row.line, text: this.table.text.slice(row.start, row.end) }
  }

  private readRow(row: TableRow, index: number): void {
    const { n, hasLabelColumn } = this.shape
    const cells = cellsOf(this.table, row)
    const expected = n + (hasLabelColumn ? 1 : 0)
    if (cells.length !== expected) {
      const message = `the matrix is not square: line ${row.line} has ${cells.length} cells, expected ${expected}`
      this.issues.push({ line: row.line, message })
      return
    }
    if (hasLabelColumn) this.readLabel(cells.shift()!, row, index)
    this.readCells(row, index, cells)
  }

  private readLabel(label: string, row: TableRow, index: number): void {
    if (!this.shape.hasHeader) this.labels[index] = label
    else if (this.labels[index] !== label) {
      const message = `row "${label}" (line ${row.line}) stands where the columns have "${this.labels[index]}"`
      this.issues.push({ line: row.line, message })
    }
  }

  private readCells(row: TableRow, index: number, cells: readonly string[]): void {
    for (let col = 0; col < cells.length; col++) {
      const value = parseNumber(cells[col]!)
      if (Number.isNaN(value)) return this.reject(row, `cell ${col + 1}: ${numberFault(cells[col]!)}`)
      if (value === 0) continue
      this.rows.push(index)
      this.cols.push(col)
      this.values.push(value)
    }
  }

  private reject(row: TableRow, reason: string): void {
    const { rejections, text } = this.table
    if (rejections.count === 0)
      this.issues.push({ line: row.line, message: `the matrix is incomplete: line ${row.line}, ${reason}` })
    rejections.add(text, row.start, row.end, row.line, reason)
  }
}

const NOTHING = { labels: [], rows: [], cols: [], values: [], header: null }

/** Reads a dense matrix; see the head of this file. */
function readText(text: string, options: ReadOptions): ProblemReading {
  const table = gatherRows(text)
  const { directives, rejections } = table
  const common = { format: ID, isMatrix: true, directives, rejections }
  const shape = shapeOf(table, DEFAULTS.maxVariables)
  if ('message' in shape) return assembleReading({ ...common, ...NOTHING, issues: [shape] }, options)
  const reader = new MatrixReader(table, shape)
  reader.read()
  const { labels, rows, cols, values, header, issues } = reader
  return assembleReading({ ...common, labels, rows, cols, values, header, issues }, options)
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
function sniffText(head: string): number {
  const table = gatherRows(head)
  const { layout } = table.directives
  if (layout) return layout === 'matrix' ? 1 : 0
  const [first, second, ...others] = table.rows.map((row) => cellsOf(table, row))
  if (first === undefined) return 0
  if (second === undefined) return first.every(isDecimal) ? CONFIDENCE.oneRow : 0
  const width = second.length
  const body = [second, ...others]
  const regular = body.filter((cells) => cells.length === width && cells.slice(1).every(isDecimal))
  const hasCorner = first[0] === '' || first[0]?.toLowerCase() === LABEL_CORNER
  const wide = width === 3 ? CONFIDENCE.threeColumns : CONFIDENCE.regular
  return (regular.length / body.length) * (hasCorner ? CONFIDENCE.corner : wide)
}

export const denseCsv: ProblemFormat = {
  id: ID,
  title: 'Dense matrix (CSV)',
  extensions: ['csv', 'tsv', 'txt'],
  mediaType: 'text/csv',
  sniff: (head) => (holdsText(head) ? sniffText(textOf(head)) : 0),
  read: (chunks, options) => readText(textOf(collected(chunks)), options),
  write: (document) => bytesOf(writeText(document)),
}
