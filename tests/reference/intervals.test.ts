import { describe, expect, it } from 'vitest'
import { readsForConfidence, wilson } from '../../shared/engine/readout/intervals'

describe('Wilson interval', () => {
  // Newcombe, Two-sided confidence intervals for the single proportion, Statistics in Medicine 17:857 (1998), table of worked
  // examples, method 3 (score, no continuity correction), 95 %. The four digits are from memory.
  it.each([
    [81, 263, 0.2553, 0.3662],
    [15, 148, 0.0624, 0.1605],
    [0, 20, 0, 0.1611],
    [1, 29, 0.0061, 0.1718],
  ])('agrees with the published %i / %i', (successes, trials, low, high) => {
    const interval = wilson(successes, trials)
    expect(interval.low).toBeCloseTo(low, 4)
    expect(interval.high).toBeCloseTo(high, 4)
  })

  // Wilson, JASA 22:209 (1927): the interval is where the score test does not reject. Its coverage, summed over the binomial
  // distribution, is near 95 % on average over p (Brown, Cai & DasGupta, Statistical Science 16:101, 2001: mean coverage
  // close to nominal already at n = 50).
  it('covers about 95 % on average over p', () => {
    const trials = 50
    const intervals = Array.from({ length: trials + 1 }, (_, k) => wilson(k, trials))
    let covered = 0
    const steps = 400
    for (let step = 1; step < steps; step++) {
      const p = step / steps
      let probability = (1 - p) ** trials
      for (let k = 0; k <= trials; k++) {
        if (intervals[k]!.low <= p && p <= intervals[k]!.high) covered += probability
        probability *= (((trials - k) / (k + 1)) * p) / (1 - p)
      }
    }
    expect(covered / (steps - 1)).toBeGreaterThan(0.945)
    expect(covered / (steps - 1)).toBeLessThan(0.96)
  })
})

describe('R99', () => {
  // Definition of Rønnow et al., Defining and detecting quantum speedup, Science 345:420 (2014): R = ln(1 − 0.99) / ln(1 − p).
  // Values by hand: log10 form 2 / −log10(1 − p).
  it.each([
    [0.9, 2],
    [0.5, 6.643856189774724],
    [0.1, 43.70869],
    [0.01, 458.21],
  ])('of p = %d is %d', (p, reads) => {
    expect(readsForConfidence(p) / reads).toBeCloseTo(1, 5)
  })
})
