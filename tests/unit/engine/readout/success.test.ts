import { describe, expect, it } from 'vitest'
import { reaches, successWithin } from '../../../../shared/engine/readout/success'

const given = {
  energies: Float64Array.of(-5, -4, -4.5, NaN, -5 + 1e-12),
  counts: Uint32Array.of(3, 10, 2, 4, 1),
  reference: -5,
  tolerance: 1e-9,
}

describe('successWithin', () => {
  it('counts reads that reach the reference within the gap, dropped ones among the trials', () => {
    expect(successWithin({ ...given, gap: 0 })).toMatchObject({ successes: 4, trials: 20, p: 0.2 })
    expect(successWithin({ ...given, gap: 0.5 })).toMatchObject({ successes: 6, trials: 20 })
    expect(successWithin({ ...given, gap: 1 })).toMatchObject({ successes: 16, trials: 20 })
    expect([...reaches({ ...given, gap: 0.5 })]).toEqual([1, 0, 1, 0, 1])
  })

  it('turns p and its interval into R99', () => {
    const { r99, r99Interval, low, high } = successWithin({ ...given, gap: 0 })
    const worked = (p: number): number => Math.log(0.01) / Math.log(1 - p)
    expect(r99).toBeCloseTo(worked(0.2), 10)
    expect(r99Interval.low).toBeCloseTo(worked(high), 10)
    expect(r99Interval.high).toBeCloseTo(worked(low), 10)
  })

  it('needs endless reads where none succeeded', () => {
    expect(successWithin({ ...given, reference: -9, gap: 0 })).toMatchObject({ p: 0, low: 0, r99: Infinity })
  })

  it('refuses a negative gap', () => {
    expect(() => successWithin({ ...given, gap: -1 })).toThrow(/gap/)
    expect(() => successWithin({ ...given, gap: NaN })).toThrow(/gap/)
  })
})
