import { describe, expect, it } from 'vitest'
import {
  commonUnit,
  isExact,
  toInteger,
  toNumber,
  toNumberBelow,
} from '../../../../../shared/engine/problem/presolve/dyadic'
import { createRandom } from '../../../../../shared/engine/random'

const EDGES = [0, 1, -1, 0.1, -0.3, 1e300, -1e-300, 5e-324, -5e-324, Number.MAX_VALUE, 2 ** -1022, 2 ** 53 + 2, 1 / 3]

describe('doubles as integers', () => {
  it('come back to the last bit, in units of any common power of two', () => {
    const random = createRandom(41)
    const drawn = Array.from({ length: 300 }, () => random.normal() * 2 ** (random.below(400) - 200))
    for (const values of [EDGES, drawn, [3, -7, 0, 12], [0.5, 0.25]]) {
      const unit = commonUnit([values])
      for (const value of values) {
        expect(toNumber(toInteger(value, unit), unit)).toBe(value)
        expect(isExact(toInteger(value, unit), unit)).toBe(true)
        expect(toNumberBelow(toInteger(value, unit), unit)).toBe(value)
      }
    }
    expect(commonUnit([[3, -7, 0]])).toBe(0)
    expect(commonUnit([[0.5], [0.375]])).toBe(-3)
    expect(commonUnit([[5e-324, 1]])).toBe(-1074)
  })

  it('round to the nearest, ties to even, as the language rounds integers', () => {
    const random = createRandom(42)
    for (let trial = 0; trial < 500; trial++) {
      const integer = (BigInt(random.uint32()) << 70n) + BigInt(random.uint32()) * BigInt(random.below(3))
      const signed = trial % 2 === 0 ? integer : -integer
      expect(toNumber(signed, 0)).toBe(Number(signed))
      expect(toNumber(signed, -40)).toBe(Number(signed) * 2 ** -40)
      const below = toNumberBelow(signed, 0)
      expect(BigInt(below) <= signed).toBe(true)
      expect(isExact(signed, 0)).toBe(BigInt(Number(signed)) === signed)
      // The next double above is larger than the integer.
      expect(BigInt(below) + (1n << 53n) > signed).toBe(true)
    }
    expect(toNumber(2n ** 53n + 1n, 0)).toBe(2 ** 53)
    expect(toNumber((2n ** 53n + 1n) * 2n ** 200n + 1n, -200)).toBe(2 ** 53 + 2)
    expect(toNumberBelow(2n ** 53n + 3n, 0)).toBe(2 ** 53 + 2)
    expect(toNumberBelow(-(2n ** 53n) - 1n, 0)).toBe(-(2 ** 53) - 2)
    expect(toNumberBelow(-1n, -1076)).toBe(-5e-324)
    expect(toNumberBelow(1n, -1076)).toBe(0)
  })

  it('refuse what is beyond the doubles', () => {
    expect(() => toNumber(2n ** 1024n, 0)).toThrow(RangeError)
    expect(toNumber(2n ** 1024n, -3)).toBe(2 ** 1021)
    expect(toNumber(-(2n ** 1100n), -200)).toBe(-(2 ** 900))
  })
})
