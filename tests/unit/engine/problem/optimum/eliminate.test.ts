import { expect, it } from 'vitest'
import { energyOf } from '../../../../../shared/engine/problem/energy'
import { interactionGraph } from '../../../../../shared/engine/problem/interaction-graph'
import { minimiseByElimination } from '../../../../../shared/engine/problem/optimum/eliminate'
import { planElimination } from '../../../../../shared/engine/problem/optimum/elimination-plan'
import { buildProblem } from '../../../../../shared/engine/problem/build'
import { createRandom } from '../../../../../shared/engine/random'
import { randomProblem, real } from '../../../../fixtures/problems/random-problem'
import { bruteForce, idle, randomProblems } from './oracle'

it('has the optimum that counting through all states has, with a state of that energy', () => {
  for (const problem of randomProblems(300, 13, 21)) {
    const found = minimiseByElimination(problem, planElimination(interactionGraph(problem), 13)!, idle)!
    expect(found.energy).toBe(bruteForce(problem).energy)
    expect(found.tolerance).toBe(0)
    expect(energyOf(problem, found.state)).toBe(found.energy)
  }
})

it('stays within the tolerance that it states where sums are rounded', () => {
  const random = createRandom(22)
  for (let trial = 0; trial < 60; trial++) {
    const problem = { ...randomProblem(random, 3 + random.below(10), random.float(), real), offset: 0 }
    const found = minimiseByElimination(problem, planElimination(interactionGraph(problem), 12)!, idle)!
    expect(found.tolerance).toBeGreaterThan(0)
    expect(Math.abs(found.energy - bruteForce(problem).energy)).toBeLessThanOrEqual(found.tolerance)
    expect(Math.abs(energyOf(problem, found.state) - found.energy)).toBeLessThanOrEqual(found.tolerance)
  }
})

/** A ladder of 2 × length variables with given couplings, and its optimum by going along it rung by rung. */
function ladder(length: number, seed: number) {
  const random = createRandom(seed)
  const rows: number[] = []
  const cols: number[] = []
  const values: number[] = []
  const add = (a: number, b: number): number => {
    const value = random.below(21) - 10
    rows.push(a)
    cols.push(b)
    values.push(value)
    return value
  }
  let best = [0, 0, 0, 0]
  for (let r = 0; r < length; r++) {
    const [a, b] = [2 * r, 2 * r + 1]
    const [la, lb, rung] = [add(a, a), add(b, b), add(a, b)]
    const [sa, sb] = r > 0 ? [add(a - 2, a), add(b - 2, b)] : [0, 0]
    best = [0, 1, 2, 3].map((now) => {
      const [x, y] = [now & 1, now >> 1]
      const before = best.map((energy, last) => energy + sa * x * (last & 1) + sb * y * (last >> 1))
      return Math.min(...before) + la * x + lb * y + rung * x * y
    })
  }
  return { problem: buildProblem(2 * length, { rows, cols, values }, 0).problem, energy: Math.min(...best) }
}

it.each([10, 400, 2000])('solves ladders of %i rungs', (length) => {
  const { problem, energy } = ladder(length, length)
  const plan = planElimination(interactionGraph(problem), 8)!
  expect(plan.width).toBeLessThanOrEqual(4)
  const found = minimiseByElimination(problem, plan, idle)!
  expect(found.energy).toBe(energy)
  expect(energyOf(problem, found.state)).toBe(energy)
})

it('says beforehand what it takes, and gives no plan wider than asked', () => {
  const complete = buildProblem(
    12,
    {
      rows: Array.from({ length: 66 }, (_, k) => pairOf(k)[0]),
      cols: Array.from({ length: 66 }, (_, k) => pairOf(k)[1]),
      values: Array.from({ length: 66 }, () => 1),
    },
    0,
  ).problem
  const graph = interactionGraph(complete)
  expect(planElimination(graph, 10)).toBeNull()
  const plan = planElimination(graph, 11)!
  expect(plan.width).toBe(11)
  // The first variable's two tables of 2^11 doubles are the most there is at a time, or the second's with them held.
  expect(plan.bytes).toBeGreaterThanOrEqual(2 * 8 * 2 ** 11)
  expect(plan.bytes).toBeLessThanOrEqual(4 * 8 * 2 ** 11)
})

/** Pair k of the complete graph in the order (0,1), (0,2), (1,2), (0,3), … */
function pairOf(k: number): [number, number] {
  let high = 1
  let rest = k
  while (rest >= high) rest -= high++
  return [rest, high]
}

it('gives up when it is cancelled', () => {
  const { problem } = ladder(20, 1)
  const plan = planElimination(interactionGraph(problem), 8)!
  expect(minimiseByElimination(problem, plan, { ...idle, cancelled: () => true })).toBeNull()
})
