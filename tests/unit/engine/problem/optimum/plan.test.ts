import { expect, it } from 'vitest'
import { buildProblem } from '../../../../../shared/engine/problem/build'
import { energyOf } from '../../../../../shared/engine/problem/energy'
import { splitComponents } from '../../../../../shared/engine/problem/optimum/parts'
import { planOptimum, UnsuitableMethod } from '../../../../../shared/engine/problem/optimum/plan'
import { createRandom } from '../../../../../shared/engine/random'
import { randomProblem, smallInteger, stateOf } from '../../../../fixtures/problems/random-problem'
import { randomProblems } from './oracle'

/** All pairs of n variables, or a random share of them. */
const spread = (n: number, density: number, seed = 1) => randomProblem(createRandom(seed), n, density, smallInteger)

it('splits a problem into components whose energies add up', () => {
  for (const problem of randomProblems(60, 11, 61)) {
    const components = splitComponents(problem)
    expect(components.flatMap(({ variables }) => [...variables]).sort((a, b) => a - b)).toEqual([
      ...problem.linear.keys(),
    ])
    const state = stateOf(0b1011011010, problem.n, [0, 1])
    const parts = components.map(({ variables, problem: part }) =>
      energyOf(
        part,
        Array.from(variables, (v) => state[v]!),
      ),
    )
    expect(parts.reduce((sum, energy) => sum + energy, 0)).toBeCloseTo(energyOf(problem, state), 6)
  }
})

it.each([
  ['a dense problem of 20', spread(20, 1), 'enumeration'],
  ['a sparse one of 60', spread(60, 0.05), 'tree decomposition'],
  ['a dense one of 60', spread(60, 1), 'integer programme'],
  ['one with 24,000 interactions', spread(250, 0.8), 'annealing'],
] as const)('chooses for %s', (_, problem, method) => {
  const { parts } = planOptimum(problem, 'qubo')
  expect(parts.at(-1)!.method).toBe(method)
  expect(parts.at(-1)!.elimination !== null).toBe(method === 'tree decomposition')
})

it('sets isolated variables by their sign, in either form', () => {
  const problem = buildProblem(4, { rows: [0, 1, 2], cols: [0, 1, 3], values: [-2, 3, 1] }, 0).problem
  for (const form of ['qubo', 'ising'] as const) {
    const plan = planOptimum(problem, form)
    expect([...plan.isolated]).toEqual([0, 1])
    expect([...plan.isolatedState]).toEqual([1, 0])
    expect(plan.parts.map(({ variables }) => [...variables])).toEqual([[2, 3]])
  }
})

it('takes the method asked for, and says why it cannot', () => {
  expect(planOptimum(spread(12, 1), 'qubo', 'integer programme').parts[0]!.method).toBe('integer programme')
  expect(planOptimum(spread(12, 1), 'qubo', 'annealing').parts[0]!.anneal).not.toBeNull()
  expect(() => planOptimum(spread(40, 1), 'qubo', 'enumeration')).toThrow(UnsuitableMethod)
  expect(() => planOptimum(spread(60, 1), 'qubo', 'tree decomposition')).toThrow(
    /60 variables and \d+ interactions; no tree decomposition/,
  )
  expect(() => planOptimum(spread(250, 0.8), 'qubo', 'integer programme')).toThrow(/at most 2000/)
})
