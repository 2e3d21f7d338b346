import { describe, expect, it } from 'vitest'
import { decimal, percent, percentRange, strengthText } from '../../../../utils/lattice/figures'
import { columnsFor, isUnderBound, nextSort, sortRows, valueOf } from '../../../../utils/lattice/ledger'
import { filterRows, isFiltering, NO_FILTER, onlyChoices } from '../../../../utils/lattice/ledger-filter'
import type { LedgerFilter } from '../../../../utils/lattice/ledger-filter'
import { sumsOf } from '../../../../utils/lattice/ledger-sums'
import { rowsToCsv, rowsToTabs } from '../../../../utils/lattice/ledger-text'
import type { LedgerRow } from '../../../../utils/lattice/types'

const row = (variable: number, label: string, more: Partial<LedgerRow> = {}): LedgerRow => ({
  variable,
  label,
  qubits: 3,
  couplers: 9,
  ...more,
})
const broken = (rate: number) => ({ rate, low: rate / 2, high: 2 * rate, count: 1000 * rate, reads: 1000 })
const rows = [
  row(0, 'dun.10', { qubits: 5, breaks: broken(0.04) }),
  row(1, 'dun.2', { breaks: broken(0.14), strength: 11, bound: 16.4 }),
  row(2, 'Kno.1', { breaks: null, load: { field: 0.2, coupling: -0.9, sum: 0.93 } }),
  row(3, 'sal, x', { breaks: broken(0.05), load: { field: 0.2, coupling: 0.5, sum: 0.4 } }),
]
const order = (sorted: readonly LedgerRow[]) => sorted.map(({ variable }) => variable)

describe('sorting', () => {
  it('sorts labels in natural order and figures both ways, rows without a figure last', () => {
    expect(order(sortRows(rows, { column: 'variable', descending: false }))).toEqual([1, 0, 2, 3])
    expect(order(sortRows(rows, { column: 'breaks', descending: true }))).toEqual([1, 3, 0, 2])
    expect(order(sortRows(rows, { column: 'breaks', descending: false }))).toEqual([0, 3, 1, 2])
    expect(order(sortRows(rows, { column: 'qubits', descending: true }))).toEqual([0, 1, 2, 3])
  })

  it('compares couplings by size whatever their sign', () => {
    expect(order(sortRows(rows, { column: 'coupling', descending: true })).slice(0, 2)).toEqual([2, 3])
  })

  it('reads every column', () => {
    expect(valueOf(rows[1]!, 'bound')).toBe(16.4)
    expect(valueOf(rows[0]!, 'strength')).toBeNull()
    expect(valueOf(rows[2]!, 'sum')).toBe(0.93)
  })
})

describe('columns', () => {
  it('shows the columns of the lens that have figures, and lets the least important give way', () => {
    expect(columnsFor(rows, 'breaks', 700).columns).toEqual([
      'variable',
      'qubits',
      'couplers',
      'strength',
      'bound',
      'breaks',
    ])
    expect(columnsFor(rows, 'breaks', 450).columns).toEqual(['variable', 'qubits', 'strength', 'bound', 'breaks'])
    expect(columnsFor(rows, 'breaks', 400).columns).toEqual(['variable', 'qubits', 'bound', 'breaks'])
    expect(columnsFor(rows.slice(2), 'load', 700).columns).toEqual([
      'variable',
      'qubits',
      'couplers',
      'field',
      'coupling',
      'sum',
    ])
  })

  it('finds room for bars beside lengths in the occupancy lens alone', () => {
    expect(columnsFor(rows, 'occupancy', 700).hasBar).toBe(true)
    expect(columnsFor(rows, 'occupancy', 400).hasBar).toBe(false)
    expect(columnsFor(rows, 'breaks', 700).hasBar).toBe(false)
  })

  it('gives one track for each column', () => {
    const { columns, template } = columnsFor(rows, 'occupancy', 500)
    expect(template.match(/minmax/g)).toHaveLength(columns.length)
  })

  it('turns round the sorting of a column pressed twice', () => {
    const first = nextSort({ column: 'breaks', descending: true }, 'qubits')
    expect(first).toEqual({ column: 'qubits', descending: true })
    expect(nextSort(first, 'qubits')).toEqual({ column: 'qubits', descending: false })
    expect(nextSort(first, 'variable')).toEqual({ column: 'variable', descending: false })
  })
})

describe('filtering', () => {
  const by = (part: Partial<LedgerFilter>): LedgerFilter => ({ ...NO_FILTER, ...part })

  it('matches text anywhere in the label, in any case', () => {
    expect(order(filterRows(rows, by({ text: 'DUN' }), 'occupancy'))).toEqual([0, 1])
    expect(order(filterRows(rows, NO_FILTER, 'occupancy'))).toEqual([0, 1, 2, 3])
  })

  it('compares break rates, loads in their lens, and lengths', () => {
    expect(order(filterRows(rows, by({ text: '> 5 %' }), 'breaks'))).toEqual([1])
    expect(order(filterRows(rows, by({ text: '>=5%' }), 'occupancy'))).toEqual([1, 3])
    expect(order(filterRows(rows, by({ text: '> 90 %' }), 'load'))).toEqual([2])
    expect(order(filterRows(rows, by({ text: '> 3' }), 'breaks'))).toEqual([0])
  })

  it('takes several terms together', () => {
    expect(order(filterRows(rows, by({ text: 'dun, < 10 %' }), 'breaks'))).toEqual([0])
    expect(order(filterRows(rows, by({ text: 'dun', most: 3 }), 'breaks'))).toEqual([1])
  })

  it('keeps to lengths, both ends included', () => {
    expect(order(filterRows(rows, by({ least: 4 }), 'occupancy'))).toEqual([0])
    expect(order(filterRows(rows, by({ least: 3, most: 3 }), 'occupancy'))).toEqual([1, 2, 3])
  })

  it('shows chains of one condition alone', () => {
    expect(order(filterRows(rows, by({ only: 'selected' }), 'occupancy', new Set([2, 3])))).toEqual([2, 3])
    expect(order(filterRows(rows, by({ only: 'broken' }), 'breaks'))).toEqual([0, 1, 3])
    expect(order(filterRows(rows, by({ only: 'full' }), 'load'))).toEqual([2])
    expect(order(filterRows(rows, by({ only: 'under-bound' }), 'occupancy'))).toEqual([1])
    const conflicted = [...rows, row(4, 'tea', { conflict: 'qubit 7 is wanted by sal, x' })]
    expect(order(filterRows(conflicted, by({ only: 'conflicted' }), 'occupancy'))).toEqual([4])
  })

  it('offers the conditions of the lens that some chain meets', () => {
    expect(onlyChoices(rows, 'breaks', new Set([1]))).toEqual([
      { only: 'selected', count: 1 },
      { only: 'broken', count: 3 },
      { only: 'under-bound', count: 1 },
    ])
    expect(onlyChoices(rows, 'load', new Set())).toEqual([{ only: 'full', count: 1 }])
  })

  it('tells whether anything is hidden', () => {
    expect(isFiltering(NO_FILTER)).toBe(false)
    for (const part of [{ text: 'a' }, { least: 0 }, { most: 3 }, { only: 'broken' as const }])
      expect(isFiltering(by(part))).toBe(true)
    expect(isFiltering(by({ text: '  ' }))).toBe(false)
  })
})

describe('sums', () => {
  it('adds up qubits, and pools breaks over all chain reads', () => {
    expect(sumsOf(rows)).toEqual({
      chains: 4,
      qubits: 14,
      meanLength: 3.5,
      longest: 5,
      couplers: 36,
      breakRate: 230 / 3000,
      fullest: 0.93,
    })
    expect(sumsOf([])).toMatchObject({ chains: 0, qubits: 0, meanLength: null, breakRate: null, fullest: null })
  })
})

describe('figures', () => {
  it('writes shares, ranges and sizes as the ledger does', () => {
    expect([0, 0.008, 0.069, 0.0994, 0.1, 0.63].map(percent)).toEqual(['0', '0.8', '6.9', '9.9', '10', '63'])
    expect(percentRange(0.12, 0.17)).toBe('12–17')
    expect(percentRange(0.005, 0.018)).toBe('0.5–1.8')
    expect(decimal(-1, 2)).toBe('−1.00')
    expect([11, 1, 0.0834, 0].map(strengthText)).toEqual(['11.0', '1.0', '0.0834', '0.0'])
  })

  it('cautions when the bound is above the strength', () => {
    expect(rows.map(isUnderBound)).toEqual([false, true, false, false])
  })

  it('writes CSV with units in the headings, quoted labels and empty fields', () => {
    const lines = rowsToCsv(rows).split('\n')
    expect(lines[0]).toMatch(/^variable,chain length \(qubits\),couplers to other chains \(count\),/)
    expect(lines[0]!.split(',')).toHaveLength(14)
    expect(lines[2]).toBe('dun.2,3,9,11,16.4,1,0.14,0.07,0.28,140,1000,,,')
    expect(lines[4]).toMatch(/^"sal, x",3,9,/)
    expect(lines.at(-1)).toBe('')
  })

  it('leaves out columns without a value, and sets apart by tabs for the clipboard', () => {
    expect(rowsToCsv([row(0, 'a')])).toBe('variable,chain length (qubits),couplers to other chains (count)\na,3,9\n')
    expect(rowsToTabs(rows).split('\n')[4]).toMatch(/^sal, x\t3\t9\t/)
    expect(rowsToCsv([row(0, 'say "x"')]).split('\n')[1]).toBe('"say ""x""",3,9')
  })
})
