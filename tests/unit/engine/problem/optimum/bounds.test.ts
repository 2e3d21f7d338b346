import { expect, it } from 'vitest'
import { quickLowerBound } from '../../../../../shared/engine/problem/optimum/bounds'
import { buildProblem } from '../../../../../shared/engine/problem/build'
import { toQubo } from '../../../../../shared/engine/problem/convert'
import { bruteForce, randomProblems } from './oracle'

it('lies below the optimum of every problem', () => {
  for (const problem of randomProblems(200, 11, 51))
    expect(quickLowerBound(problem)).toBeLessThanOrEqual(bruteForce(problem).energy)
})

it('is met where nothing is frustrated', () => {
  // Equal spins along a tree: −1 for each of the five couplings.
  const tree = buildProblem(
    6,
    { rows: [0, 0, 1, 1, 2], cols: [1, 2, 3, 4, 5], values: [-1, -1, -1, -1, -1] },
    0,
  ).problem
  const { offset, ...qubo } = toQubo(tree)
  expect(quickLowerBound({ ...qubo, offset: 0 }) + offset).toBeCloseTo(-5, 9)
})
