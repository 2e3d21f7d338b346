import { describe, expect, it } from 'vitest'
import { countDistinct, histogram } from '../../../../shared/engine/problem/histogram'
import { createRandom } from '../../../../shared/engine/random'

describe('histogram', () => {
  it('gives few distinct values a bin each', () => {
    expect(histogram([1, -1, 1, 0.5], 24)).toEqual([
      { from: -1, to: -1, count: 1 },
      { from: 0.5, to: 0.5, count: 1 },
      { from: 1, to: 1, count: 2 },
    ])
    expect(histogram([], 24)).toEqual([])
  })

  it('puts many values into bins of equal width, each where its edges say', () => {
    const random = createRandom(12)
    const values = Array.from({ length: 500 }, (_, k) => (k % 5 === 0 ? k / 10 : random.normal() * 20))
    const bins = histogram(values, 24)
    expect(bins).toHaveLength(24)
    expect(bins[0]!.from).toBe(Math.min(...values))
    expect(bins[23]!.to).toBe(Math.max(...values))
    bins.forEach(({ from, to, count }, b) => {
      const isLast = b === 23
      expect(count).toBe(values.filter((value) => value >= from && (isLast ? value <= to : value < to)).length)
      expect(isLast || bins[b + 1]!.from === to).toBe(true)
      expect(to - from).toBeCloseTo((bins[23]!.to - bins[0]!.from) / 24, 9)
    })
  })

  it('puts values on an edge and just below it on its two sides, in spite of rounding', () => {
    const random = createRandom(13)
    for (let trial = 0; trial < 200; trial++) {
      const least = 1 + random.float()
      const greatest = 40 + 10 * random.float()
      const within = Array.from({ length: 40 }, (_, k) => 3 + k / 64)
      const edges = histogram([least, greatest, ...within], 24).map((bin) => bin.from)
      const justBelow = edges.slice(1).map((edge) => edge * (1 - 2 ** -53))
      const bins = histogram([...edges, ...justBelow, greatest], 24)
      expect(bins.map((bin) => bin.from)).toEqual(edges)
      expect(bins.map((bin) => bin.count)).toEqual(new Array<number>(24).fill(2))
    }
  })
})

describe('countDistinct', () => {
  it('counts in ascending order, up to a limit', () => {
    expect(countDistinct([3, 1, 3])).toEqual([
      { value: 1, count: 1 },
      { value: 3, count: 2 },
    ])
    expect(countDistinct([3, 1, 2], 2)).toBeNull()
  })
})
