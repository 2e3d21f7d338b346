/**
 * Optima that are known in closed form or can be had from outside, by every method: the maximum cut of K_n is ⌊n²/4⌋
 * (halves as equal as possible), of an odd cycle C_n it is n − 1 (one edge must stay inside), of the Petersen graph 12;
 * of Zachary's karate club (An information flow model for conflict and fission in small groups, J. Anthropol. Res. 33,
 * 1977; the edges as the npm package graphology-generators 0.11.2, MIT, ships them) whatever HiGHS proves on a
 * linearisation written down here anew.
 */
import loadHighs from 'highs'
import { beforeAll, describe, expect, it } from 'vitest'
import type { Control } from '../../shared/engine/control'
import type { Graph } from '../../shared/engine/graph/graph'
import { graphFromEdges } from '../../shared/engine/graph/build'
import { annealRestarts } from '../../shared/engine/problem/optimum/anneal-restarts'
import { minimiseByElimination } from '../../shared/engine/problem/optimum/eliminate'
import { enumerateSlice, mergeSlices, sliceCount } from '../../shared/engine/problem/optimum/enumerate-slice'
import {
  annealedOutcome,
  assembleOptimum,
  eliminatedOutcome,
  enumeratedOutcome,
} from '../../shared/engine/problem/optimum/outcome'
import type { OptimumMethod, OptimumPart } from '../../shared/engine/problem/optimum/plan'
import { planOptimum } from '../../shared/engine/problem/optimum/plan'
import type { Problem } from '../../shared/engine/problem/problem'
import { completeGraph, cycleGraph } from '../fixtures/graphs'

const PETERSEN = graphFromEdges(
  10,
  [0, 1, 2, 3, 4].flatMap((i) => [i, (i + 1) % 5, i, i + 5, i + 5, ((i + 2) % 5) + 5]),
)
/** Neighbours of higher number of each member. */
const KARATE =
  '0:1,2,3,4,5,6,7,8,10,11,12,13,17,19,21,31 1:2,3,7,13,17,19,21,30 2:3,7,8,9,13,27,28,32 3:7,12,13 4:6,10 5:6,10,16 6:16 8:30,32,33 9:33 13:33 14:32,33 15:32,33 18:32,33 19:33 20:32,33 22:32,33 23:25,27,29,32,33 24:25,27,31 25:31 26:29,33 27:33 28:31,33 29:32,33 30:32,33 31:32,33 32:33'
const KARATE_CLUB = graphFromEdges(
  34,
  KARATE.split(' ').flatMap((line) => {
    const [from, to] = line.split(':')
    return to!.split(',').flatMap((other) => [Number(from), Number(other)])
  }),
)

const sizeOf = (graph: Graph): number => graph.ends.length / 2
const idle: Control<unknown> = { now: () => 0, cancelled: () => false, report: () => {} }

/** Equal spins cost 1 an edge: the cut is (edges − energy) / 2. */
const cutProblem = (graph: Graph): Problem => ({
  n: graph.order,
  linear: new Float64Array(graph.order),
  rows: graph.ends.filter((_, k) => k % 2 === 0),
  cols: graph.ends.filter((_, k) => k % 2 === 1),
  values: new Float64Array(sizeOf(graph)).fill(1),
  offset: 0,
})

function solvePart(part: OptimumPart) {
  const { qubo } = part
  if (part.method === 'enumeration') {
    const slices = Array.from({ length: sliceCount(qubo.n) }, (_, slice) => enumerateSlice(qubo, slice, idle))
    return enumeratedOutcome(part, mergeSlices(slices, 0), null)
  }
  if (part.method === 'tree decomposition')
    return eliminatedOutcome(part, minimiseByElimination(qubo, part.elimination!, idle), null)
  return annealedOutcome(part, annealRestarts(qubo, { first: 0, restarts: 16, sweeps: 500, seed: 1 }, idle))
}

function maximumCut(graph: Graph, asked: OptimumMethod) {
  const problem = cutProblem(graph)
  const plan = planOptimum(problem, 'ising', asked)
  const { energy, proved, state } = assembleOptimum(problem, 'ising', plan, plan.parts.map(solvePart))
  let crossing = 0
  for (let k = 0; k < sizeOf(graph); k++) if (state[graph.ends[2 * k]!] !== state[graph.ends[2 * k + 1]!]) crossing++
  expect(crossing).toBe((sizeOf(graph) - energy) / 2)
  return { cut: crossing, proved }
}

const METHODS = ['enumeration', 'tree decomposition', 'annealing'] as const

describe.each(METHODS)('maximum cuts by %s', (method) => {
  const proved = method !== 'annealing'

  it.each([2, 3, 8, 13, 18])('of K_%i', (n) => {
    expect(maximumCut(completeGraph(n), method).cut).toBe(Math.floor((n * n) / 4))
  })

  it.each([3, 5, 9, 21])('of the cycle C_%i', (n) => {
    expect(maximumCut(cycleGraph(n), method)).toMatchObject({ cut: n - 1, ...(proved ? { proved } : {}) })
  })

  it('of the Petersen graph', () => {
    expect(maximumCut(PETERSEN, method)).toMatchObject({ cut: 12, ...(proved ? { proved } : {}) })
  })
})

describe('the karate club', () => {
  let fromOutside = 0
  beforeAll(async () => {
    const highs = await loadHighs()
    // z_k = 1 where edge k is cut: at most the difference of its ends, and at most what is left when both are up.
    const size = sizeOf(KARATE_CLUB)
    const ends = (k: number): string[] => [0, 1].map((side) => `x${KARATE_CLUB.ends[2 * k + side]}`)
    const rows = Array.from({ length: size }, (_, k) => {
      const [a, b] = ends(k)
      return ` z${k} - ${a} - ${b} <= 0\n z${k} + ${a} + ${b} <= 2\n`
    })
    const names = Array.from({ length: size }, (_, k) => `z${k}`)
    const members = Array.from({ length: 34 }, (_, i) => ` x${i}\n`)
    const text = `Maximize\n obj: ${names.join(' + ')}\nSubject To\n${rows.join('')}Bounds\n x33 = 0\nBinaries\n${members.join('')}End\n`
    const solution = highs.solve(text, { output_flag: false })
    expect(solution.Status).toBe('Optimal')
    fromOutside = Math.round(solution.ObjectiveValue)
  })

  it('is the published graph', () => {
    expect(sizeOf(KARATE_CLUB)).toBe(78)
    const degrees = Array.from({ length: 34 }, (_, v) => KARATE_CLUB.offsets[v + 1]! - KARATE_CLUB.offsets[v]!)
    expect(Math.max(...degrees)).toBe(17)
  })

  it.each(['tree decomposition', 'annealing'] as const)(
    'has the maximum cut that the MIP solver proves, by %s',
    (method) => {
      const { cut, proved } = maximumCut(KARATE_CLUB, method)
      expect(cut).toBe(fromOutside)
      if (method === 'tree decomposition') expect(proved).toBe(true)
    },
  )
})
