/**
 * Roof duality against what is published about it. The roof dual of a QUBO is the optimum of its linearised relaxation
 * (Hammer, Hansen & Simeone, Roof duality, complementation and persistency in quadratic 0-1 optimization, Math. Programming
 * 28, 1984), which a linear programming solver (HiGHS) finds without any flow. For stable sets the relaxation is that of
 * the edge inequalities, whose vertices are half-integral and persistent (Nemhauser & Trotter, Vertex packings: structural
 * properties and algorithms, Math. Programming 8, 1975); values for cycles, complete graphs, the Petersen graph and
 * bipartite graphs follow from it. All from memory.
 */
import loadHighs from 'highs'
import { beforeAll, describe, expect, it } from 'vitest'
import { buildProblem } from '../../shared/engine/problem/build'
import { presolve } from '../../shared/engine/problem/presolve/presolve'
import { roofDuality } from '../../shared/engine/problem/presolve/roof-duality'
import { WorkingProblem } from '../../shared/engine/problem/presolve/working-problem'
import type { Problem } from '../../shared/engine/problem/problem'
import { createRandom } from '../../shared/engine/random'
import { randomProblem } from '../fixtures/problems/random-problem'

let highs: Awaited<ReturnType<typeof loadHighs>>
beforeAll(async () => {
  highs = await loadHighs()
})

/** Optimum of min Σ a x + Σ b y with 0 ≤ x ≤ 1, y ≤ x_i, y ≤ x_j, y ≥ x_i + x_j − 1, y ≥ 0. */
function relaxationOptimum(qubo: Problem): number {
  const term = (value: number, name: string): string => `${value < 0 ? '-' : '+'} ${Math.abs(value)} ${name}`
  const objective = [
    ...Array.from(qubo.linear, (value, i) => term(value, `x${i}`)),
    ...Array.from(qubo.values, (value, k) => term(value, `y${k}`)),
  ]
  const rules = Array.from(qubo.values, (_, k) => {
    const [i, j] = [qubo.rows[k], qubo.cols[k]]
    return ` y${k} - x${i} <= 0\n y${k} - x${j} <= 0\n y${k} - x${i} - x${j} >= -1\n`
  })
  const bounds = Array.from(qubo.linear, (_, i) => ` x${i} <= 1\n`)
  const text = `Minimize\n obj: ${objective.join('\n ')}\nSubject To\n${rules.join('')} free: x0 >= 0\nBounds\n${bounds.join('')}End\n`
  const solution = highs.solve(text, { output_flag: false })
  expect(solution.Status).toBe('Optimal')
  return solution.ObjectiveValue + qubo.offset
}

function roofOf(qubo: Problem) {
  const working = new WorkingProblem(qubo, 'qubo')
  const roof = roofDuality(working, () => false)!
  return { ...roof, bound: (Number(roof.doubleBound) / 2) * 2 ** working.unit }
}

type Edge = readonly [number, number]

/** −Σ x + 2 Σ over edges x x: its least value is minus the largest stable set. */
const stableSet = (n: number, edges: readonly Edge[]): Problem =>
  buildProblem(
    n,
    {
      rows: [...Array(n).keys(), ...edges.map(([a]) => a)],
      cols: [...Array(n).keys(), ...edges.map(([, b]) => b)],
      values: [...Array<number>(n).fill(-1), ...edges.map(() => 2)],
    },
    0,
  ).problem

const cycle = (n: number): Edge[] => Array.from({ length: n }, (_, i): Edge => [i, (i + 1) % n])
const complete = (n: number): Edge[] =>
  Array.from({ length: n }, (_, i) => Array.from({ length: i }, (__, j): Edge => [j, i])).flat()
const petersen: Edge[] = Array.from({ length: 5 }, (_, i): Edge[] => [
  [i, (i + 1) % 5],
  [i, i + 5],
  [i + 5, ((i + 2) % 5) + 5],
]).flat()

describe('the roof dual', () => {
  it.each([
    ['integers', (random: ReturnType<typeof createRandom>) => random.below(21) - 10],
    ['reals', (random: ReturnType<typeof createRandom>) => Math.round(random.normal() * 1e4) / 1e4],
  ] as const)('is the optimum of the linearised relaxation (%s)', (_, draw) => {
    const random = createRandom(3)
    for (let trial = 0; trial < 60; trial++) {
      const qubo = randomProblem(random, 1 + random.below(16), random.float(), () => draw(random))
      expect(roofOf(qubo).bound).toBeCloseTo(relaxationOptimum(qubo), 6)
    }
  })

  it.each([
    ['the triangle', 3, cycle(3), -3 / 2],
    ['the cycle of 7', 7, cycle(7), -7 / 2],
    ['the complete graph of 6', 6, complete(6), -3],
    ['the Petersen graph', 10, petersen, -5],
    ['the cycle of 8, bipartite', 8, cycle(8), -4],
  ])('of the stable sets of %s is that of the edge relaxation', (_, n, edges, bound) => {
    expect(roofOf(stableSet(n, edges)).bound).toBe(bound)
  })

  it('gives a star its leaves, and everything else with them', () => {
    const star = stableSet(
      5,
      [1, 2, 3, 4].map((leaf): Edge => [0, leaf]),
    )
    const { strong, weak, bound } = roofOf(star)
    expect(bound).toBe(-4)
    expect(weak).toEqual([])
    expect(strong).toEqual([0, 1, 2, 3, 4].map((variable) => ({ variable, value: variable === 0 ? 0 : 1 })))
  })

  it('is met by pre-solve as a whole on odd cycles, which roof duality alone leaves open', () => {
    const odd = stableSet(9, cycle(9))
    expect(roofOf(odd)).toMatchObject({ strong: [], weak: [] })
    expect(presolve(odd, 'qubo')).toMatchObject({ lowerBound: -4, kept: { length: 0 } })
  })
})
