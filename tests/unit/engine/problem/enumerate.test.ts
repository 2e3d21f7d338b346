import { describe, expect, it } from 'vitest'
import { buildProblem } from '../../../../shared/engine/problem/build'
import { convertForm } from '../../../../shared/engine/problem/convert'
import { groundStates } from '../../../../shared/engine/problem/enumerate'
import type { Form, Problem } from '../../../../shared/engine/problem/problem'
import { createRandom } from '../../../../shared/engine/random'
import {
  energyByDefinition,
  randomOrder,
  randomProblem,
  real,
  smallInteger,
  stateOf,
} from '../../../fixtures/problems/random-problem'

const VALUES = { qubo: [0, 1], ising: [-1, 1] } as const

/** Every state in counting order, each energy from the definition; energies within `slack` of the least are ties. */
function groundStatesByCounting(problem: Problem, form: Form, slack: number) {
  const energies = Array.from({ length: 2 ** problem.n }, (_, code) =>
    energyByDefinition(problem, stateOf(code, problem.n, VALUES[form])),
  )
  const energy = Math.min(...energies)
  const codes = energies.flatMap((value, code) => (value <= energy + slack ? [code] : []))
  return { energy, codes }
}

const codeOf = (state: Uint8Array): number => state.reduce((code, bit, i) => code + bit * 2 ** i, 0)

describe('groundStates', () => {
  it.each(['qubo', 'ising'] as const)('finds all ground states of random %s problems', (form) => {
    const random = createRandom(7)
    for (let trial = 0; trial < 40; trial++) {
      const exact = trial % 2 === 0
      const problem = randomProblem(random, random.below(13), random.float(), exact ? smallInteger : real)
      const expected = groundStatesByCounting(problem, form, exact ? 0 : 1e-12)
      const found = groundStates(problem, form)
      expect(found.energy).toBeCloseTo(expected.energy, 12)
      if (exact) expect(found.energy).toBe(expected.energy)
      expect(found.count).toBe(expected.codes.length)
      expect(found.states.map(codeOf).sort((a, b) => a - b)).toEqual(expected.codes)
    }
  })

  it('agrees with itself over several blocks after relabelling and in the other form', () => {
    const random = createRandom(8)
    const n = 14
    const problem = randomProblem(random, n, 0.5, smallInteger)
    const order = randomOrder(random, n)
    const relabelled = buildProblem(
      n,
      {
        rows: [...order, ...Array.from(problem.rows, (i) => order[i]!)],
        cols: [...order, ...Array.from(problem.cols, (i) => order[i]!)],
        values: [...problem.linear, ...problem.values],
      },
      problem.offset,
    ).problem
    const found = groundStates(problem, 'ising')
    const other = groundStates(relabelled, 'ising')
    const asQubo = groundStates(convertForm(problem, 'ising', 'qubo'), 'qubo')
    expect(other.energy).toBe(found.energy)
    expect(other.count).toBe(found.count)
    expect(asQubo).toEqual(found)
    const moved = found.states.map((state) => codeOf(Uint8Array.from(order, (_, i) => state[order.indexOf(i)]!)))
    expect(other.states.map(codeOf).sort((a, b) => a - b)).toEqual(moved.sort((a, b) => a - b))
  })

  it('counts ties of decimals that rounding would tell apart', () => {
    // In doubles 0.1 + 0.2 − 0.3 is not 0, in the decimals that the user wrote it is.
    const problem = buildProblem(2, { rows: [0, 1, 0], cols: [0, 1, 1], values: [0.1, 0.2, -0.3] }, 0).problem
    expect(groundStates(problem, 'qubo')).toMatchObject({ energy: 0, count: 2 })
  })

  it('tells apart integer energies that differ by one in 2⁵⁰', () => {
    const problem = buildProblem(2, { rows: [0, 1, 0], cols: [0, 1, 1], values: [-(2 ** 50), 1, 2 ** 50] }, 0).problem
    expect(groundStates(problem, 'qubo')).toMatchObject({ energy: -(2 ** 50), count: 1 })
    const apart = buildProblem(2, { rows: [0, 1], cols: [0, 1], values: [-(2 ** 48), -1] }, 0).problem
    expect(groundStates(apart, 'qubo')).toMatchObject({ energy: -(2 ** 48) - 1, count: 1 })
  })

  it('counts all states of a flat problem and hands out the first 1024', () => {
    const flat = buildProblem(13, { rows: [], cols: [], values: [] }, -2).problem
    const found = groundStates(flat, 'qubo')
    expect(found.energy).toBe(-2)
    expect(found.count).toBe(2 ** 13)
    expect(found.states).toHaveLength(1024)
  })

  it('has one empty state for no variables', () => {
    const none = buildProblem(0, { rows: [], cols: [], values: [] }, 3).problem
    expect(groundStates(none, 'qubo')).toEqual({ energy: 3, states: [new Uint8Array(0)], count: 1 })
  })

  it('refuses more variables than allowed', () => {
    const problem = buildProblem(5, { rows: [], cols: [], values: [] }, 0).problem
    expect(() => groundStates(problem, 'qubo', 4)).toThrow('at most 4 variables, not 5')
  })
})
