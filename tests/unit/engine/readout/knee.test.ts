import { describe, expect, it } from 'vitest'
import { kneeOf } from '../../../../shared/engine/readout/knee'
import { meanOf } from '../../../../shared/engine/readout/mean'

describe('a mean with its standard error', () => {
  it('weighs values by their counts', () => {
    // 1, 1, 1, 5: mean 2, squares 1 + 1 + 1 + 9 = 12, √(12 / 3 / 4) = 1.
    expect(meanOf([1, 5], [3, 1])).toEqual({ mean: 2, standardError: 1 })
    expect(meanOf([7], [1])).toEqual({ mean: 7, standardError: 0 })
  })

  it('needs a read, and a count for each value', () => {
    expect(() => meanOf([], [])).toThrow(/no read/)
    expect(() => meanOf([1], [0])).toThrow(/no read/)
    expect(() => meanOf([1, 2], [1])).toThrow(/1 counts for 2 values/)
  })
})

describe('the knee of a scan', () => {
  const knee = (...means: [mean: number, standardError?: number][]) =>
    kneeOf(means.map(([mean, standardError = 0.1], k) => ({ strength: k + 1, mean, standardError })))

  it('is the weakest strength as good as the best, within two standard errors of the difference', () => {
    expect(knee([9], [4], [1.2], [1], [1.1], [1.3])).toEqual({ index: 2, best: 3, edge: null })
    // 2 √(0.1² + 0.1²) = 0.283
    expect(knee([9], [1.29], [1], [2])).toEqual({ index: 2, best: 2, edge: null })
    expect(knee([9], [1.28], [1], [2])).toEqual({ index: 1, best: 2, edge: null })
  })

  it('does not reach past a strength that is worse', () => {
    expect(knee([1.1], [3], [1], [1.2])).toEqual({ index: 2, best: 2, edge: null })
  })

  it('says when it lies at an end', () => {
    expect(knee([1], [1.1], [2])).toEqual({ index: 0, best: 0, edge: 'weakest' })
    expect(knee([5], [3], [1])).toEqual({ index: 2, best: 2, edge: 'strongest' })
    expect(knee([5], [1.1], [1])).toEqual({ index: 1, best: 2, edge: null })
  })

  it('needs two points', () => {
    expect(knee([1])).toBeNull()
    expect(kneeOf([])).toBeNull()
  })
})
