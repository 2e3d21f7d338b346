import type { EnergyTable } from './energy-table'
import { ENERGY_TABLE_LIMITS, energyTableIssues } from './energy-table'
import { ENERGY_UNIT_NAMES, energyUnit } from './energy-units'

type Column = 's' | 'A' | 'B'

/** A text with more wrong lines than this is of another kind altogether. */
const MOST_REJECTED = 200

/** A line that cannot be used; `line` counts from 1. */
export interface RejectedLine {
  readonly line: number
  readonly message: string
}

export interface ParsedEnergyTable {
  /** In GHz; null while a line is rejected, or where there is no row at all. */
  readonly table: { s: number[]; A: number[]; B: number[] } | null
  readonly rejected: RejectedLine[]
  /** What was understood beyond the numbers: units taken or converted. */
  readonly notes: string[]
}

interface Layout {
  /** Where each column stands in a line. */
  readonly at: Record<Column, number>
  /** Columns of a line; more are refused where no header names them. */
  readonly width: number | null
  readonly factor: Record<'A' | 'B', number>
}

const PLAIN: Layout = { at: { s: 0, A: 1, B: 2 }, width: 3, factor: { A: 1, B: 1 } }
const COLUMNS = ['s', 'A', 'B'] as const
const HEADING = /^(s|a|b)(?:\s*\(\s*s\s*\))?\s*(?:[([]\s*([^()[\]]*?)\s*[)\]])?$/i
const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?$/i

/** By semicolon or tab where a line has one, else by comma, else by blanks. */
function cellsOf(line: string): string[] {
  const separator = /[;\t]/.exec(line)?.[0] ?? (line.includes(',') ? ',' : /\s+/)
  return line.split(separator).map((cell) =>
    cell
      .trim()
      .replace(/^"(.*)"$/, '$1')
      .trim(),
  )
}

/** Headings stand apart by blanks too, so `A (GHz)` is put together before a line is cut at them. */
const headingsOf = (line: string): string[] => cellsOf(/[;,\t]/.test(line) ? line : line.replace(/\s+(?=[([])/g, ''))

interface Headed {
  readonly layout: Layout
  readonly notes: string[]
  readonly problems: string[]
}

function readHeader(line: string): Headed {
  const problems: string[] = []
  const notes: string[] = []
  const at: Partial<Record<Column, number>> = {}
  const factor = { A: 1, B: 1 }
  headingsOf(line).forEach((heading, k) => {
    const [, letter, unit = ''] = HEADING.exec(heading) ?? []
    if (letter === undefined) return
    const column = letter.toLowerCase() === 's' ? 's' : (letter.toUpperCase() as 'A' | 'B')
    if (at[column] !== undefined) return void problems.push(`two columns are called ${column}`)
    at[column] = k
    if (unit === '' || column === 's') return
    const known = energyUnit(unit)
    if (!known) return void problems.push(`${column} is in “${unit}”, which is not known; write ${ENERGY_UNIT_NAMES}`)
    factor[column] = known.gigahertz
    if (known.by !== '') notes.push(`${column} converted from ${unit} to GHz: ${known.by}.`)
  })
  const absent = COLUMNS.filter((column) => at[column] === undefined)
  if (absent.length > 0) problems.push(`the header names no column ${absent.join(', ')}; it must name s, A and B`)
  if (!/[([]/.test(line)) notes.push('The header gives no unit: A and B are taken as GHz.')
  return { layout: { at: { s: 0, A: 1, B: 2, ...at }, width: null, factor }, notes, problems }
}

interface Rows {
  readonly lines: number[]
  readonly s: number[]
  readonly A: number[]
  readonly B: number[]
}

/** @returns what is wrong with the line, after its numbers (NaN where there is none) were added to the rows */
function readRow(text: string, line: number, layout: Layout, rows: Rows): string[] {
  const cells = cellsOf(text)
  const problems: string[] = []
  const least = Math.max(...Object.values(layout.at)) + 1
  if (cells.length < least) return [`${cells.length} of ${least} columns; a row is s, A, B`]
  if (layout.width !== null && cells.length > layout.width)
    return [`${cells.length} columns; a row is s, A, B. A header that names them lets others stand beside them`]
  rows.lines.push(line)
  for (const column of COLUMNS) {
    const cell = cells[layout.at[column]]!
    const isNumber = NUMBER.test(cell)
    if (!isNumber) problems.push(`${column} is “${cell.slice(0, 40)}”, which is not a number with a decimal point`)
    rows[column].push(isNumber ? Number(cell) * (column === 's' ? 1 : layout.factor[column]) : Number.NaN)
  }
  return problems
}

const lineText = (raw: string): string => raw.replace(/#.*$/, '').trim()
const isHeader = (text: string): boolean => cellsOf(text).every((cell) => !NUMBER.test(cell))

/** Issues of the rows that could be read, by line; cells that could not are named already. */
function issuesOfRows(rows: Rows): RejectedLine[] {
  return energyTableIssues(rows)
    .filter(({ row, column }) => !Number.isNaN(rows[column][row]))
    .map(({ row, message }) => ({ line: rows.lines[row] ?? rows.lines.at(-1) ?? 1, message }))
}

/**
 * Reads a table `s,A,B` as people paste it: columns apart by comma, semicolon, tab or blanks, decimal points, `#` opens
 * a comment. A header is optional; it may name the columns in any order, others beside them, and the units of A and B
 * (`A (GHz)`), which are converted to GHz. Without one A and B are in GHz. Every wrong line is named, with all that is
 * wrong with it: too few columns, no number, s that does not rise from 0 to 1, A that rises, B that falls, values below 0.
 */
export function parseEnergyText(text: string): ParsedEnergyTable {
  const rejected: RejectedLine[] = []
  const notes: string[] = []
  const rows: Rows = { lines: [], s: [], A: [], B: [] }
  let layout: Layout | null = null
  for (const [k, raw] of text
    .replace(/^\ufeff/, '')
    .split(/\r\n|\r|\n/)
    .entries()) {
    const line = lineText(raw)
    if (line === '') continue
    if (layout === null && isHeader(line)) {
      const header = readHeader(line)
      layout = header.layout
      notes.push(...header.notes)
      rejected.push(...header.problems.map((message) => ({ line: k + 1, message })))
      // Without knowing which column is which, every row would be wrong for this one reason.
      if (header.problems.length > 0) return { table: null, rejected, notes: [] }
      continue
    }
    layout ??= PLAIN
    rejected.push(...readRow(line, k + 1, layout, rows).map((message) => ({ line: k + 1, message })))
    if (rows.s.length > ENERGY_TABLE_LIMITS.rows || rejected.length >= MOST_REJECTED) break
  }
  if (rows.s.length === 0) {
    if (layout !== null && rejected.length === 0)
      rejected.push({ line: 1, message: 'no row stands beneath the header' })
    return { table: null, rejected, notes }
  }
  rejected.push(...issuesOfRows(rows))
  rejected.sort((a, b) => a.line - b.line)
  const { s, A, B } = rows
  return { table: rejected.length === 0 ? { s, A, B } : null, rejected, notes }
}

/** Writes a table as CSV that `parseEnergyText` reads back to the last bit. */
export const formatEnergyTable = ({ s, A, B }: EnergyTable): string =>
  ['s,A (GHz),B (GHz)', ...s.map((at, k) => `${at},${A[k]},${B[k]}`)].join('\n')
