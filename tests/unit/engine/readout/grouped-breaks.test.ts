import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import { groupedBreaks } from '../../../../shared/engine/readout/grouped-breaks'

describe('groupedBreaks', () => {
  it('makes one group a value where there are few', () => {
    const groups = groupedBreaks([3, 2, 3, 5], [10, 0, 20, 7], 100)
    expect(groups).toMatchObject([
      { from: 2, to: 2, chains: 1, breaks: 0, chainReads: 100, rate: 0, low: 0 },
      { from: 3, to: 3, chains: 2, breaks: 30, chainReads: 200, rate: 0.15 },
      { from: 5, to: 5, chains: 1, breaks: 7, chainReads: 100, rate: 0.07 },
    ])
    // Wilson's formula by hand for 30 of 200: (30 + z²/2 ± z·√(30·170/200 + z²/4)) / (200 + z²), z² = 3.841459.
    expect(groups[1]!.low).toBeCloseTo(0.1071, 4)
    expect(groups[1]!.high).toBeCloseTo(0.2061, 4)
  })

  it('makes quantile groups of many values', () => {
    const groups = groupedBreaks(
      Array.from({ length: 40 }, (_, k) => k / 2),
      new Uint32Array(40).fill(1),
      10,
      4,
    )
    expect(groups.map(({ from, to, chains, mean }) => [from, to, chains, mean])).toEqual([
      [0, 4.5, 10, 2.25],
      [5, 9.5, 10, 7.25],
      [10, 14.5, 10, 12.25],
      [15, 19.5, 10, 17.25],
    ])
  })

  it('parts no equal values, loses no chain and keeps to the order', () => {
    const chains = fc.array(fc.tuple(fc.integer({ min: -20, max: 20 }), fc.integer({ min: 0, max: 9 })), {
      maxLength: 120,
    })
    fc.assert(
      fc.property(chains, fc.integer({ min: 1, max: 6 }), (given, most) => {
        const groups = groupedBreaks(
          given.map(([value]) => value),
          given.map(([, count]) => count),
          9,
          most,
        )
        expect(groups.length).toBeLessThanOrEqual(most)
        groups.forEach(({ from, to, chains: held, breaks, mean }, g) => {
          const within = given.filter(([value]) => value >= from && value <= to)
          expect(held).toBe(within.length)
          expect(breaks).toBe(within.reduce((sum, [, count]) => sum + count, 0))
          expect(mean).toBeCloseTo(within.reduce((sum, [value]) => sum + value, 0) / held, 9)
          if (g > 0) expect(from).toBeGreaterThan(groups[g - 1]!.to)
        })
        expect(groups.reduce((sum, group) => sum + group.chains, 0)).toBe(given.length)
      }),
    )
  })

  it('has no group without chains and no rate without reads', () => {
    expect(groupedBreaks([], [], 10)).toEqual([])
    expect(groupedBreaks([2], [0], 0)).toMatchObject([{ rate: 0, low: 0, high: 1 }])
    expect(() => groupedBreaks([2], [], 1)).toThrow(RangeError)
  })
})
