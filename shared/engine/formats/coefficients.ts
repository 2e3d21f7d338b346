/**
 * Coefficient list: one entry `i j value` a line, separated by semicolons, commas, tabs or white space; `i i value` is
 * linear; `#` opens a comment; blank lines and one line of column names at the top are passed over; comments may carry
 * directives (see `directives.ts`). Entries of one pair are summed, whichever way round they stand.
 *
 * A variable exists when it is named: `i i 0` declares one that has no coefficients. When all labels are integers the
 * variables are put in numerical order (gaps are no variables), otherwise in order of first appearance.
 */
import { assembleReading, type Gathered } from './assemble'
import { readDirective, writeDirectives, type Directives } from './directives'
import { splitFields, surveyLine, type LineSurvey } from './fields'
import type { ProblemDocument, ProblemFormat, ProblemReading, ReadingIssue, ReadOptions } from './format'
import { checkLabels, isNumericOrder, LabelTable, labelClashes, labelFault, numericRanks, quoteLabel } from './labels'
import { forEachLine } from './lines'
import { formatNumber, isDecimal, numberFault, parseNumber } from './numbers'
import { negateProblem } from '../problem/negate'
import { Rejections } from './rejections'
import { bytesOf, holdsText, readAsText, textOf } from './text'

const ID = 'coefficients'
const DEFAULTS = { maxLineLength: 2000 }
const COLUMNS = 3

class ListReader {
  readonly table = new LabelTable()
  readonly rows: number[] = []
  readonly cols: number[] = []
  readonly values: number[] = []
  readonly directives: Directives = {}
  readonly rejections = new Rejections()
  header: ProblemReading['header'] = null
  private dataLines = 0

  constructor(private readonly text: string) {}

  readonly readLine = (from: number, to: number, line: number): void => {
    const survey = surveyLine(this.text, from, to)
    const reason = survey.start === survey.end ? this.readComment(survey, to) : this.readEntry(survey, line)
    if (reason) this.rejections.add(this.text, from, to, line, reason)
  }

  private readComment({ comment }: LineSurvey, to: number): string | null {
    return comment < 0 ? null : readDirective(this.text.slice(comment, to), this.directives)
  }

  /** Takes in one entry or the line of column names; returns why it cannot. */
  private readEntry(survey: LineSurvey, line: number): string | null {
    this.dataLines++
    if (survey.end - survey.start > DEFAULTS.maxLineLength)
      return `the line is longer than ${DEFAULTS.maxLineLength} characters`
    const fields = threeFields(this.text, survey)
    if (typeof fields === 'string') return fields
    const [row, col, valueText] = fields
    if (this.dataLines === 1 && isColumnName(valueText)) {
      this.header = { line, text: this.text.slice(survey.start, survey.end) }
      return null
    }
    const value = parseNumber(valueText)
    if (Number.isNaN(value)) return numberFault(valueText)
    const knownRow = this.table.indexOf(row)
    const knownCol = this.table.indexOf(col)
    const fault = (knownRow === undefined && labelFault(row)) || (knownCol === undefined && labelFault(col))
    if (fault) return fault
    this.rows.push(knownRow ?? this.table.add(row, line))
    this.cols.push(knownCol ?? this.table.indexOf(col) ?? this.table.add(col, line))
    this.values.push(value)
    return null
  }
}

/** Tabs may separate labels with spaces in them, or just be white space: three fields decide. */
function threeFields(text: string, { start, end, delimiter }: LineSurvey): [string, string, string] | string {
  let fields = splitFields(text, start, end, delimiter)
  if (delimiter === '\t' && fields.length !== COLUMNS) fields = splitFields(text, start, end, ' ')
  if (typeof fields === 'string') return fields
  const [row, col, value] = fields
  if (fields.length === COLUMNS) return [row!, col!, value!]
  return `expected ${COLUMNS} columns (i, j, value), found ${fields.length}`
}

/** A word without digits that is not one of the names of non-numbers. */
const isColumnName = (field: string): boolean =>
  field !== '' && !/\d/.test(field) && !/^[+-]?(?:nan|inf|infinity)$/i.test(field)

function emptinessIssues(reader: ListReader): ReadingIssue[] {
  if (reader.values.length > 0) return []
  const first = reader.rejections.lines[0]
  if (!first) return [{ message: 'there are no coefficients: expected lines of the shape "i j value"' }]
  return [{ line: first.line, message: `no line could be read; line ${first.line}: ${first.reason}` }]
}

/** Reads a coefficient list; see the head of this file. A million lines take a few seconds. */
function readText(text: string, options: ReadOptions): ProblemReading {
  const reader = new ListReader(text)
  forEachLine(text, reader.readLine)
  const { table, directives, header, rejections } = reader
  const issues = [...emptinessIssues(reader), ...labelClashes(table.labels, table.lines)]
  const ranks = directives['variable order'] === 'listed' ? null : numericRanks(table.labels)
  const gathered: Gathered = {
    format: ID,
    labels: ranks ? reordered(table.labels, ranks) : table.labels,
    rows: ranks ? reader.rows.map((index) => ranks[index]!) : reader.rows,
    cols: ranks ? reader.cols.map((index) => ranks[index]!) : reader.cols,
    values: reader.values,
    isMatrix: false,
    directives,
    header,
    rejections,
    issues,
  }
  return assembleReading(gathered, options)
}

function reordered(labels: readonly string[], ranks: Uint32Array): string[] {
  const sorted = labels.slice()
  labels.forEach((label, index) => (sorted[ranks[index]!] = label))
  return sorted
}

/** Writes every variable's linear coefficient first, zeros included, so that all variables and their order survive. */
function writeText({ form, labels, problem, sense }: ProblemDocument): string {
  checkLabels(labels, problem.n)
  const isMax = sense === 'max'
  const { n, linear, rows, cols, values, offset } = negateProblem(problem, { coefficients: isMax, offset: isMax })
  const quoted = labels.map(quoteLabel)
  const said: Directives = { layout: 'list', form, sense, offset }
  if (!isNumericOrder(labels)) said['variable order'] = 'listed'
  const lines = [...writeDirectives(said), 'i,j,value']
  for (let i = 0; i < n; i++) lines.push(`${quoted[i]},${quoted[i]},${formatNumber(linear[i]!)}`)
  for (let k = 0; k < values.length; k++)
    lines.push(`${quoted[rows[k]!]},${quoted[cols[k]!]},${formatNumber(values[k]!)}`)
  return `${lines.join('\n')}\n`
}

/** The share of data lines that are entries; less sure when the first two columns hold fractions. */
function sniffText(head: string): number {
  const directives: Directives = {}
  let lines = 0
  let entries = 0
  let fractions = 0
  forEachLine(head, (from, to) => {
    const survey = surveyLine(head, from, to)
    if (survey.start === survey.end) {
      if (survey.comment >= 0) readDirective(head.slice(survey.comment, to), directives)
      return
    }
    lines++
    const fields = threeFields(head, survey)
    if (typeof fields === 'string' || fields[0] === '' || fields[1] === '') return
    if (!isDecimal(fields[2]) && !(lines === 1 && isColumnName(fields[2]))) return
    entries++
    if (/^[+-]?\d*\.\d*[1-9]/.test(fields[0]) || /^[+-]?\d*\.\d*[1-9]/.test(fields[1])) fractions++
  })
  if (directives.layout) return directives.layout === 'list' ? 1 : 0
  return lines === 0 ? 0 : (0.8 * entries) / lines - (fractions > 0 ? 0.5 : 0)
}

export const coefficients: ProblemFormat = {
  id: ID,
  title: 'Coefficient list',
  extensions: ['csv', 'tsv', 'txt'],
  mediaType: 'text/csv',
  sniff: (head) => (holdsText(head) ? Math.max(0, sniffText(textOf(head))) : 0),
  read: (chunks, options) => readAsText(ID, chunks, options, readText),
  write: (document) => bytesOf(writeText(document)),
}
