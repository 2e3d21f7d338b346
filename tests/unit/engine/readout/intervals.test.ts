import { describe, expect, it } from 'vitest'
import {
  readsForConfidence,
  readsForConfidenceInterval,
  successProbability,
  timeToSolution,
  wilson,
} from '../../../../shared/engine/readout/intervals'

describe('wilson', () => {
  it('ends where the score test just rejects', () => {
    for (const [successes, trials] of [
      [3, 10],
      [1, 1000],
      [999, 1000],
      [50, 100],
    ] as const) {
      const { low, high } = wilson(successes, trials, 1.7)
      for (const p of [low, high])
        expect(Math.abs(successes / trials - p) / Math.sqrt((p * (1 - p)) / trials)).toBeCloseTo(1.7, 8)
    }
  })

  it('stays in 0 … 1 at the ends', () => {
    expect(wilson(0, 10).low).toBe(0)
    expect(wilson(10, 10).high).toBe(1)
    expect(wilson(0, 0)).toEqual({ low: 0, high: 1 })
    expect(() => wilson(3, 2)).toThrow(RangeError)
    expect(() => wilson(-1, 2)).toThrow(RangeError)
    expect(() => wilson(1, 2, -1)).toThrow(RangeError)
  })
})

describe('reads for a confidence', () => {
  it('follow ln(1 − c) / ln(1 − p)', () => {
    // p = 0.9: 0.1² = 0.01; p = 0.99: one read; p = 0.5 for 7/8: three reads.
    expect(readsForConfidence(0.9)).toBeCloseTo(2, 12)
    expect(readsForConfidence(0.99)).toBeCloseTo(1, 12)
    expect(readsForConfidence(0.5, 0.875)).toBeCloseTo(3, 12)
    expect(readsForConfidence(1e-12)).toBeCloseTo(4.605170185988e12, -3)
    expect(readsForConfidence(0)).toBe(Infinity)
    expect(readsForConfidence(1)).toBe(1)
    expect(readsForConfidence(0.999)).toBe(1)
    expect(() => readsForConfidence(1.1)).toThrow(RangeError)
    expect(() => readsForConfidence(0.5, 1)).toThrow(RangeError)
  })

  it('carry the interval over, ends swapped', () => {
    const success = successProbability(9, 10)
    expect(success.p).toBe(0.9)
    expect(readsForConfidenceInterval({ low: 0.5, high: 0.9 }).low).toBeCloseTo(2, 12)
    expect(readsForConfidenceInterval({ low: 0, high: 0.9 }).high).toBe(Infinity)
    const time = timeToSolution(success, 50)
    expect(time.time).toBeCloseTo(100, 9)
    expect(time.low).toBeLessThan(100)
    expect(time.high).toBeGreaterThan(100)
    expect(successProbability(0, 0)).toMatchObject({ p: 0, low: 0, high: 1 })
  })
})
