import { describe, expect, it } from 'vitest'
import { ExactSum, exactSum } from '../../../../shared/engine/problem/exact-sum'
import { createRandom } from '../../../../shared/engine/random'
import { randomOrder } from '../../../fixtures/problems/random-problem'

/** Multiples of 2⁻³⁰⁰ as big integers: sums are exact, and the one conversion back rounds half to even. */
function sumByBigIntegers(terms: readonly number[]): number {
  let total = 0n
  for (const term of terms) total += BigInt(term * 2 ** 300)
  return Number(total) * 2 ** -300
}

describe('ExactSum', () => {
  it('keeps what plain addition loses', () => {
    expect(exactSum([1e100, 1, -1e100])).toBe(1)
    expect(exactSum([2 ** 53, 1, 1])).toBe(2 ** 53 + 2)
    expect(exactSum([0.1, 0.2, -0.3])).toBe(sumByBigIntegers([0.1, 0.2, -0.3]))
  })

  it('rounds once, half to even, looking below the half', () => {
    expect(exactSum([1, 2 ** -53])).toBe(1)
    expect(exactSum([1, 2 ** -53, 2 ** -140])).toBe(1 + 2 ** -52)
    expect(exactSum([1, 2 ** -53, -(2 ** -140)])).toBe(1)
    expect(exactSum([1 + 2 ** -52, 2 ** -53])).toBe(1 + 2 ** -51)
    expect(exactSum([-1, -(2 ** -53), -(2 ** -140)])).toBe(-1 - 2 ** -52)
  })

  it('gives zero, never −0, for nothing and for what cancels', () => {
    expect(Object.is(exactSum([]), 0)).toBe(true)
    expect(Object.is(exactSum([-0]), 0)).toBe(true)
    expect(Object.is(exactSum([3, -3]), 0)).toBe(true)
  })

  it('starts afresh after reset', () => {
    const sum = new ExactSum()
    sum.add(5)
    sum.reset()
    sum.add(2)
    expect(sum.value()).toBe(2)
  })

  it('equals big-integer sums over wide ranges, in any order', () => {
    const random = createRandom(11)
    for (let trial = 0; trial < 400; trial++) {
      const spread = 1 + random.below(200)
      const terms = Array.from(
        { length: 1 + random.below(30) },
        () => (random.float() - 0.5) * 2 ** (random.below(spread) - spread / 2 - (spread % 2) / 2),
      )
      if (trial % 3 === 0) terms.push(...terms.slice(1).map((term) => -term))
      const expected = sumByBigIntegers(terms)
      expect(exactSum(terms)).toBe(expected)
      expect(exactSum(randomOrder(random, terms.length).map((k) => terms[k]!))).toBe(expected)
    }
  })
})
