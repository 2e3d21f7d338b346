import { describe, expect, it } from 'vitest'
import { buildProblem } from '../../shared/engine/problem/build'
import { convertForm } from '../../shared/engine/problem/convert'
import { energyOf } from '../../shared/engine/problem/energy'
import type { Form, Problem } from '../../shared/engine/problem/problem'
import { createRandom, type Random } from '../../shared/engine/random'
import { dyadic, randomOrder, randomProblem, real, smallInteger, stateOf } from '../fixtures/problems/random-problem'

const VALUES = { qubo: [0, 1], ising: [-1, 1] } as const
const other = (form: Form): Form => (form === 'qubo' ? 'ising' : 'qubo')

/** A double as a whole number of units of 2⁻⁶⁰; fails for finer ones. */
function inUnits(value: number): bigint {
  const scaled = value * 2 ** 60
  if (!Number.isInteger(scaled)) throw new Error(`${value} is finer than 2^-60`)
  return BigInt(scaled)
}

/** The energy in whole units of 2⁻⁶⁰, by big integers: no rounding anywhere. */
function exactEnergy(problem: Problem, state: readonly number[]): bigint {
  let energy = inUnits(problem.offset)
  problem.linear.forEach((value, i) => (energy += inUnits(value) * BigInt(state[i]!)))
  problem.values.forEach((value, k) => {
    energy += inUnits(value) * BigInt(state[problem.rows[k]!]! * state[problem.cols[k]!]!)
  })
  return energy
}

function relabelled(problem: Problem, order: readonly number[]): Problem {
  const rows = [...problem.linear.keys(), ...problem.rows].map((i) => order[i]!)
  const cols = [...problem.linear.keys(), ...problem.cols].map((i) => order[i]!)
  return buildProblem(problem.n, { rows, cols, values: [...problem.linear, ...problem.values] }, problem.offset).problem
}

const sample = (random: Random, draw: typeof real): Problem =>
  randomProblem(random, 1 + random.below(10), random.float(), draw)

// The identity s = 2x − 1 (Lucas, Ising formulations of many NP problems, Front. Phys. 2:5, 2014, section 1), checked
// against full enumeration of all 2ⁿ states, with the offset and without rounding.
describe.each(['qubo', 'ising'] as const)('converting %s to the other form', (form) => {
  it.each([
    ['integers', smallInteger],
    ['dyadic fractions', dyadic],
  ])('keeps the energy of every state exactly: %s', (_, draw) => {
    const random = createRandom(101)
    for (let trial = 0; trial < 25; trial++) {
      const problem = sample(random, draw)
      const converted = convertForm(problem, form, other(form))
      for (let code = 0; code < 2 ** problem.n; code++) {
        const before = stateOf(code, problem.n, VALUES[form])
        const after = stateOf(code, problem.n, VALUES[other(form)])
        expect(exactEnergy(converted, after)).toBe(exactEnergy(problem, before))
        expect(energyOf(converted, after)).toBe(energyOf(problem, before))
      }
    }
  })

  it('keeps the energy of every state to rounding: real numbers', () => {
    const random = createRandom(102)
    for (let trial = 0; trial < 25; trial++) {
      const problem = sample(random, real)
      const converted = convertForm(problem, form, other(form))
      const scale = [problem.offset, ...problem.linear, ...problem.values].reduce((sum, v) => sum + Math.abs(v), 0)
      for (let code = 0; code < 2 ** problem.n; code++) {
        const before = energyOf(problem, stateOf(code, problem.n, VALUES[form]))
        const after = energyOf(converted, stateOf(code, problem.n, VALUES[other(form)]))
        expect(Math.abs(after - before)).toBeLessThanOrEqual(16 * Number.EPSILON * scale)
      }
    }
  })

  it('goes there and back to the last bit, and does not depend on the labels', () => {
    const random = createRandom(103)
    for (let trial = 0; trial < 60; trial++) {
      const problem = randomProblem(random, 1 + random.below(60), random.float(), trial % 2 ? dyadic : smallInteger)
      const converted = convertForm(problem, form, other(form))
      expect(convertForm(converted, other(form), form)).toEqual(problem)
      const order = randomOrder(random, problem.n)
      expect(convertForm(relabelled(problem, order), form, other(form))).toEqual(relabelled(converted, order))
    }
  })
})
