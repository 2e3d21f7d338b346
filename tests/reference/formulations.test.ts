/**
 * Small instances of the formulations collected by Lucas (Ising formulations of many NP problems, Front. Phys. 2:5,
 * 2014), built here from their penalty terms. Three independent answers must agree for each: enumeration of the QUBO,
 * enumeration of its Ising form, and the optimum that a MIP solver (HiGHS) proves for the linearised QUBO (Glover &
 * Woolsey, Converting the 0-1 polynomial programming problem to a 0-1 linear program, Operations Research 22, 1974);
 * and all must equal the known answer of the combinatorial question, found by a closed form or by plain search.
 */
import loadHighs from 'highs'
import { beforeAll, describe, expect, it } from 'vitest'
import { buildProblem } from '../../shared/engine/problem/build'
import { toIsing } from '../../shared/engine/problem/convert'
import { groundStates } from '../../shared/engine/problem/enumerate'
import type { Problem } from '../../shared/engine/problem/problem'
import { createRandom } from '../../shared/engine/random'

let highs: Awaited<ReturnType<typeof loadHighs>>
beforeAll(async () => {
  highs = await loadHighs()
})

/** Sums squares of affine functions, products and linear terms into a QUBO. */
class Polynomial {
  private readonly rows: number[] = []
  private readonly cols: number[] = []
  private readonly values: number[] = []
  private offset = 0

  constructor(private readonly n: number) {}

  add(weight: number, ...variables: number[]): this {
    const [i, j] = variables
    if (i === undefined) this.offset += weight
    else {
      this.rows.push(i)
      this.cols.push(j ?? i)
      this.values.push(weight)
    }
    return this
  }

  /** weight·(constant + Σ coefficient·x)², with x² = x. */
  addSquare(
    weight: number,
    constant: number,
    terms: readonly (readonly [coefficient: number, variable: number])[],
  ): this {
    this.add(weight * constant * constant)
    for (const [c, i] of terms) this.add(2 * weight * constant * c, i)
    for (const [c, i] of terms) for (const [d, j] of terms) this.add(weight * c * d, i, j)
    return this
  }

  build(): Problem {
    return buildProblem(this.n, { rows: this.rows, cols: this.cols, values: this.values }, this.offset).problem
  }
}

/** Optimum of the linearised QUBO: y_ij ≤ x_i, y_ij ≤ x_j, y_ij ≥ x_i + x_j − 1. */
function mipOptimum(qubo: Problem): number {
  const signed = (value: number, name: string): string => `${value < 0 ? '-' : '+'} ${Math.abs(value)} ${name}`
  const objective = [
    ...Array.from(qubo.linear, (value, i) => signed(value, `x${i}`)),
    ...Array.from(qubo.values, (value, k) => signed(value, `y${k}`)),
  ]
  const rules = Array.from(qubo.values, (_, k) => {
    const [i, j] = [qubo.rows[k], qubo.cols[k]]
    return ` y${k} - x${i} <= 0\n y${k} - x${j} <= 0\n y${k} - x${i} - x${j} >= -1\n`
  })
  const names = Array.from(qubo.linear, (_, i) => `x${i}`)
  const text = `Minimize\n obj: ${objective.join('\n ')}\nSubject To\n${rules.join('')} free: x0 >= 0\nBinaries\n ${names.join('\n ')}\nEnd\n`
  const solution = highs.solve(text, { output_flag: false })
  expect(solution.Status).toBe('Optimal')
  return solution.ObjectiveValue + qubo.offset
}

/** Checks that all three answers agree and gives the QUBO's ground states. */
function solve(qubo: Problem): ReturnType<typeof groundStates> {
  const found = groundStates(qubo, 'qubo')
  const asIsing = groundStates(toIsing(qubo), 'ising')
  expect(asIsing.energy).toBeCloseTo(found.energy, 9)
  expect(asIsing.count).toBe(found.count)
  expect(mipOptimum(qubo)).toBeCloseTo(found.energy, 6)
  return found
}

type Edge = readonly [number, number]
const complete = (n: number): Edge[] =>
  Array.from({ length: n }, (_, i) => Array.from({ length: i }, (__, j): Edge => [j, i])).flat()
const cycle = (n: number): Edge[] => Array.from({ length: n }, (_, i): Edge => [i, (i + 1) % n])
const petersen: Edge[] = Array.from({ length: 5 }, (_, i): Edge[] => [
  [i, (i + 1) % 5],
  [i, i + 5],
  [i + 5, ((i + 2) % 5) + 5],
]).flat()

/** The best value of a function over all subsets of n things, given as arrays of 0 and 1. */
function bestSubset(n: number, value: (chosen: readonly number[]) => number): number {
  let best = -Infinity
  for (let code = 0; code < 2 ** n; code++)
    best = Math.max(best, value(Array.from({ length: n }, (_, i) => (code >> i) & 1)))
  return best
}

describe('maximum cut', () => {
  // A cut edge has exactly one end inside: x_i + x_j − 2x_i x_j.
  const maxCut = (n: number, edges: readonly Edge[]): Problem => {
    const polynomial = new Polynomial(n)
    for (const [i, j] of edges) polynomial.add(-1, i).add(-1, j).add(2, i, j)
    return polynomial.build()
  }

  it.each([2, 3, 4, 5, 6, 7, 8, 9])('of K_%i is ⌊n²/4⌋ (closed form)', (n) => {
    const found = solve(maxCut(n, complete(n)))
    expect(found.energy).toBe(-Math.floor((n * n) / 4))
    // Any balanced split is optimal.
    const choose = Array.from({ length: Math.floor(n / 2) }, (_, k) => (n - k) / (k + 1)).reduce((a, b) => a * b, 1)
    expect(found.count).toBe(Math.round(n % 2 === 0 ? choose : 2 * choose))
  })

  it('of C_5 is 4 and of even cycles all edges (closed form)', () => {
    expect(solve(maxCut(5, cycle(5))).energy).toBe(-4)
    expect(solve(maxCut(8, cycle(8)))).toMatchObject({ energy: -8, count: 2 })
  })

  it('of the Petersen graph is 12 (published value)', () => {
    expect(solve(maxCut(10, petersen)).energy).toBe(-12)
  })
})

describe('number partitioning (Lucas section 2.1)', () => {
  // (Σ n_i s_i)² with s = 2x − 1.
  const partition = (numbers: readonly number[]): Problem => {
    const total = numbers.reduce((sum, value) => sum + value, 0)
    return new Polynomial(numbers.length)
      .addSquare(
        1,
        -total,
        numbers.map((value, i) => [2 * value, i]),
      )
      .build()
  }

  it('splits evenly where that can be done', () => {
    expect(solve(partition([4, 5, 6, 7, 8]))).toMatchObject({ energy: 0, count: 2 })
  })

  it('leaves the least difference found by search', () => {
    const random = createRandom(61)
    for (let trial = 0; trial < 4; trial++) {
      const numbers = Array.from({ length: 8 }, () => 1 + random.below(60))
      const least = -bestSubset(8, (side) => -Math.abs(numbers.reduce((sum, v, i) => sum + (side[i] ? v : -v), 0)))
      expect(solve(partition(numbers)).energy).toBe(least * least)
    }
  })
})

describe('vertex cover (Lucas section 4.3)', () => {
  // 2·Σ_edges (1 − x_u)(1 − x_v) + Σ x_v: with A > B every ground state is a cover.
  const cover = (n: number, edges: readonly Edge[]): Problem => {
    const polynomial = new Polynomial(n)
    for (const [u, v] of edges) polynomial.add(2).add(-2, u).add(-2, v).add(2, u, v)
    for (let v = 0; v < n; v++) polynomial.add(1, v)
    return polynomial.build()
  }

  it.each([
    ['K_6', 6, complete(6), 5],
    ['C_7', 7, cycle(7), 4],
    // Independence number of the Petersen graph is 4 (standard result), so its least cover has 6 vertices.
    ['the Petersen graph', 10, petersen, 6],
  ] as const)('of %s', (_, n, edges, size) => {
    const found = solve(cover(n, edges))
    expect(found.energy).toBe(size)
    for (const state of found.states) for (const [u, v] of edges) expect(state[u]! + state[v]!).toBeGreaterThan(0)
  })
})

describe('exact cover (Lucas section 4.1)', () => {
  // Knuth's example (Dancing links, 2000, section "Exact cover problems"): rows 1, 4 and 5 cover 7 columns exactly.
  const sets = [
    [2, 4, 5],
    [0, 3, 6],
    [1, 2, 5],
    [0, 3],
    [1, 6],
    [3, 4, 6],
  ]
  const exactCover = (elements: number, chosen: readonly (readonly number[])[]): Problem => {
    const polynomial = new Polynomial(chosen.length)
    for (let e = 0; e < elements; e++)
      polynomial.addSquare(
        1,
        1,
        chosen.flatMap((set, i) => (set.includes(e) ? [[-1, i] as const] : [])),
      )
    return polynomial.build()
  }

  it('finds the one cover', () => {
    const found = solve(exactCover(7, sets))
    expect(found).toMatchObject({ energy: 0, count: 1 })
    expect([...found.states[0]!]).toEqual([1, 0, 0, 1, 1, 0])
  })

  it('stays above zero where there is none', () => {
    expect(solve(exactCover(7, sets.slice(1))).energy).toBeGreaterThan(0)
  })
})

describe('graph colouring (Lucas section 6.1)', () => {
  // Σ_v (1 − Σ_c x_vc)² + Σ_edges Σ_c x_uc x_vc; ground energy 0 exactly when a colouring exists, and each proper
  // colouring is one ground state, so their number is the chromatic polynomial at the number of colours.
  const colouring = (n: number, edges: readonly Edge[], colours: number): Problem => {
    const polynomial = new Polynomial(n * colours)
    const at = (v: number, c: number): number => v * colours + c
    for (let v = 0; v < n; v++)
      polynomial.addSquare(
        1,
        1,
        Array.from({ length: colours }, (_, c) => [-1, at(v, c)] as const),
      )
    for (const [u, v] of edges) for (let c = 0; c < colours; c++) polynomial.add(1, at(u, c), at(v, c))
    return polynomial.build()
  }

  it('counts the colourings of cycles: (k − 1)ⁿ + (−1)ⁿ(k − 1)', () => {
    expect(solve(colouring(5, cycle(5), 3))).toMatchObject({ energy: 0, count: 2 ** 5 - 2 })
    expect(solve(colouring(4, cycle(4), 3))).toMatchObject({ energy: 0, count: 2 ** 4 + 2 })
    expect(solve(colouring(6, cycle(6), 2))).toMatchObject({ energy: 0, count: 2 })
  })

  it('finds no 3-colouring of K_4 and no 2-colouring of C_5', () => {
    expect(solve(colouring(4, complete(4), 3)).energy).toBe(1)
    expect(solve(colouring(5, cycle(5), 2)).energy).toBe(1)
  })
})

describe('set packing (Lucas section 4.2)', () => {
  it('packs as many disjoint sets as search does', () => {
    const random = createRandom(71)
    const sets = Array.from({ length: 9 }, () => new Set(Array.from({ length: 3 }, () => random.below(12))))
    const meet = (i: number, j: number): boolean => [...sets[i]!].some((e) => sets[j]!.has(e))
    const clashes = complete(9).filter(([i, j]) => meet(i, j))
    const polynomial = new Polynomial(9)
    for (let i = 0; i < 9; i++) polynomial.add(-1, i)
    for (const [i, j] of clashes) polynomial.add(2, i, j)
    const most = bestSubset(9, (chosen) =>
      clashes.some(([i, j]) => chosen[i] && chosen[j]) ? -Infinity : chosen.reduce((sum, bit) => sum + bit, 0),
    )
    expect(solve(polynomial.build()).energy).toBe(-most)
  })
})

describe('knapsack with integer weights (Lucas section 5.2)', () => {
  it('earns as much as search does', () => {
    const weights = [3, 4, 5, 9, 4]
    const gains = [3, 4, 4, 10, 4]
    const capacity = 11
    // The weight used is written in binary with the last digit cut to the capacity: 1, 2, 4, 4.
    const digits = [1, 2, 4, capacity - 7]
    const polynomial = new Polynomial(weights.length + digits.length)
    gains.forEach((gain, i) => polynomial.add(-gain, i))
    polynomial.addSquare(11, 0, [
      ...weights.map((weight, i) => [weight, i] as const),
      ...digits.map((digit, k) => [-digit, weights.length + k] as const),
    ])
    const dot = (list: readonly number[], chosen: readonly number[]): number =>
      list.reduce((sum, value, i) => sum + value * chosen[i]!, 0)
    const most = bestSubset(5, (chosen) => (dot(weights, chosen) > capacity ? -Infinity : dot(gains, chosen)))
    expect(solve(polynomial.build()).energy).toBe(-most)
  })
})
