import { describe, expect, it } from 'vitest'
import { buildProblem } from '../../../../shared/engine/problem/build'
import { convertForm, toIsing, toQubo } from '../../../../shared/engine/problem/convert'
import type { Problem } from '../../../../shared/engine/problem/problem'
import { createRandom } from '../../../../shared/engine/random'
import { dyadic, randomProblem, smallInteger } from '../../../fixtures/problems/random-problem'

const plain = ({ n, linear, rows, cols, values, offset }: Problem) => ({
  n,
  linear: [...linear],
  rows: [...rows],
  cols: [...cols],
  values: [...values],
  offset,
})

describe('convertForm', () => {
  it('follows the substitution on a worked example', () => {
    // E(x) = 2x₀ − 4x₁ + 8x₀x₁ + 1; with x = (1 + s)/2: 2 + 3s₀ + 0·s₁ + 2s₀s₁.
    const qubo = buildProblem(2, { rows: [0, 1, 0], cols: [0, 1, 1], values: [2, -4, 8] }, 1).problem
    const expected = buildProblem(2, { rows: [0, 0], cols: [0, 1], values: [3, 2] }, 2).problem
    expect(plain(toIsing(qubo))).toEqual(plain(expected))
    expect(plain(toQubo(expected))).toEqual(plain(qubo))
  })

  it('hands back the same problem when the form stays', () => {
    const problem = randomProblem(createRandom(1), 4, 1, smallInteger)
    expect(convertForm(problem, 'ising', 'ising')).toBe(problem)
  })

  it.each([
    ['integers', smallInteger],
    ['dyadic fractions', dyadic],
  ])('brings %s there and back to the last bit', (_, draw) => {
    const random = createRandom(2)
    for (let trial = 0; trial < 100; trial++) {
      const problem = randomProblem(random, 1 + random.below(40), random.float(), draw)
      expect(plain(toQubo(toIsing(problem)))).toEqual(plain(problem))
      expect(plain(toIsing(toQubo(problem)))).toEqual(plain(problem))
    }
  })

  it('is exact where large terms cancel on the way', () => {
    const star = { rows: [0, 0, 0, 0], cols: [0, 1, 2, 3], values: [0.125, 2 ** 80, -(2 ** 80), 1] }
    const qubo = buildProblem(4, star, 2 ** -40).problem
    const ising = toIsing(qubo)
    expect(ising.linear[0]).toBe(0.125 / 2 + 1 / 4)
    expect(ising.offset).toBe(2 ** -40 + 0.125 / 2 + 1 / 4)
    expect(toQubo(ising).linear[0]).toBe(0.125)
  })

  it('refuses coefficients that leave the range of doubles', () => {
    const huge = buildProblem(2, { rows: [0], cols: [1], values: [1e308] }, 0).problem
    expect(() => toQubo(huge)).toThrow(RangeError)
    const tiny = buildProblem(2, { rows: [0], cols: [1], values: [5e-324] }, 0).problem
    expect(() => toIsing(tiny)).toThrow(RangeError)
  })
})
