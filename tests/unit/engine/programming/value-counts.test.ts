import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { binsOver, valueCounts } from '../../../../shared/engine/programming/value-counts'

describe('binsOver', () => {
  it('puts an edge at 0 in asymmetric ranges', () => {
    for (const range of [
      [-2, 1],
      [-4, 4],
      [-18, 15],
      [-1, 0.6],
      [0, 3],
    ] as const) {
      const bins = binsOver(range)
      const below = (-range[0] * bins) / (range[1] - range[0])
      expect(Math.abs(below - Math.round(below))).toBeLessThan(1e-8)
      expect(bins).toBeGreaterThanOrEqual(48)
      expect(bins).toBeLessThanOrEqual(96)
    }
  })

  it('takes the most there may be where no number of bins does', () => {
    expect(binsOver([-1, Math.PI])).toBe(96)
  })
})

describe('valueCounts', () => {
  it('gives each bin its lower edge, the last both, also where rounding blurs an edge', () => {
    expect(valueCounts([-2, -1, -0.001, 0, 0.999, 1], [-2, 1], 3)).toEqual([1, 2, 3])
    expect(valueCounts([0.1, 0.2, 0.3, 0.6, 0.7], [0, 1], 10)).toEqual([0, 1, 1, 1, 0, 0, 1, 1, 0, 0])
  })

  it('counts every value once, as a comparison with the edges does', () => {
    const values = fc.array(fc.integer({ min: -200, max: 100 }), { maxLength: 60 })
    fc.assert(
      fc.property(values, (hundredths) => {
        // A bin is 3 hundredths wide: edges are whole numbers of hundredths.
        const counts = valueCounts(
          hundredths.map((value) => value / 100),
          [-2, 1],
          100,
        )
        const slow = Array.from(
          { length: 100 },
          (_, bin) =>
            hundredths.filter((value) => value >= 3 * bin - 200 && (value < 3 * bin - 197 || bin === 99)).length,
        )
        expect(counts).toEqual(slow)
      }),
      { seed: 3 },
    )
  })

  it('refuses values outside, and ranges without width', () => {
    expect(() => valueCounts([1.01], [-1, 1])).toThrow(/outside/)
    expect(() => valueCounts([Number.NaN], [-1, 1])).toThrow(/outside/)
    expect(() => valueCounts([], [0, 0], 4)).toThrow(/no bins/)
  })
})
