/**
 * Coefficient list: one entry `i j value` a line, separated by semicolons, commas, tabs or white space; `i i value` is
 * linear; `#` opens a comment; blank lines and one line of column names at the top are passed over; comments may carry
 * directives (see `directives.ts`). Entries of one pair are summed, whichever way round they stand.
 *
 * A variable exists when it is named: `i i 0` declares one that has no coefficients. When all labels are integers the
 * variables are put in numerical order (gaps are no variables), otherwise in order of first appearance.
 */
import { negateProblem } from '../problem/negate'
import { assembleReading } from './assemble'
import { readDirective, writeDirectives, type Directives } from './directives'
import { surveyLine } from './fields'
import type { ProblemDocument, ProblemFormat, ProblemReading, ReadingIssue, ReadOptions } from './format'
import { checkLabels, isNumericOrder, labelClashes, numericRanks, quoteLabel } from './labels'
import type { LabelTable } from './label-table'
import { isColumnName, ListReader, threeFields } from './list-reader'
import { formatNumber, isDecimal } from './numbers'
import { bytesOf, eachTextLine, holdsText } from './text'

const ID = 'coefficients'
const DEFAULTS = { linesSniffed: 300 }

function emptinessIssues(reader: ListReader): ReadingIssue[] {
  if (reader.entries.count > 0) return []
  const first = reader.rejections.lines[0]
  if (!first) return [{ message: 'there are no coefficients: expected lines of the shape "i j value"' }]
  return [{ line: first.line, message: `no line could be read; line ${first.line}: ${first.reason}` }]
}

/** Reads a coefficient list; see the head of this file. */
function read(chunks: Iterable<Uint8Array>, options: ReadOptions): ProblemReading {
  const reader = new ListReader()
  reader.read(chunks)
  const { table, directives, header, rejections } = reader
  const clashes = table.isNumbered ? [] : labelClashes(table.labels, table.lines)
  const { rows, cols, values } = reader.entries.terms()
  const ranks = directives['variable order'] === 'listed' ? null : ranksOf(table)
  if (ranks) {
    renumber(rows, ranks)
    renumber(cols, ranks)
  }
  const labels = ranks ? reordered(table.labels, ranks) : table.labels
  const issues = [...emptinessIssues(reader), ...clashes]
  const common = { format: ID, isMatrix: false, directives, header, rejections, issues }
  return assembleReading({ ...common, labels, rows, cols, values }, options)
}

const ranksOf = (table: LabelTable): Uint32Array | null =>
  table.isNumbered ? table.numberRanks() : numericRanks(table.labels)

function renumber(indices: Uint32Array, ranks: Uint32Array): void {
  for (let k = 0; k < indices.length; k++) indices[k] = ranks[indices[k]!]!
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
function sniff(head: Uint8Array): number {
  if (!holdsText(head)) return 0
  const directives: Directives = {}
  let lines = 0
  let entries = 0
  let fractions = 0
  eachTextLine(head, (text) => {
    if (lines === DEFAULTS.linesSniffed) return
    const survey = surveyLine(text, 0, text.length)
    if (survey.start === survey.end) {
      if (survey.comment >= 0) readDirective(text.slice(survey.comment), directives)
      return
    }
    lines++
    const fields = threeFields(text, survey)
    if (typeof fields === 'string' || fields[0] === '' || fields[1] === '') return
    if (!isDecimal(fields[2]) && !(lines === 1 && isColumnName(fields[2]))) return
    entries++
    if (/^[+-]?\d*\.\d*[1-9]/.test(fields[0]) || /^[+-]?\d*\.\d*[1-9]/.test(fields[1])) fractions++
  })
  if (directives.layout) return directives.layout === 'list' ? 1 : 0
  return lines === 0 ? 0 : Math.max(0, (0.8 * entries) / lines - (fractions > 0 ? 0.5 : 0))
}

export const coefficients: ProblemFormat = {
  id: ID,
  title: 'Coefficient list',
  extensions: ['csv', 'tsv', 'txt'],
  mediaType: 'text/csv',
  sniff,
  read,
  write: (document) => bytesOf(writeText(document)),
}
