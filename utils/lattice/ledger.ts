import type { LedgerRow, Lens } from './types'

/** Columns of the chain ledger: which of them a lens shows, how wide they are, and how rows are sorted by them. */
export type LedgerColumn =
  'variable' | 'qubits' | 'couplers' | 'strength' | 'bound' | 'breaks' | 'field' | 'coupling' | 'sum'

export interface LedgerSort {
  readonly column: LedgerColumn
  readonly descending: boolean
}

const SHARED: readonly LedgerColumn[] = ['variable', 'qubits', 'couplers', 'strength']

/** Columns that go with each lens. */
export const LENS_COLUMNS: Record<Lens, readonly LedgerColumn[]> = {
  occupancy: [...SHARED, 'bound', 'breaks'],
  load: [...SHARED, 'field', 'coupling', 'sum'],
  breaks: [...SHARED, 'bound', 'breaks'],
}

/** What a lens is looked at for decides how its ledger is sorted at first. */
export const LENS_SORT: Record<Lens, LedgerSort> = {
  occupancy: { column: 'qubits', descending: true },
  load: { column: 'sum', descending: true },
  breaks: { column: 'breaks', descending: true },
}

export const COLUMN_HEADS: Record<LedgerColumn, string> = {
  variable: 'Variable',
  qubits: 'Qubits',
  couplers: 'Couplers',
  strength: 'k',
  bound: 'Cut bound',
  breaks: 'Break %',
  field: 'Largest h',
  coupling: 'Largest J',
  sum: 'Sum, %',
}

/** Order of giving way when the ledger is narrow: the first to go is the first in the list. */
export const COLUMNS_GIVING_WAY: readonly LedgerColumn[] = ['couplers', 'strength', 'field', 'coupling', 'bound']

export const LEDGER_DEFAULTS = {
  /** Heights of a row in pixels: one line, and a two-line entry for fingers. */
  rowHeight: { wide: 28, touch: 44 },
  headHeight: 31,
  sumHeight: 32,
  /** Width below which rows become two-line entries. */
  narrowBelow: 380,
  /** Room for the bar beside the number of qubits. */
  barWidth: 48,
  /** Room for the box that selects a row, where there is no key to hold. */
  boxWidth: 36,
}

const WIDTHS: Record<Exclude<LedgerColumn, 'variable'>, number> = {
  qubits: 56,
  couplers: 64,
  strength: 42,
  bound: 70,
  breaks: 162,
  field: 74,
  coupling: 74,
  sum: 108,
}
const LABEL_WIDTH = { least: 82, most: 160, perCharacter: 7.9, swatch: 44 }

/** Least width of a column; labels are given the room they need, within reason. */
export function widthOfColumn(column: LedgerColumn, longestLabel: number): number {
  if (column !== 'variable') return WIDTHS[column]
  const { least, most, perCharacter, swatch } = LABEL_WIDTH
  return Math.min(most, Math.max(least, swatch + perCharacter * longestLabel))
}

/** Columns of the lens that have a figure in some row and find room in the width, and whether lengths find a bar. */
export function columnsFor(rows: readonly LedgerRow[], lens: Lens, width: number) {
  const longestLabel = rows.reduce((most, row) => Math.max(most, row.label.length), 0)
  const needed = (shown: readonly LedgerColumn[]) =>
    shown.reduce((sum, column) => sum + widthOfColumn(column, longestLabel), 0)
  let columns = LENS_COLUMNS[lens].filter((column) => rows.some((row) => valueOf(row, column) !== null))
  if (rows.length === 0) columns = ['variable', 'qubits', 'couplers']
  for (const column of COLUMNS_GIVING_WAY) {
    if (needed(columns) <= width) break
    columns = columns.filter((kept) => kept !== column)
  }
  const hasBar = lens === 'occupancy' && needed(columns) + LEDGER_DEFAULTS.barWidth <= width
  const template = columns.map((column) => {
    const least = widthOfColumn(column, longestLabel) + (hasBar && column === 'qubits' ? LEDGER_DEFAULTS.barWidth : 0)
    return `minmax(${least / 16}rem, ${column === 'variable' ? 1.4 : 1}fr)`
  })
  return { columns, hasBar, template: template.join(' ') }
}

export function valueOf(row: LedgerRow, column: LedgerColumn): number | null {
  switch (column) {
    case 'variable':
      return row.variable
    case 'qubits':
      return row.qubits
    case 'couplers':
      return row.couplers
    case 'strength':
      return row.strength ?? null
    case 'bound':
      return row.bound ?? null
    case 'breaks':
      return row.breaks?.rate ?? null
    default:
      return row.load?.[column] ?? null
  }
}

const COLLATOR = new Intl.Collator('en', { numeric: true })

/** Sorted copy: labels in natural order, rows without a value always last, ties by variable. */
export function sortRows(rows: readonly LedgerRow[], { column, descending }: LedgerSort): LedgerRow[] {
  const direction = descending ? -1 : 1
  const compare = (a: LedgerRow, b: LedgerRow): number => {
    if (column === 'variable') return direction * COLLATOR.compare(a.label, b.label)
    const x = valueOf(a, column)
    const y = valueOf(b, column)
    if (x === null || y === null) return Number(x === null) - Number(y === null)
    return direction * (column === 'coupling' ? Math.abs(x) - Math.abs(y) : x - y)
  }
  return [...rows].sort((a, b) => compare(a, b) || a.variable - b.variable)
}

/** Sorting after a click on a column: the same one turns round, another begins with its largest, labels with the first. */
export const nextSort = (sort: LedgerSort, column: LedgerColumn): LedgerSort => ({
  column,
  descending: sort.column === column ? !sort.descending : column !== 'variable',
})

/** Whether the bound asks for more than the chain strength that is set. */
export const isUnderBound = (row: LedgerRow): boolean =>
  row.strength != null && row.bound != null && row.bound > row.strength

/** Rate at the right end of the interval bars. */
export function scaleEndOf(rows: readonly LedgerRow[]): number {
  const highest = rows.reduce((most, row) => Math.max(most, row.breaks?.high ?? 0), 0.05)
  return [0.05, 0.1, 0.25, 0.5, 1].find((end) => end >= highest) ?? 1
}
