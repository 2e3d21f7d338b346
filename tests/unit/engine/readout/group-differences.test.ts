import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import { homogeneity, rankStatistic } from '../../../../shared/engine/readout/group-differences'

describe('homogeneity', () => {
  it('is the shortcut formula of a table of two groups', () => {
    // N(ad − bc)² / (rows and columns multiplied).
    const [a, b, c, d] = [12, 88, 30, 70]
    const shortcut = (200 * (a * d - b * c) ** 2) / ((a + b) * (c + d) * (a + c) * (b + d))
    expect(homogeneity([a, c], [a + b, c + d])).toMatchObject({ degrees: 1, isReliable: true })
    expect(homogeneity([a, c], [a + b, c + d])!.statistic).toBeCloseTo(shortcut, 10)
  })

  it('is the variance of the rates over p(1 − p)/n for groups of one size', () => {
    const events = [3, 9, 14, 6]
    const p = 32 / 160
    const spread = events.reduce((sum, x) => sum + (x / 40 - p) ** 2, 0)
    expect(homogeneity(events, [40, 40, 40, 40])!.statistic).toBeCloseTo((spread * 40) / (p * (1 - p)), 10)
  })

  it('leaves groups without trials out and says where counts are too small', () => {
    expect(homogeneity([5, 0, 9], [20, 0, 20])).toMatchObject({ degrees: 1 })
    expect(homogeneity([1, 0], [10, 10])).toMatchObject({ isReliable: false })
  })

  it('has nothing to compare in one group, or where all reads are alike', () => {
    expect(homogeneity([3], [9])).toBeNull()
    expect(homogeneity([0, 0], [9, 9])).toBeNull()
    expect(homogeneity([9, 9], [9, 9])).toBeNull()
    expect(() => homogeneity([4], [3])).toThrow(RangeError)
    expect(() => homogeneity([4], [])).toThrow(RangeError)
  })
})

/** H from the spread of mean ranks over the variance of all ranks: the definition, ranks by counting. */
function slowly(values: number[], group: number[], groups: number): number {
  const ranks = values.map((v) => values.filter((o) => o < v).length + (values.filter((o) => o === v).length + 1) / 2)
  const n = values.length
  const middle = (n + 1) / 2
  const variance = ranks.reduce((sum, rank) => sum + (rank - middle) ** 2, 0) / (n - 1)
  let between = 0
  for (let g = 0; g < groups; g++) {
    const own = ranks.filter((_, k) => group[k] === g)
    if (own.length > 0) between += own.length * (own.reduce((a, b) => a + b, 0) / own.length - middle) ** 2
  }
  return between / variance
}

describe('rankStatistic', () => {
  it('is the spread of mean ranks over the variance of ranks, ties included, counts as repeats', () => {
    const rows = fc.array(
      fc.tuple(fc.integer({ min: 0, max: 6 }), fc.integer({ min: 1, max: 3 }), fc.integer({ min: 0, max: 2 })),
      { minLength: 4, maxLength: 30 },
    )
    fc.assert(
      fc.property(rows, (given) => {
        const long = given.flatMap(([value, count, g]) => Array.from({ length: count }, () => [value, g] as const))
        const found = rankStatistic(
          Float64Array.from(given, ([value]) => value),
          Uint32Array.from(given, ([, count]) => count),
          given.map(([, , g]) => g),
          3,
        )
        const [values, group] = [long.map(([value]) => value), long.map(([, g]) => g)]
        if (new Set(values).size === 1 || new Set(group).size === 1) expect(found).toBeNull()
        else expect(found!.statistic).toBeCloseTo(slowly(values, group, 3), 8)
      }),
    )
  })

  it('leaves values that are none out', () => {
    const counts = new Uint32Array(5).fill(4)
    const found = rankStatistic(Float64Array.of(1, 2, NaN, 3, 4), counts, [0, 0, 1, 2, 2], 3)
    expect(found).toMatchObject({ degrees: 1, isReliable: true })
  })
})
