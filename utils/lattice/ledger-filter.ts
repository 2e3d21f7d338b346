import { isUnderBound } from './ledger'
import { CLASS_DEFAULTS } from './kinds'
import type { LedgerRow, Lens } from './types'

/** Chains of one condition, to be seen alone. */
export type LedgerOnly = 'selected' | 'conflicted' | 'under-bound' | 'full' | 'broken'

export interface LedgerFilter {
  /** Text of the label, or comparisons; see `filterRows`. */
  readonly text: string
  /** Least and greatest number of qubits. */
  readonly least: number | null
  readonly most: number | null
  readonly only: LedgerOnly | null
}

export const NO_FILTER: LedgerFilter = { text: '', least: null, most: null, only: null }

export const ONLY_WORDS: Record<LedgerOnly, string> = {
  selected: 'selected',
  conflicted: 'breaking a rule',
  'under-bound': 'bound above k',
  full: 'over 90 % of range',
  broken: 'broken',
}

const ONLY_TESTS: Record<LedgerOnly, (row: LedgerRow, selected: ReadonlySet<number>) => boolean> = {
  selected: (row, selected) => selected.has(row.variable),
  conflicted: (row) => Boolean(row.conflict),
  'under-bound': isUnderBound,
  full: (row) => (row.load?.sum ?? 0) > CLASS_DEFAULTS.fullLoad,
  broken: (row) => (row.breaks?.rate ?? 0) > 0,
}

const LENS_ONLY: Record<Lens, readonly LedgerOnly[]> = {
  occupancy: ['selected', 'conflicted', 'under-bound'],
  load: ['selected', 'conflicted', 'full'],
  breaks: ['selected', 'conflicted', 'broken', 'under-bound'],
}

/** Conditions of a lens that some chain meets, with their number of chains. */
export function onlyChoices(rows: readonly LedgerRow[], lens: Lens, selected: ReadonlySet<number>) {
  return LENS_ONLY[lens]
    .map((only) => ({ only, count: rows.filter((row) => ONLY_TESTS[only](row, selected)).length }))
    .filter(({ count }) => count > 0)
}

export const isFiltering = ({ text, least, most, only }: LedgerFilter): boolean =>
  text.trim() !== '' || least !== null || most !== null || only !== null

/**
 * Rows that a filter lets through. Text must occur in the label; a comparison such as `> 5 %` or `<= 0.5%` is about the
 * break rate, or the load in that lens; without `%` it is about the number of qubits. Several terms, set apart by
 * commas, must all hold, and so must the lengths and the condition.
 */
export function filterRows(
  rows: readonly LedgerRow[],
  filter: LedgerFilter,
  lens: Lens,
  selected: ReadonlySet<number> = new Set(),
): LedgerRow[] {
  const { least, most, only } = filter
  const tests = filter.text
    .split(',')
    .map((term) => term.trim().toLowerCase())
    .filter(Boolean)
    .map((term) => testOf(term, lens))
  if (least !== null) tests.push((row) => row.qubits >= least)
  if (most !== null) tests.push((row) => row.qubits <= most)
  if (only) tests.push((row) => ONLY_TESTS[only](row, selected))
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
