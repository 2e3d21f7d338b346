import { expect, it } from 'vitest'
import {
  enumerateSlice,
  enumerationTolerance,
  mergeSlices,
  sliceCount,
} from '../../../../../shared/engine/problem/optimum/enumerate-slice'
import { buildProblem } from '../../../../../shared/engine/problem/build'
import { createRandom } from '../../../../../shared/engine/random'
import { randomProblem, real } from '../../../../fixtures/problems/random-problem'
import { bruteForce, codeOf, idle, randomProblems } from './oracle'

it('finds every optimum that counting through all states finds', () => {
  for (const problem of randomProblems(120, 13, 11)) {
    const expected = bruteForce(problem)
    const found = enumerateSlice(problem, 0, idle)
    expect(found).toMatchObject({ energy: expected.energy, count: expected.codes.length, complete: true })
    const codes = found.states.map(codeOf).sort((a, b) => a - b)
    if (expected.codes.length <= 1024) expect(codes).toEqual(expected.codes)
    else expect(codes.length).toBe(1024)
  }
})

it('counts states as equal that differ by rounding only', () => {
  const random = createRandom(5)
  for (let trial = 0; trial < 20; trial++) {
    const problem = randomProblem(random, 2 + random.below(11), random.float(), real)
    // A variable without coefficients doubles the optima.
    const n = problem.n
    const rows = [...problem.linear.keys(), ...problem.rows]
    const cols = [...problem.linear.keys(), ...problem.cols]
    const terms = { rows: [...rows, n], cols: [...cols, n], values: [...problem.linear, ...problem.values, 0] }
    const doubled = buildProblem(n + 1, terms, 0).problem
    const found = enumerateSlice(doubled, 0, idle)
    expect(enumerationTolerance(doubled)).toBeGreaterThan(0)
    expect(found.count).toBe(2)
    expect(found.energy).toBeCloseTo(bruteForce({ ...problem, offset: 0 }).energy, 10)
  }
})

/** A path of alternating sign along the variables: its optimum is known. */
const chain = (n: number) =>
  buildProblem(
    n,
    {
      rows: Array.from({ length: n }, (_, i) => i).concat(Array.from({ length: n - 1 }, (_, i) => i)),
      cols: Array.from({ length: n }, (_, i) => i).concat(Array.from({ length: n - 1 }, (_, i) => i + 1)),
      values: Array.from({ length: n }, () => -2).concat(Array.from({ length: n - 1 }, () => 3)),
    },
    0,
  ).problem

it('finds in slices what lies in one of them', () => {
  // Up everywhere else: no two neighbours. 27 variables, so four slices; ⌈27/2⌉ = 14 of −2.
  const problem = chain(27)
  expect(sliceCount(27)).toBe(4)
  const slices = [0, 1, 2, 3].map((slice) => enumerateSlice(problem, slice, idle))
  const merged = mergeSlices(slices, 0)
  expect(merged).toMatchObject({ energy: -28, count: 1, complete: true })
  expect(Array.from(merged.states[0]!, Number)).toEqual(Array.from({ length: 27 }, (_, i) => 1 - (i % 2)))
})

it('keeps the best so far when it is given up', () => {
  let asked = 0
  const found = enumerateSlice(chain(24), 0, { ...idle, cancelled: () => ++asked > 3 })
  expect(found.complete).toBe(false)
  expect(found.energy).toBeLessThan(0)
  expect(found.states.length).toBeGreaterThan(0)
})

it('refuses what it cannot do', () => {
  expect(() => enumerateSlice(chain(35), 0, idle)).toThrow(RangeError)
  expect(() => enumerateSlice(chain(3), 1, idle)).toThrow(RangeError)
})
