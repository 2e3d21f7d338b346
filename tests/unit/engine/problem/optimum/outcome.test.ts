import { describe, expect, it } from 'vitest'
import { annealRestarts } from '../../../../../shared/engine/problem/optimum/anneal-restarts'
import { minimiseByElimination } from '../../../../../shared/engine/problem/optimum/eliminate'
import { enumerateSlice } from '../../../../../shared/engine/problem/optimum/enumerate-slice'
import type { PartOutcome } from '../../../../../shared/engine/problem/optimum/outcome'
import {
  annealedOutcome,
  assembleOptimum,
  eliminatedOutcome,
  enumeratedOutcome,
  programmeOutcome,
} from '../../../../../shared/engine/problem/optimum/outcome'
import type { OptimumMethod, OptimumPart } from '../../../../../shared/engine/problem/optimum/plan'
import { planOptimum } from '../../../../../shared/engine/problem/optimum/plan'
import { createRandom } from '../../../../../shared/engine/random'
import type { Form, Problem } from '../../../../../shared/engine/problem/problem'
import { energyByDefinition, randomProblem, real, smallInteger } from '../../../../fixtures/problems/random-problem'
import { bruteForce, idle } from './oracle'

const annealed = ({ qubo }: OptimumPart) => annealRestarts(qubo, { first: 0, restarts: 8, sweeps: 100, seed: 1 }, idle)

function solvePart(part: OptimumPart): PartOutcome {
  if (part.method === 'enumeration') return enumeratedOutcome(part, enumerateSlice(part.qubo, 0, idle), null)
  if (part.method === 'tree decomposition')
    return eliminatedOutcome(part, minimiseByElimination(part.qubo, part.elimination!, idle), null)
  return annealedOutcome(part, annealed(part))
}

function solve(problem: Problem, form: Form, asked: OptimumMethod | null = null) {
  const plan = planOptimum(problem, form, asked)
  return assembleOptimum(problem, form, plan, plan.parts.map(solvePart))
}

const valuesOf = (state: Uint8Array, form: Form): number[] =>
  Array.from(state, (value) => (value === 1 ? 1 : form === 'ising' ? -1 : 0))

describe.each(['qubo', 'ising'] as const)('a whole problem in %s form', (form) => {
  it.each([null, 'enumeration', 'tree decomposition'] as const)('has its proved optimum by %s', (asked) => {
    const random = createRandom(71)
    for (let trial = 0; trial < 60; trial++) {
      const problem = randomProblem(random, random.below(13), 0.4 * random.float(), smallInteger)
      const found = solve(problem, form, asked)
      expect(found).toMatchObject({ energy: bruteForce(problem, form).energy, proved: true, tolerance: 0 })
      expect(found.bound).toBe(found.energy)
      expect(energyByDefinition(problem, valuesOf(found.state, form))).toBe(found.energy)
    }
  })

  it('says what rounding leaves open', () => {
    const random = createRandom(72)
    for (let trial = 0; trial < 40; trial++) {
      const problem = randomProblem(random, 4 + random.below(8), 0.6, real)
      const found = solve(problem, form)
      expect(found.proved).toBe(true)
      expect(found.tolerance).toBeLessThan(1e-9)
      const { energy } = bruteForce(problem, form)
      expect(Math.abs(found.energy - energy)).toBeLessThanOrEqual(found.tolerance + 1e-12)
      expect(found.bound).toBeLessThanOrEqual(energy + 1e-12)
    }
  })

  it('never calls a bound proved that is not below the optimum', () => {
    const random = createRandom(73)
    for (let trial = 0; trial < 60; trial++) {
      const problem = randomProblem(random, 2 + random.below(10), random.float(), smallInteger)
      const found = solve(problem, form, 'annealing')
      const { energy } = bruteForce(problem, form)
      expect(found.bound).toBeLessThanOrEqual(energy)
      expect(found.energy).toBeGreaterThanOrEqual(energy)
      if (found.proved) expect(found.energy).toBe(energy)
    }
  })
})

describe('an integer programme', () => {
  const part = planOptimum(randomProblem(createRandom(74), 10, 0.8, smallInteger), 'qubo', 'integer programme')
    .parts[0]!
  const { energy } = bruteForce(part.qubo)
  const { state } = annealed(part)

  it('is a proof once its bound leaves no room for another step of the grid', () => {
    expect(part.grid).toBe(1)
    expect(programmeOutcome(part, { state, bound: energy - 0.9 }, null)).toMatchObject({
      energy,
      bound: energy,
      proved: true,
      tolerance: 0,
    })
    expect(programmeOutcome(part, { state, bound: energy - 1.1 }, null)).toMatchObject({
      bound: energy - 1,
      proved: false,
    })
  })

  it('allows for what floating point may have added to its bound', () => {
    expect(programmeOutcome(part, { state, bound: energy - 1 + 1e-9 }, null).proved).toBe(false)
  })

  it('takes the better of its own state and the one it began from', () => {
    const none = new Uint8Array(10)
    expect(programmeOutcome(part, { state: none, bound: -Infinity }, annealed(part))).toMatchObject({
      energy,
      by: 'annealing',
    })
    expect(programmeOutcome(part, { state: null, bound: -Infinity }, null)).toMatchObject({ energy: 0, proved: false })
  })

  it('is proved within its tolerance where energies are on no grid', () => {
    const rough = planOptimum(randomProblem(createRandom(75), 10, 0.8, real), 'qubo', 'integer programme').parts[0]!
    const best = annealed(rough)
    const outcome = programmeOutcome(rough, { state: best.state, bound: best.energy - 1e-9 }, null)
    expect(outcome.proved).toBe(true)
    expect(outcome.tolerance).toBeGreaterThan(0)
    expect(outcome.tolerance).toBeLessThan(1e-3)
    expect(programmeOutcome(rough, { state: best.state, bound: best.energy - 0.1 }, null).proved).toBe(false)
  })
})

it('keeps the best of both where an exact method was given up', () => {
  const part = planOptimum(randomProblem(createRandom(76), 20, 1, smallInteger), 'qubo').parts[0]!
  const best = annealed(part)
  const slice = enumerateSlice(part.qubo, 0, { ...idle, cancelled: () => true })
  const outcome = enumeratedOutcome(part, slice, best)
  expect(outcome).toMatchObject({ energy: best.energy, by: 'annealing', optima: null })
  expect(eliminatedOutcome(part, null, best).energy).toBe(best.energy)
})
