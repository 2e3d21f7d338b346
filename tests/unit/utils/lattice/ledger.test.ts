import { describe, expect, it } from 'vitest'
import { decimal, percent, percentRange, strengthText } from '../../../../utils/lattice/figures'
import { filterRows, isUnderBound, rowsToCsv, sortRows, valueOf } from '../../../../utils/lattice/ledger'
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

describe('filtering', () => {
  it('matches text anywhere in the label, in any case', () => {
    expect(order(filterRows(rows, 'DUN', 'occupancy'))).toEqual([0, 1])
    expect(order(filterRows(rows, '', 'occupancy'))).toEqual([0, 1, 2, 3])
  })

  it('compares break rates, loads in their lens, and lengths', () => {
    expect(order(filterRows(rows, '> 5 %', 'breaks'))).toEqual([1])
    expect(order(filterRows(rows, '>=5%', 'occupancy'))).toEqual([1, 3])
    expect(order(filterRows(rows, '> 90 %', 'load'))).toEqual([2])
    expect(order(filterRows(rows, '> 3', 'breaks'))).toEqual([0])
  })

  it('takes several terms together', () => {
    expect(order(filterRows(rows, 'dun, < 10 %', 'breaks'))).toEqual([0])
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

  it('writes CSV with quoted labels and empty fields', () => {
    const lines = rowsToCsv(rows).split('\n')
    expect(lines[0]!.split(',')).toHaveLength(14)
    expect(lines[2]).toBe('dun.2,3,9,11,16.4,1,0.14,0.07,0.28,140,1000,,,')
    expect(lines[4]).toMatch(/^"sal, x",3,9,/)
  })
})
