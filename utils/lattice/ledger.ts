import type { LedgerRow, Lens } from './types'

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

const COLLATOR = new Intl.Collator('en', { numeric: true })

/**
 * Rows that a filter lets through. Text must occur in the label; a comparison such as `> 5 %` or `<= 0.5%` is about the
 * break rate, or the load in that lens; without `%` it is about the number of qubits. Several terms, set apart by
 * commas, must all hold.
 */
export function filterRows(rows: readonly LedgerRow[], filter: string, lens: Lens): LedgerRow[] {
  const tests = filter
    .split(',')
    .map((term) => term.trim().toLowerCase())
    .filter(Boolean)
    .map((term) => testOf(term, lens))
  return rows.filter((row) => tests.every((test) => test(row)))
}

const COMPARISONS: Record<string, (a: number, b: number) => boolean> = {
  '>': (a, b) => a > b,
  '<': (a, b) => a < b,
  '>=': (a, b) => a >= b,
  '<=': (a, b) => a <= b,
  '≥': (a, b) => a >= b,
  '≤': (a, b) => a <= b,
  '=': (a, b) => a === b,
}

function testOf(term: string, lens: Lens): (row: LedgerRow) => boolean {
  const match = /^(>=|<=|[<>=≥≤])\s*(\d+(?:\.\d+)?)\s*(%?)$/.exec(term)
  if (!match) return (row) => row.label.toLowerCase().includes(term)
  const holds = COMPARISONS[match[1]!]!
  const limit = Number(match[2])
  if (!match[3]) return (row) => holds(row.qubits, limit)
  return (row) => {
    const share = lens === 'load' ? row.load?.sum : row.breaks?.rate
    return share !== undefined && holds(100 * share, limit)
  }
}

/** Whether the bound asks for more than the chain strength that is set. */
export const isUnderBound = (row: LedgerRow): boolean =>
  row.strength != null && row.bound != null && row.bound > row.strength

/** All columns of all lenses as comma-separated values, shares as fractions. */
export function rowsToCsv(rows: readonly LedgerRow[]): string {
  const heads =
    'variable,qubits,couplers,strength,bound,bound_exact,break_rate,break_low,break_high,broken_reads,reads,largest_h,largest_j,load'
  const lines = rows.map(({ label, qubits, couplers, strength, bound, boundExact, breaks, load }) =>
    [
      quoted(label),
      qubits,
      couplers,
      strength,
      bound,
      bound == null ? null : Number(boundExact ?? true),
      breaks?.rate,
      breaks?.low,
      breaks?.high,
      breaks?.count,
      breaks?.reads,
      load?.field,
      load?.coupling,
      load?.sum,
    ]
      .map((value) => value ?? '')
      .join(','),
  )
  return `${[heads, ...lines].join('\n')}\n`
}

const quoted = (text: string) => (/[",\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text)
