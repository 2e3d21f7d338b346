import { describe, expect, it } from 'vitest'
import { buildProblem } from '../../../../../shared/engine/problem/build'
import { convertForm } from '../../../../../shared/engine/problem/convert'
import { recogniseGroups } from '../../../../../shared/engine/problem/groups/recognise'
import type { Problem } from '../../../../../shared/engine/problem/problem'
import { createRandom, shuffle } from '../../../../../shared/engine/random'
import { linesOfSquare, tour, Written } from '../../../../fixtures/problems/penalties'
import { randomProblem, real, smallInteger } from '../../../../fixtures/problems/random-problem'

const range = (from: number, to: number) => Array.from({ length: to - from }, (_, i) => from + i)
const membersOf = (problem: Problem) =>
  recogniseGroups(problem)
    .groups.map(({ members }) => members.join(' '))
    .sort()
const asText = (sets: number[][]) => sets.map((set) => [...set].sort((a, b) => a - b).join(' ')).sort()

/** All maximal sets of three variables or more whose pairs are all coupled by one value, by looking at every set. */
function equalCliques(problem: Problem): string[] {
  const coupling = (a: number, b: number) =>
    problem.values[Array.from(problem.rows).findIndex((row, k) => row === a && problem.cols[k] === b)] ?? 0
  const table = range(0, problem.n).map((a) => range(0, problem.n).map((b) => (a < b ? coupling(a, b) : 0)))
  const valueOf = (set: number[]): number | null => {
    const values = set.flatMap((a, i) => set.slice(i + 1).map((b) => table[a]![b]!))
    return values.length > 0 && values.every((value) => value === values[0] && value > 0) ? values[0]! : null
  }
  const sets = range(0, 2 ** problem.n).map((code) => range(0, problem.n).filter((i) => (code >> i) & 1))
  const good = sets.filter((set) => set.length >= 3 && valueOf(set) !== null)
  return good
    .filter((set) => !good.some((other) => other.length > set.length && set.every((i) => other.includes(i))))
    .map((set) => set.join(' '))
    .sort()
}

describe('recognised groups', () => {
  it('are those that a look at every set of variables finds, where groups share no pair', () => {
    for (let seed = 1; seed <= 12; seed++) {
      const random = createRandom(seed)
      const places = range(0, 12)
      shuffle(places, random)
      const sizes = [
        [3, 4, 5],
        [4, 4, 4],
        [6, 3, 3],
        [3, 3, 3],
      ][seed % 4]!
      const written = new Written()
      let at = 0
      for (const size of sizes) written.exactly(places.slice(at, (at += size)), 1, 8)
      const problem = written.problem(12)
      expect(membersOf(problem)).toEqual(equalCliques(problem))
    }
  })

  it('tell k and P, under any names of the variables', () => {
    const random = createRandom(3)
    const names = range(0, 30)
    shuffle(names, random)
    const [a, b, c] = [names.slice(0, 8), names.slice(8, 15), names.slice(15, 20)]
    const problem = new Written().exactly(a, 2, 5).exactly(b, 1, 7.3).exactly(c, 4, 0.1).problem(30)
    const found = recogniseGroups(problem).groups.map(({ kind, k, weight, members }) => ({ kind, k, weight, members }))
    const sorted = (list: number[]) => [...list].sort((x, y) => x - y)
    expect(found).toEqual([
      { kind: 'exactly', k: 2, weight: 5, members: sorted(a) },
      { kind: 'exactly', k: 1, weight: 7.3, members: sorted(b) },
      { kind: 'exactly', k: 4, weight: 0.1, members: sorted(c) },
    ])
  })

  it.each([3, 4, 5, 9])('of a square of %i × %i are its rows and columns', (n) => {
    const written = new Written()
    for (const line of linesOfSquare(n)) written.exactly(line, 1, 4)
    const { groups, complete } = recogniseGroups(written.problem(n * n))
    expect(complete).toBe(true)
    expect(asText(groups.map(({ members }) => [...members]))).toEqual(asText(linesOfSquare(n)))
    for (const { kind, k } of groups) expect({ kind, k }).toEqual({ kind: 'exactly', k: 1 })
  })

  it('of a tour of n cities are 2n, in either form', () => {
    for (const n of [4, 6, 12]) {
      const problem = tour(n, 40, createRandom(n))
      const there = convertForm(convertForm(problem, 'qubo', 'ising'), 'ising', 'qubo')
      for (const given of [problem, there]) expect(membersOf(given)).toEqual(asText(linesOfSquare(n)))
    }
  })

  it('with rows and columns of different weight are found together', () => {
    const lines = linesOfSquare(5)
    const written = new Written()
    lines.forEach((line, g) => written.exactly(line, 1, g < 5 ? 3 : 11))
    const { groups } = recogniseGroups(written.problem(25))
    expect(asText(groups.map(({ members }) => [...members]))).toEqual(asText(lines))
    expect(groups.filter(({ weight, k }) => weight === 3 && k === 1)).toHaveLength(5)
    expect(groups.filter(({ weight, k }) => weight === 11 && k === 1)).toHaveLength(5)
  })

  it('demand at most one where no linear term rewards a member beyond its own weight', () => {
    const random = createRandom(8)
    const written = new Written()
    const sets = [range(0, 4), range(4, 8), range(8, 12)]
    for (const set of sets) written.atMostOne(set, 6)
    for (let i = 0; i < 12; i++) written.add(i, i, -1 - random.below(2))
    const { groups } = recogniseGroups(written.problem(12))
    expect(groups.map(({ kind, k, weight, members }) => ({ kind, k, weight, members }))).toEqual(
      sets.map((members) => ({ kind: 'at most', k: 1, weight: 6, members })),
    )
  })

  it('are found when the objective changes some of their couplings', () => {
    for (let seed = 1; seed <= 15; seed++) {
      const random = createRandom(seed)
      const sets = range(0, 5).map((g) => range(6 * g, 6 * g + 6))
      const written = new Written()
      for (const set of sets) written.exactly(set, 1, 20)
      // Two pairs of each set, no variable twice, and couplings between the sets.
      for (const [a, b, c, d] of sets) written.add(a!, b!, -1 - random.float()).add(c!, d!, 2 * random.normal())
      for (let i = 0; i < 30; i++) written.add(i, i, random.normal())
      for (let k = 0; k < 60; k++) {
        const [a, b] = [random.below(30), random.below(30)]
        if (Math.floor(a / 6) !== Math.floor(b / 6)) written.add(a, b, 3 * random.normal())
      }
      const { groups } = recogniseGroups(written.problem(30))
      expect(asText(groups.map(({ members }) => [...members]))).toEqual(asText(sets))
      for (const { kind, k, weight } of groups)
        expect({ kind, k, weight }).toEqual({ kind: 'exactly', k: 1, weight: 20 })
    }
  })

  it('are found when every coupling carries a little noise', () => {
    const random = createRandom(7)
    const sets = range(0, 8).map((g) => range(6 * g, 6 * g + 6))
    const written = new Written()
    for (const set of sets) written.exactly(set, 1, 5)
    for (let a = 0; a < 48; a++) for (let b = a; b < 48; b++) written.add(a, b, 0.05 * random.normal())
    expect(membersOf(written.problem(48))).toEqual(asText(sets))
  })

  it('are seldom seen in random problems: about one in 32 of the small, none of the larger', () => {
    const flips = (n: number, density: number, seed: number): Problem => {
      const random = createRandom(seed)
      const draw = () => (random.below(2) === 1 ? 1 : -1)
      const ising = randomProblem(random, n, density, draw)
      return convertForm({ ...ising, linear: new Float64Array(n) }, 'ising', 'qubo')
    }
    const share = (problems: Problem[]) => problems.filter((one) => recogniseGroups(one).groups.length > 0).length
    expect(share(range(0, 64).map((seed) => flips(9, 1, seed)))).toBeLessThanOrEqual(4)
    for (const [n, density] of [
      [24, 0.5],
      [30, 1],
      [60, 0.1],
    ] as const)
      expect(share(range(0, 12).map((seed) => flips(n, density, seed)))).toBe(0)
    expect(share(range(0, 12).map((seed) => randomProblem(createRandom(seed), 30, 1, real)))).toBe(0)
    expect(share(range(0, 12).map((seed) => randomProblem(createRandom(seed), 30, 1, smallInteger)))).toBe(0)
  })

  it('are none where nothing is coupled, and stop at the work allowed', () => {
    expect(recogniseGroups(buildProblem(0, { rows: [], cols: [], values: [] }, 0).problem)).toEqual({
      groups: [],
      complete: true,
    })
    expect(recogniseGroups(tour(6, 40, createRandom(1)), { maxWork: 200 }).complete).toBe(false)
  })
})
