import { describe, expect, it } from 'vitest'
import { assessPenalties } from '../../../../../shared/engine/problem/groups/penalty'
import { holds, type VariableGroup } from '../../../../../shared/engine/problem/groups/group'
import type { Problem } from '../../../../../shared/engine/problem/problem'
import { createRandom, shuffle, type Random } from '../../../../../shared/engine/random'
import { linesOfSquare, tour, Written } from '../../../../fixtures/problems/penalties'
import {
  energyByDefinition,
  randomProblem,
  real,
  smallInteger,
  stateOf,
} from '../../../../fixtures/problems/random-problem'

const range = (from: number, to: number) => Array.from({ length: to - from }, (_, i) => from + i)

/** All states of lowest energy, up to rounding, by looking at every state. */
function optima(problem: Problem): number[][] {
  const states = range(0, 2 ** problem.n).map((code) => stateOf(code, problem.n, [0, 1]))
  const energies = states.map((state) => energyByDefinition(problem, state))
  const least = Math.min(...energies)
  return states.filter((_, code) => energies[code]! <= least + 1e-9)
}

const keeps = (state: number[], { kind, k, members }: VariableGroup) =>
  holds({ kind, k }, members.filter((i) => state[i] === 1).length)

function withPenalties(n: number, rest: Problem, groups: readonly VariableGroup[], P: number): Problem {
  const written = new Written()
  rest.linear.forEach((value, i) => written.add(i, i, value))
  rest.values.forEach((value, k) => written.add(rest.rows[k]!, rest.cols[k]!, value))
  for (const { kind, k, members } of groups)
    if (kind === 'exactly') written.exactly(members, k, P)
    else written.atMostOne(members, P)
  return written.problem(n)
}

/** Groups without a common variable, in random places. */
function apart(random: Random): VariableGroup[] {
  const places = range(0, 9)
  shuffle(places, random)
  return [places.slice(0, 4), places.slice(4, 7 + random.below(2))].map((members) => ({
    kind: random.below(2) === 0 ? 'exactly' : 'at most',
    k: 1,
    members: members.sort((a, b) => a - b),
  }))
}

/** The objective couples no pair of one group, so that the weight can be read off. */
function objective(random: Random, groups: readonly VariableGroup[]): Problem {
  const drawn = randomProblem(random, 9, 0.6, random.below(2) === 0 ? real : smallInteger)
  const kept = Array.from(drawn.values.keys()).filter(
    (k) => !groups.some(({ members }) => members.includes(drawn.rows[k]!) && members.includes(drawn.cols[k]!)),
  )
  const pick = <T>(list: ArrayLike<T>) => kept.map((k) => list[k]!)
  return {
    ...drawn,
    rows: Uint32Array.from(pick(drawn.rows)),
    cols: Uint32Array.from(pick(drawn.cols)),
    values: Float64Array.from(pick(drawn.values)),
  }
}

describe('the penalty bound', () => {
  it('is enough: with a P above it every optimum keeps the groups', () => {
    let breaksBelow = 0
    for (let seed = 1; seed <= 60; seed++) {
      const random = createRandom(seed)
      const groups = apart(random).map((group, g) =>
        g === 0 && group.kind === 'exactly' ? { ...group, k: 1 + random.below(3) } : group,
      )
      const rest = objective(random, groups)
      const bounds = assessPenalties(withPenalties(9, rest, groups, 1000), groups)
      const enough = Math.max(...bounds.map(({ sufficient }) => sufficient!))
      const strong = withPenalties(9, rest, groups, enough + 1e-6)
      for (const state of optima(strong)) for (const group of groups) expect(keeps(state, group)).toBe(true)
      const weak = withPenalties(9, rest, groups, enough / 8 + 1e-9)
      if (optima(weak).some((state) => groups.some((group) => !keeps(state, group)))) breaksBelow++
    }
    // The bound is no empty word: far below it groups do break.
    expect(breaksBelow).toBeGreaterThan(10)
  })

  it('is enough for groups that share variables too', () => {
    for (let seed = 1; seed <= 10; seed++) {
      const random = createRandom(seed)
      const groups = linesOfSquare(3).map((members) => ({ kind: 'exactly' as const, k: 1, members }))
      const rest = objective(random, groups)
      const [first] = assessPenalties(withPenalties(9, rest, groups, 5000), groups)
      expect(first!.overlaps).toBe(3)
      const strong = withPenalties(9, rest, groups, first!.sufficient! + 1e-6)
      for (const state of optima(strong)) for (const group of groups) expect(keeps(state, group)).toBe(true)
    }
  })

  it('is worked out by hand on three crews for a duty', () => {
    // 10 (x0 + x1 + x2 − 1)² + 2 x0 + 5 x1 + x2 − 4 x2 x3
    const problem = new Written()
      .exactly([0, 1, 2], 1, 10)
      .add(0, 0, 2)
      .add(1, 1, 5)
      .add(2, 2, 1)
      .add(2, 3, -4)
      .problem(4)
    const group: VariableGroup = { kind: 'exactly', k: 1, members: [0, 1, 2] }
    // Switching off gains at most −2, −5 and −1 + 4: the second largest is −2. Switching on costs 2, 5, 1: the least is 1.
    expect(assessPenalties(problem, [group])).toEqual([
      {
        weight: 10,
        pairs: 3,
        pairsDeviating: 0,
        greatestDeviation: 0,
        overlaps: 0,
        single: 1,
        sufficient: 1,
        verdict: 'larger than needed',
      },
    ])
  })

  it('names the weight that dominates, and the pairs that differ from it', () => {
    const problem = new Written().exactly([0, 1, 2, 3], 1, 10).add(0, 1, -3).add(2, 3, -20).problem(4)
    const [report] = assessPenalties(problem, [{ kind: 'exactly', k: 1, members: [0, 1, 2, 3] }])
    expect(report).toMatchObject({ weight: 10, pairs: 6, pairsDeviating: 2, greatestDeviation: 20 })
  })

  it('of groups that share variables counts all that touches them, by hand', () => {
    // Two groups share x2. Outside: x5 and x6. Left when both penalties are off: 3 x0, −2 x0 x4, 5 x4 x5; not 7 x5 x6.
    const problem = new Written()
      .exactly([0, 1, 2], 1, 10)
      .exactly([2, 3, 4], 1, 10)
      .add(0, 0, 3)
      .add(0, 4, -2)
      .add(4, 5, 5)
      .add(5, 6, 7)
      .problem(7)
    const groups = [
      { kind: 'exactly' as const, k: 1, members: [0, 1, 2] },
      { kind: 'exactly' as const, k: 1, members: [2, 3, 4] },
    ]
    for (const { sufficient, overlaps, verdict } of assessPenalties(problem, groups))
      expect({ sufficient, overlaps, verdict }).toEqual({
        sufficient: 10,
        overlaps: 1,
        verdict: 'beats single changes',
      })
  })

  it('has no weight where none dominates or none is possible', () => {
    const problem = new Written().add(0, 1, 2).add(1, 2, 3).add(0, 2, 4).problem(3)
    const reports = assessPenalties(problem, [
      { kind: 'exactly', k: 1, members: [0, 1, 2] },
      { kind: 'at least', k: 1, members: [0, 1, 2] },
      { kind: 'at most', k: 2, members: [0, 1, 2] },
    ])
    for (const report of reports) expect(report).toMatchObject({ weight: null, sufficient: null, verdict: null })
  })

  it('of a tour beats single changes once it outweighs two of the longest legs', () => {
    const groups = linesOfSquare(6).map((members) => ({ kind: 'exactly' as const, k: 1, members }))
    const verdictAt = (P: number) => assessPenalties(tour(6, P, createRandom(2)), groups)[0]!
    expect(verdictAt(19)).toMatchObject({ verdict: 'beats single changes', overlaps: 6 })
    expect(verdictAt(19).single).toBeLessThanOrEqual(18)
    expect(verdictAt(2).verdict).toBe('may be too weak')
    expect(verdictAt(19).sufficient).toBeGreaterThan(100)
  })
})
