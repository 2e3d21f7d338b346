import { describe, expect, it } from 'vitest'
import { THIN_SPACE } from '../../../../utils/format'
import { cellAfter, cellAt, cellTable, cellWords, darknessOf, filledShare } from '../../../../utils/problem/sparsity'
import type { SparsityPicture } from '../../../../utils/problem/sparsity'

const meta = {
  form: 'qubo' as const,
  order: 'given' as const,
  bandwidth: 2,
  givenBandwidth: 2,
  distances: [],
  fingerprint: '',
  seconds: 0,
  version: '',
}
/** a – b with 4, a – c with −8, field 2 at b. */
const small: SparsityPicture = {
  ...meta,
  variables: 3,
  interactions: 2,
  bins: 3,
  labels: ['a', 'b', 'c'],
  counts: Uint8Array.of(0, 1, 1, 0, 0, 0),
  rows: Uint8Array.of(0, 2),
  cols: Uint8Array.of(1, 0),
  values: Float64Array.of(4, -8),
  linear: Float64Array.of(0, 2, 0),
}
/** Six variables in two bins: two interactions within the first, three across. */
const large: SparsityPicture = {
  ...meta,
  variables: 6,
  interactions: 5,
  bins: 2,
  labels: null,
  counts: Uint8Array.of(2, 3, 0),
}

describe('the sparsity picture', () => {
  it('reads cells of a small problem out, on both sides of the diagonal', () => {
    const table = cellTable(small)
    expect(cellWords(small, table, { row: 0, col: 1 })).toBe('a, b: b = 4')
    expect(cellWords(small, table, { row: 2, col: 0 })).toBe('c, a: b = −8')
    expect(cellWords(small, table, { row: 1, col: 2 })).toBe('b, c: no interaction')
    expect(cellWords(small, table, { row: 1, col: 1 })).toBe('b: a = 2')
  })

  it('reads bins of a large one as shares of their pairs', () => {
    expect(cellTable(large)).toBeNull()
    expect(filledShare(large, { row: 1, col: 0 })).toBeCloseTo(1 / 3)
    expect(cellWords(large, null, { row: 1, col: 0 })).toBe(
      `Places 4–6 with 1–3: 3 of 9 pairs interact, 33.3${THIN_SPACE}%`,
    )
    expect(cellWords(large, null, { row: 0, col: 0 })).toBe(
      `Places 1–3 with 1–3: 2 of 3 pairs interact, 66.7${THIN_SPACE}%`,
    )
  })

  it('shows a single interaction among many, and darker where there are more', () => {
    expect(darknessOf(0)).toBe(0)
    expect(darknessOf(1e-4)).toBeGreaterThan(0.2)
    expect(darknessOf(0.5)).toBeGreaterThan(darknessOf(0.1))
    expect(darknessOf(1)).toBe(1)
  })

  it('finds the cell under a point, none outside', () => {
    expect(cellAt(small, 300, 250, 10)).toEqual({ row: 0, col: 2 })
    expect(cellAt(small, 300, 300, 10)).toBeNull()
  })

  it('is walked by keys, up to its edges', () => {
    expect(cellAfter('ArrowRight', null, 3)).toEqual({ row: 0, col: 0 })
    expect(cellAfter('ArrowRight', { row: 1, col: 1 }, 3)).toEqual({ row: 1, col: 2 })
    expect(cellAfter('ArrowDown', { row: 1, col: 1 }, 3, 10)).toEqual({ row: 2, col: 1 })
    expect(cellAfter('End', null, 3)).toEqual({ row: 2, col: 2 })
    expect(cellAfter('x', null, 3)).toBeNull()
  })
})
