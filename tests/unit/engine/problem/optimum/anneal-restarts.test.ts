import { expect, it } from 'vitest'
import { energyOf } from '../../../../../shared/engine/problem/energy'
import { annealRestarts, mergeAnnealed } from '../../../../../shared/engine/problem/optimum/anneal-restarts'
import { createRandom } from '../../../../../shared/engine/random'
import { randomProblem, real, smallInteger } from '../../../../fixtures/problems/random-problem'
import { bruteForce, idle, randomProblems } from './oracle'

const OPTIONS = { first: 0, restarts: 12, sweeps: 200, seed: 3 }

it('reaches the optimum of small problems', () => {
  for (const problem of randomProblems(120, 12, 31).filter(({ n }) => n > 0)) {
    const found = annealRestarts(problem, OPTIONS, idle)
    expect(found.energy).toBe(bruteForce(problem).energy)
    expect(energyOf(problem, found.state)).toBe(found.energy)
  }
})

it('gives the same however its restarts are cut, and another seed other states', () => {
  const problem = randomProblem(createRandom(32), 60, 0.5, smallInteger)
  const whole = annealRestarts(problem, OPTIONS, idle)
  const parts = [
    { ...OPTIONS, restarts: 5 },
    { ...OPTIONS, first: 5, restarts: 7 },
  ].map((options) => annealRestarts(problem, options, idle))
  expect(mergeAnnealed(parts)).toEqual(whole)
  const short = { ...OPTIONS, restarts: 1, sweeps: 2 }
  expect(annealRestarts(problem, { ...short, seed: 4 }, idle).state).not.toEqual(
    annealRestarts(problem, short, idle).state,
  )
})

it('ends in a state that no single flip improves', () => {
  const problem = randomProblem(createRandom(33), 80, 0.3, real)
  const { state, energy } = annealRestarts(problem, { ...OPTIONS, restarts: 1, sweeps: 1 }, idle)
  for (let i = 0; i < problem.n; i++) {
    const flipped = state.slice()
    flipped[i] = 1 - flipped[i]!
    expect(energyOf(problem, flipped)).toBeGreaterThan(energy - 1e-9)
  }
})

it('ends a cancelled restart at once and keeps it', () => {
  const problem = randomProblem(createRandom(34), 30, 0.5, smallInteger)
  const found = annealRestarts(problem, { ...OPTIONS, sweeps: 1e9 }, { ...idle, cancelled: () => true })
  expect(found.done).toBe(1)
  expect(found.energy).toBe(energyOf(problem, found.state))
})
