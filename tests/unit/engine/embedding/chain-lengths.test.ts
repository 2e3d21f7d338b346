import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { MeasuredPoint } from '../../../../shared/engine/embedding/chain-lengths'
import {
  CHAIN_LENGTH_GRID,
  expectedLongestChain,
  median,
  sizesAt,
} from '../../../../shared/engine/embedding/chain-lengths'

const point = (variables: number, density: number, length: number | null): MeasuredPoint => ({
  variables,
  density,
  found: length === null ? 0 : 3,
  longestChain: length === null ? null : { median: length, least: length - 1, most: length + 2 },
})

const POINTS = [
  point(10, 0.5, 4),
  point(40, 0.5, 16),
  point(80, 0.5, null),
  point(10, 1, 6),
  point(20, 1, 10),
  point(40, 1, null),
]

describe('expectedLongestChain', () => {
  it('gives what was measured at measured points', () => {
    for (const { variables, density, longestChain } of POINTS)
      if (longestChain) expect(expectedLongestChain(POINTS, variables, density).value).toEqual(longestChain)
  })

  it('lies evenly in log n, then evenly in density', () => {
    expect(expectedLongestChain(POINTS, 20, 0.5).value).toEqual({ median: 10, least: 9, most: 12 })
    // Half-way between 4 and 6 at ten variables, between 10 and 10 at twenty.
    expect(expectedLongestChain(POINTS, 10, 0.75).value!.median).toBeCloseTo(5, 12)
    expect(expectedLongestChain(POINTS, 20, 0.75).value!.median).toBeCloseTo(10, 12)
  })

  it('refuses what was not measured or not found, and says what was', () => {
    expect(expectedLongestChain(POINTS, 41, 0.5).refusal).toMatch(/from 10 to 40 variables/)
    expect(expectedLongestChain(POINTS, 9, 0.5).refusal).toMatch(/from 10 to 40 variables/)
    expect(expectedLongestChain(POINTS, 30, 0.75).refusal).toMatch(/at density 100\s% .* from 10 to 20 variables/)
    expect(expectedLongestChain(POINTS, 10, 0.4).refusal).toMatch(/from 50\s% to 100\s%/)
    expect(expectedLongestChain([point(10, 1, null)], 10, 1).refusal).toMatch(/no embedding was found/)
    expect(expectedLongestChain([], 10, 1).refusal).toBe('nothing was measured')
    expect(expectedLongestChain(POINTS, 10, NaN).value).toBeNull()
  })

  it('never leaves the range of the four points around', () => {
    const size = fc.double({ min: 10, max: 20, noNaN: true })
    fc.assert(
      fc.property(size, fc.double({ min: 0.5, max: 1, noNaN: true }), (n, density) => {
        const { value } = expectedLongestChain(POINTS, n, density)
        expect(value!.median).toBeGreaterThanOrEqual(4 - 1e-9)
        expect(value!.median).toBeLessThanOrEqual(10 + 1e-9)
        expect(value!.least).toBeLessThanOrEqual(value!.median)
        expect(value!.most).toBeGreaterThanOrEqual(value!.median)
      }),
    )
  })
})

describe('sizesAt', () => {
  it.each([16, 680, 5640, 100_000])('climbs from half the square root to the machine itself (%d qubits)', (qubits) => {
    const sizes = sizesAt(1, qubits)
    expect(sizes[0]).toBe(Math.max(4, Math.round(Math.sqrt(qubits) / 2)))
    expect(sizes.at(-1)).toBeLessThanOrEqual(qubits)
    expect(sizes.at(-1)! * CHAIN_LENGTH_GRID.step).toBeGreaterThan(qubits - 1)
    expect(new Set(sizes).size).toBe(sizes.length)
    for (const n of sizesAt(0.05, qubits)) expect(0.05 * (n - 1)).toBeGreaterThanOrEqual(CHAIN_LENGTH_GRID.leastDegree)
  })
})

describe('median', () => {
  it('is the middle, or the mean of the two in the middle', () => {
    expect(median([3, 1, 2])).toBe(2)
    expect(median([4, 1, 3, 2])).toBe(2.5)
  })
})
