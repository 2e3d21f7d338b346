import { describe, expect, it } from 'vitest'
import { isBalanced, triangles } from '../../../../shared/engine/problem/balance'
import { buildProblem } from '../../../../shared/engine/problem/build'
import { underControlError } from '../../../../shared/engine/problem/control-error'
import { convertForm } from '../../../../shared/engine/problem/convert'
import { interactionGraph } from '../../../../shared/engine/problem/interaction-graph'
import type { Problem } from '../../../../shared/engine/problem/problem'
import { structureDetails } from '../../../../shared/engine/problem/structure-details'
import { symmetriesOf } from '../../../../shared/engine/problem/symmetry'
import { createRandom } from '../../../../shared/engine/random'
import {
  energyByDefinition,
  randomProblem,
  real,
  smallInteger,
  stateOf,
} from '../../../fixtures/problems/random-problem'

const range = (n: number) => Array.from({ length: n }, (_, i) => i)
const spins = (n: number) => range(2 ** n).map((code) => stateOf(code, n, [-1, 1]))
const small = (seed: number, draw = smallInteger): Problem => {
  const random = createRandom(seed)
  return randomProblem(random, 2 + random.below(6), random.float(), draw)
}
/** Few different values, so that symmetries do come up. */
const signs = (seed: number): Problem => {
  const random = createRandom(seed)
  const ising = randomProblem(random, 2 + random.below(6), 0.7, () => (random.below(4) === 0 ? -1 : 1))
  return random.below(2) === 0 ? ising : { ...ising, linear: ising.linear.map(() => 0) }
}

describe('balance', () => {
  it('is whether some state satisfies every coupling', () => {
    let balanced = 0
    for (let seed = 0; seed < 120; seed++) {
      const ising = small(seed)
      const satisfies = (state: number[]) =>
        Array.from(ising.values).every((J, k) => J * state[ising.rows[k]!]! * state[ising.cols[k]!]! < 0)
      const expected = spins(ising.n).some(satisfies)
      balanced += Number(expected)
      expect(isBalanced(interactionGraph(ising), ising.values)).toBe(expected)
    }
    expect(balanced).toBeGreaterThan(20)
    expect(balanced).toBeLessThan(100)
  })

  it('counts triangles, and those that no state satisfies whole', () => {
    for (let seed = 0; seed < 60; seed++) {
      const random = createRandom(seed)
      const ising = randomProblem(random, 12, random.float(), real)
      const J = new Map(Array.from(ising.rows, (row, k) => [`${row} ${ising.cols[k]}`, ising.values[k]!]))
      let [count, frustrated] = [0, 0]
      for (let a = 0; a < 12; a++)
        for (let b = a + 1; b < 12; b++)
          for (let c = b + 1; c < 12; c++) {
            const three = [J.get(`${a} ${b}`), J.get(`${b} ${c}`), J.get(`${a} ${c}`)]
            if (three.includes(undefined)) continue
            count++
            const [x, y, z] = three as number[]
            const isSatisfied = spins(3).some(([s, t, u]) => x! * s! * t! < 0 && y! * t! * u! < 0 && z! * s! * u! < 0)
            if (!isSatisfied) frustrated++
          }
      expect(triangles(interactionGraph(ising), ising.values)).toEqual({ count, frustrated })
    }
  })

  it('gives the count up where it would take too long', () => {
    const ising = randomProblem(createRandom(1), 20, 1, real)
    expect(triangles(interactionGraph(ising), ising.values, 50)).toBeNull()
  })
})

describe('symmetries', () => {
  const energies = (ising: Problem) =>
    new Map(spins(ising.n).map((state) => [state.join(), energyByDefinition(ising, state)]))

  it('are the swaps that never change an energy, by trying each on every state', () => {
    let met = 0
    for (let seed = 0; seed < 200; seed++) {
      const ising = signs(seed)
      const table = energies(ising)
      const degree = (v: number) => Array.from(ising.rows).filter((row, k) => row === v || ising.cols[k] === v).length
      const trades = (a: number, b: number) =>
        spins(ising.n).every((state) => {
          const swapped = state.map((s, i) => (i === a ? state[b]! : i === b ? state[a]! : s))
          return table.get(swapped.join()) === table.get(state.join())
        })
      const joined = range(ising.n).filter((v) => degree(v) > 0)
      const sets = new Set(joined.map((a) => joined.filter((b) => a === b || trades(a, b)).join()))
      const sizes = [...sets].map((set) => set.split(',').length).filter((size) => size > 1)
      met += sizes.length
      expect(symmetriesOf(interactionGraph(ising), ising).interchangeable).toEqual({
        sets: sizes.length,
        variables: sizes.reduce((sum, size) => sum + size, 0),
        largest: Math.max(0, ...sizes),
      })
    }
    expect(met).toBeGreaterThan(50)
  })

  it('are free variables and components whose mirror image is as good', () => {
    for (let seed = 0; seed < 80; seed++) {
      const ising = signs(seed)
      const table = energies(ising)
      const keeps = (set: number[]) =>
        spins(ising.n).every(
          (state) => table.get(state.map((s, i) => (set.includes(i) ? -s : s)).join()) === table.get(state.join()),
        )
      // Sets that can be turned over, none of them the union of others: each counts once.
      const flips = range(2 ** ising.n)
        .slice(1)
        .map((code) => range(ising.n).filter((i) => (code >> i) & 1))
        .filter(keeps)
      const least = flips.filter(
        (set) => !flips.some((other) => other.length < set.length && other.every((i) => set.includes(i))),
      )
      const { free, mirrored } = symmetriesOf(interactionGraph(ising), ising)
      expect([free, mirrored]).toEqual([
        least.filter(({ length }) => length === 1).length,
        least.filter(({ length }) => length > 1).length,
      ])
    }
  })
})

describe('coefficients under the control error', () => {
  const ising = buildProblem(
    4,
    { rows: [0, 1, 0, 1, 2], cols: [0, 1, 1, 2, 3], values: [4, 0.1, -2, 1, 0.05] },
    0,
  ).problem
  const ranges = { h: [-2, 2], J: [-1, 1], couplingSum: [-1, 1] } as const

  it('are counted after the largest was brought into its range', () => {
    // 4 → 2 and −2 → −1 ask for a half: fields 2 and 0.05, couplings −1, 0.5 and 0.025.
    expect(underControlError(ising, { ranges, sigmaH: 0.03, sigmaJ: 0.02 })).toEqual({
      scale: 0.5,
      coefficients: 5,
      fieldsUnder: 1,
      interactionsUnder: 1,
    })
    expect(underControlError(ising, { ranges, sigmaH: 0.02, sigmaJ: 0.01 })).toMatchObject({
      fieldsUnder: 0,
      interactionsUnder: 0,
    })
  })

  it('are never scaled up, and all lost on a machine that has no room for them', () => {
    const wide = { h: [-40, 40], J: [-40, 40], couplingSum: null } as const
    expect(underControlError(ising, { ranges: wide, sigmaH: 0, sigmaJ: 0 })).toMatchObject({ scale: 1, fieldsUnder: 0 })
    const none = { h: [0, 0], J: [-1, 1], couplingSum: null } as const
    expect(underControlError(ising, { ranges: none, sigmaH: 0.1, sigmaJ: 0.1 })).toMatchObject({
      scale: 0,
      fieldsUnder: 2,
      interactionsUnder: 3,
    })
    expect(() => underControlError(ising, { ranges, sigmaH: -1, sigmaJ: 0 })).toThrow('control error')
  })
})

describe('structure details', () => {
  it('tell sizes, signs and values, and agree for both forms of one problem', () => {
    // A triangle, a pair and a lone variable.
    const ising = buildProblem(
      6,
      { rows: [0, 0, 1, 3, 0, 5], cols: [1, 2, 2, 4, 0, 5], values: [1, 1, -1, 2, -3, 0] },
      0,
    ).problem
    const details = structureDetails(ising, 'ising')
    expect(details).toMatchObject({
      treewidthLowerBound: 2,
      componentSizes: [
        { variables: 3, count: 1 },
        { variables: 2, count: 1 },
        { variables: 1, count: 1 },
      ],
      distinct: { linear: 1, interactions: 3 },
      fields: { negative: 1, zero: 5, positive: 0 },
      couplings: { negative: 1, zero: 0, positive: 3 },
      balanced: true,
      triangles: { count: 1, frustrated: 0 },
      symmetries: { free: 1, mirrored: 1, interchangeable: { sets: 2, variables: 4, largest: 2 } },
    })
    const qubo = structureDetails(convertForm(ising, 'ising', 'qubo'), 'qubo')
    expect({ ...qubo, distinct: null }).toEqual({ ...details, distinct: null })
  })
})
