import { readDirective, type Directives } from './directives'
import { splitFields, surveyLine, type Delimiter } from './fields'
import type { ReadingIssue } from './format'
import { forEachLine } from './lines'
import { matrixShape, type MatrixShape } from './matrix-shape'
import { Rejections } from './rejections'

/** A line of cells: text[start, end). */
export interface TableRow {
  readonly start: number
  readonly end: number
  readonly line: number
}

/** The lines that hold cells, and what the comments say. */
export interface Table {
  readonly text: string
  readonly rows: TableRow[]
  readonly delimiter: Delimiter
  readonly directives: Directives
  readonly rejections: Rejections
}

/** Finds the rows of cells without cutting them up; the last row's delimiter holds for all. */
export function gatherRows(text: string): Table {
  const rows: TableRow[] = []
  const directives: Directives = {}
  const rejections = new Rejections()
  let delimiter: Delimiter = ' '
  forEachLine(text, (from, to, line) => {
    const survey = surveyLine(text, from, to)
    if (survey.start < survey.end) {
      delimiter = survey.delimiter
      // Before a tab even nothing is a cell: the blank corner above a column of labels.
      rows.push({ start: delimiter === '\t' ? from : survey.start, end: survey.end, line })
      return
    }
    const reason = survey.comment < 0 ? null : readDirective(text.slice(survey.comment, to), directives)
    if (reason) rejections.add(text, from, to, line, reason)
  })
  return { text, rows, delimiter, directives, rejections }
}

/** The cells of a row; none when its quoting is broken, which `shapeOf` reports. */
export function cellsOf({ text, delimiter }: Table, { start, end }: TableRow): string[] {
  const cells = splitFields(text, start, end, delimiter)
  return typeof cells === 'string' ? [] : cells
}

/** The number of cells that most rows have; of equally common ones, the one that comes first. */
function commonWidth(widths: readonly number[]): number {
  const counts = new Map<number, number>()
  for (const width of widths) counts.set(width, (counts.get(width) ?? 0) + 1)
  return [...counts].reduce((best, entry) => (entry[1] > best[1] ? entry : best))[0]
}

function notSquare(rows: readonly TableRow[], widths: readonly number[], width: number): ReadingIssue {
  const odd = widths.findIndex((count) => count !== width)
  const { line } = rows[Math.max(0, odd)]!
  const finding =
    odd < 0 ? `${rows.length} rows of ${width} cells` : `line ${line} has ${widths[odd]} cells, most have ${width}`
  return { line, message: `the matrix is not square: ${finding}` }
}

/** The shape of the table, or what keeps it from being a square matrix of at most `maxVariables` rows. */
export function shapeOf(table: Table, maxVariables: number): MatrixShape | ReadingIssue {
  const { rows } = table
  if (rows.length === 0) return { message: 'there are no coefficients: expected the rows of a square matrix' }
  if (rows.length > maxVariables + 1)
    return { message: `a dense matrix has at most ${maxVariables} rows: use a coefficient list` }
  const widths: number[] = []
  const firstColumn: string[] = []
  for (const row of rows) {
    const cells = splitFields(table.text, row.start, row.end, table.delimiter)
    if (typeof cells === 'string') return { line: row.line, message: `line ${row.line}: ${cells}` }
    if (cells.length > maxVariables + 1)
      return { line: row.line, message: `a dense matrix has at most ${maxVariables} columns: use a coefficient list` }
    widths.push(cells.length)
    firstColumn.push(cells[0]!)
  }
  const width = commonWidth(widths)
  return (
    matrixShape(cellsOf(table, rows[0]!), firstColumn.slice(1), rows.length, width) ?? notSquare(rows, widths, width)
  )
}
