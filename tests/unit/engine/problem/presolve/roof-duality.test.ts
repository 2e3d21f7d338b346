import { describe, expect, it } from 'vitest'
import { buildProblem } from '../../../../../shared/engine/problem/build'
import { roofDuality } from '../../../../../shared/engine/problem/presolve/roof-duality'
import { WorkingProblem } from '../../../../../shared/engine/problem/presolve/working-problem'
import type { Form, Problem } from '../../../../../shared/engine/problem/problem'
import { createRandom } from '../../../../../shared/engine/random'
import { randomOrder, randomProblem } from '../../../../fixtures/problems/random-problem'
import { DRAWS, exactEnergies, least } from './exact-energies'

const never = (): boolean => false

function roofOf(problem: Problem, form: Form) {
  const working = new WorkingProblem(problem, form)
  const roof = roofDuality(working, never)!
  return { ...roof, bound: (Number(roof.doubleBound) / 2) * 2 ** working.unit }
}

const agrees = (code: number, values: readonly { variable: number; value: 0 | 1 }[]): boolean =>
  values.every(({ variable, value }) => ((code >> variable) & 1) === value)

describe('roofDuality', () => {
  it.each(Object.keys(DRAWS))('fixes only what holds in all optima, or together in one (%s)', (draw) => {
    const random = createRandom(21)
    let strong = 0
    let weak = 0
    for (let trial = 0; trial < 300; trial++) {
      const form = trial % 2 === 0 ? 'qubo' : 'ising'
      const problem = randomProblem(random, 1 + random.below(8), random.float(), () => DRAWS[draw]!(random))
      const roof = roofOf(problem, form)
      const energies = exactEnergies(problem, form)
      const optimum = least(energies)
      const optima = energies.flatMap((energy, code) => (energy === optimum ? [code] : []))
      expect(optima.every((code) => agrees(code, roof.strong))).toBe(true)
      expect(optima.some((code) => agrees(code, [...roof.strong, ...roof.weak]))).toBe(true)
      expect(roof.bound).toBeLessThanOrEqual(Number(optimum) / 2 ** 100 + 1e-9)
      strong += roof.strong.length
      weak += roof.weak.length
    }
    expect(strong).toBeGreaterThan(100)
    // Without ties everything that roof duality proves holds in all optima.
    if (draw !== 'reals') expect(weak).toBeGreaterThan(10)
  })

  it('solves problems without positive interactions completely', () => {
    const random = createRandom(22)
    for (let trial = 0; trial < 100; trial++) {
      const n = 1 + random.below(9)
      const drawn = randomProblem(random, n, random.float(), () => DRAWS.tenths!(random))
      const problem = { ...drawn, values: drawn.values.map((value) => -Math.abs(value)) }
      const { strong, weak, bound } = roofOf(problem, 'qubo')
      expect(strong.length + weak.length).toBe(n)
      expect(bound).toBeCloseTo(Number(least(exactEnergies(problem, 'qubo'))) / 2 ** 100, 12)
    }
  })

  it('gives the same bound and the same strong values when variables are numbered otherwise, or flipped', () => {
    const random = createRandom(23)
    for (let trial = 0; trial < 60; trial++) {
      const problem = randomProblem(random, 2 + random.below(20), 0.3, () => DRAWS.integers!(random))
      const order = Array.from(randomOrder(random, problem.n))
      const isFlipped = order.map(() => random.below(2) === 1)
      const at = (v: number): number => order.indexOf(v)
      const sign = (v: number): number => (isFlipped[v]! ? -1 : 1)
      const moved = buildProblem(
        problem.n,
        {
          rows: [...Array.from(order.keys(), at), ...Array.from(problem.rows, at)],
          cols: [...Array.from(order.keys(), at), ...Array.from(problem.cols, at)],
          values: [
            ...Array.from(problem.linear, (h, v) => h * sign(v)),
            ...Array.from(problem.values, (b, k) => b * sign(problem.rows[k]!) * sign(problem.cols[k]!)),
          ],
        },
        problem.offset,
      ).problem
      const first = roofOf(problem, 'ising')
      const second = roofOf(moved, 'ising')
      expect(second.bound).toBe(first.bound)
      const back = second.strong.map(({ variable, value }) => {
        const original = order[variable]!
        return { variable: original, value: isFlipped[original]! ? 1 - value : value }
      })
      expect(back.sort((a, b) => a.variable - b.variable)).toEqual(first.strong)
    }
  })

  it('answers null when it is stopped before the flow is done', () => {
    const problem = buildProblem(2, { rows: [0, 0, 1], cols: [0, 1, 1], values: [-1, 3, -2] }, 0).problem
    expect(roofDuality(new WorkingProblem(problem, 'qubo'), () => true)).toBeNull()
  })
})
