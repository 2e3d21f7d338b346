import { describe, expect, it } from 'vitest'
import { createRandom } from '../../shared/engine/random'
import { adjustedForDiscovery, compareStratified, normalTail } from '../../shared/engine/readout/proportion-tests'

/**
 * Admissions to six departments by sex, 1973 (Bickel, Hammel & O'Connell, Science 187:398, 1975): admitted and rejected
 * men, admitted and rejected women. Figures and the statistic from memory; the statistic is widely printed with them.
 */
const ADMISSIONS = [
  [512, 313, 89, 19],
  [353, 207, 17, 8],
  [120, 205, 202, 391],
  [138, 279, 131, 244],
  [53, 138, 94, 299],
  [22, 351, 24, 317],
] as const

describe('compareStratified', () => {
  it('gives the published statistic of the admissions, 1.4269 on one degree of freedom', () => {
    const strata = ADMISSIONS.map(([a, b, c, d]) => ({ events: a, trials: a + b, otherEvents: c, otherTrials: c + d }))
    const { z } = compareStratified(strata)
    expect(z! ** 2).toBeCloseTo(1.4269, 4)
    expect(2 * normalTail(Math.abs(z!))).toBeCloseTo(0.2323, 4)
  })

  it('is, with one stratum, the plain comparison of two proportions', () => {
    const { ratio, otherRate, z } = compareStratified([{ events: 30, trials: 200, otherEvents: 50, otherTrials: 1000 }])
    expect(ratio).toBeCloseTo(3, 12)
    expect(otherRate).toBeCloseTo(0.05, 12)
    expect(z).toBeGreaterThan(0)
    const mirrored = compareStratified([{ events: 50, trials: 1000, otherEvents: 30, otherTrials: 200 }])
    expect(mirrored.z).toBeCloseTo(-z!, 12)
  })

  it('has the mean and variance of the hypergeometric law, summed over all tables by hand', () => {
    const [trials, otherTrials, hits] = [6, 9, 5]
    const choose = (n: number, k: number): number => (k === 0 ? 1 : (choose(n - 1, k - 1) * n) / k)
    let [mean, square] = [0, 0]
    for (let a = 0; a <= hits; a++) {
      const p = (choose(trials, a) * choose(otherTrials, hits - a)) / choose(trials + otherTrials, hits)
      mean += a * p
      square += a * a * p
    }
    const { z } = compareStratified([{ events: 5, trials, otherEvents: 0, otherTrials }])
    expect(z).toBeCloseTo((5 - mean - 0.5) / Math.sqrt(square - mean * mean), 10)
  })

  it('says nothing where nothing happened', () => {
    expect(compareStratified([{ events: 0, trials: 9, otherEvents: 0, otherTrials: 9 }])).toEqual({
      z: null,
      ratio: null,
      otherRate: 0,
    })
    expect(compareStratified([]).z).toBeNull()
  })
})

describe('normalTail', () => {
  /* Abramowitz & Stegun, tables 26.1 and 26.2, from memory. */
  it.each([
    [0, 0.5],
    [1, 0.158655253931457],
    [1.959963984540054, 0.025],
    [3, 1.349898031630095e-3],
    [5, 2.866515718791939e-7],
    [10, 7.619853024160527e-24],
    [-1, 0.841344746068543],
  ])('of %d is %d', (z, tail) => {
    expect(normalTail(z) / tail).toBeCloseTo(1, 11)
  })

  it('has no step where its two forms meet', () => {
    expect(normalTail(3 - 1e-9) / normalTail(3 + 1e-9)).toBeCloseTo(1, 7)
  })
})

/* The fifteen p-values of Benjamini & Hochberg, JRSS B 57:289 (1995), section 3.2, from memory: four are rejected at 0.05. */
const PUBLISHED = [
  0.0001, 0.0004, 0.0019, 0.0095, 0.0201, 0.0278, 0.0298, 0.0344, 0.0459, 0.324, 0.4262, 0.5719, 0.6528, 0.759, 1,
]

describe('adjustedForDiscovery', () => {
  it('rejects the published four', () => {
    expect([...adjustedForDiscovery(PUBLISHED)].filter((q) => q <= 0.05)).toHaveLength(4)
  })

  it('rejects what the step-up rule rejects, at any rate and in any order', () => {
    const random = createRandom(3)
    for (let round = 0; round < 200; round++) {
      const p = Array.from({ length: 1 + random.below(30) }, () => random.float() ** (1 + random.below(4)))
      const alpha = 0.01 + 0.2 * random.float()
      const sorted = [...p].sort((a, b) => a - b)
      const last = sorted.findLastIndex((value, k) => value <= ((k + 1) * alpha) / p.length)
      const bound = last < 0 ? -1 : sorted[last]!
      const adjusted = adjustedForDiscovery(p)
      p.forEach((value, i) => expect(adjusted[i]! <= alpha).toBe(value <= bound))
    }
  })
})
