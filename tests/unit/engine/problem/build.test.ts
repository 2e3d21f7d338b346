import { describe, expect, it } from 'vitest'
import { buildProblem } from '../../../../shared/engine/problem/build'
import { createRandom } from '../../../../shared/engine/random'
import { randomOrder } from '../../../fixtures/problems/random-problem'

describe('buildProblem', () => {
  it('takes terms in any order and direction, sums duplicates, drops zeros', () => {
    const { problem, duplicatesSummed, zerosDropped } = buildProblem(
      4,
      {
        rows: [2, 0, 1, 3, 0, 1, 0, 0],
        cols: [0, 2, 1, 1, 1, 0, 0, 3],
        values: [1, 2, 7, -1, 5, -5, 4, 0],
      },
      2.5,
    )
    expect([...problem.linear]).toEqual([4, 7, 0, 0])
    expect([...problem.rows]).toEqual([0, 1])
    expect([...problem.cols]).toEqual([2, 3])
    expect([...problem.values]).toEqual([3, -1])
    expect(problem.offset).toBe(2.5)
    expect(duplicatesSummed).toBe(2)
    expect(zerosDropped).toBe(2)
  })

  it('sums duplicates exactly, whatever their order', () => {
    const terms = { rows: [0, 1, 0, 0, 0, 0], cols: [1, 0, 1, 0, 0, 0], values: [1e20, 1, -1e20, 1e20, -1e20, 3] }
    const { problem } = buildProblem(2, terms, 0)
    expect([...problem.values]).toEqual([1])
    expect([...problem.linear]).toEqual([3, 0])
  })

  it('equals a map keyed by pair, after shuffling and turning terms round', () => {
    const random = createRandom(5)
    for (let trial = 0; trial < 60; trial++) {
      const n = 1 + random.below(12)
      const count = random.below(120)
      const expected = new Map<string, number>()
      const triples = Array.from(
        { length: count },
        () => [random.below(n), random.below(n), random.below(7) - 3] as const,
      )
      for (const [a, b, value] of triples) {
        const key = `${Math.min(a, b)} ${Math.max(a, b)}`
        expected.set(key, (expected.get(key) ?? 0) + value)
      }
      const shuffled = randomOrder(random, count).map((k) => triples[k]!)
      const { problem, duplicatesSummed, zerosDropped } = buildProblem(
        n,
        { rows: shuffled.map((t) => t[1]), cols: shuffled.map((t) => t[0]), values: shuffled.map((t) => t[2]) },
        0,
      )
      const got = new Map<string, number>()
      problem.linear.forEach((value, i) => value !== 0 && got.set(`${i} ${i}`, value))
      problem.values.forEach((value, k) => got.set(`${problem.rows[k]} ${problem.cols[k]}`, value))
      const isPair = (key: string): boolean => key.split(' ')[0] !== key.split(' ')[1]
      expect(got).toEqual(new Map([...expected].filter(([, value]) => value !== 0)))
      expect(duplicatesSummed).toBe(count - expected.size)
      expect(zerosDropped).toBe([...expected].filter(([key, value]) => value === 0 && isPair(key)).length)
    }
  })

  it('leaves pairs sorted and the caller’s arrays alone', () => {
    const rows = Uint32Array.from([3, 2, 1])
    const cols = Uint32Array.from([0, 1, 0])
    const values = Float64Array.from([1, 2, 3])
    const { problem } = buildProblem(4, { rows, cols, values }, 0)
    expect([...problem.rows]).toEqual([0, 0, 1])
    expect([...problem.cols]).toEqual([1, 3, 2])
    expect([...problem.values]).toEqual([3, 1, 2])
    expect([...rows]).toEqual([3, 2, 1])
  })

  it('knows no −0', () => {
    const { problem } = buildProblem(1, { rows: [0], cols: [0], values: [-0] }, -0)
    expect(Object.is(problem.linear[0], 0)).toBe(true)
    expect(Object.is(problem.offset, 0)).toBe(true)
  })

  it('builds the empty problem', () => {
    expect(buildProblem(0, { rows: [], cols: [], values: [] }, 1).problem.n).toBe(0)
  })

  it.each([
    ['an index too large', 2, [0], [2], [1], 0, /outside 0 … 1/],
    ['a negative index', 2, [-1], [0], [1], 0, /outside/],
    ['a fractional index', 2, [0.5], [0], [1], 0, /outside/],
    ['lengths that differ', 2, [0, 1], [0], [1], 0, /differ in length/],
    ['a value that is not finite', 2, [0], [1], [Number.NaN], 0, /not finite/],
    ['an offset that is not finite', 2, [0], [1], [1], Infinity, /offset/],
    ['a sum that overflows', 2, [0, 0], [1, 1], [1.5e308, 1.5e308], 0, /beyond the range/],
    ['a negative size', -1, [], [], [], 0, /variables/],
  ])('refuses %s', (_, n, rows, cols, values, offset, message) => {
    expect(() => buildProblem(n, { rows, cols, values }, offset)).toThrow(RangeError)
    expect(() => buildProblem(n, { rows, cols, values }, offset)).toThrow(message)
  })
})
