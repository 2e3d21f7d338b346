/**
 * The fewest qubits that tiny problems need, found by trying every embedding (tests/fixtures/minors.ts), and how near the
 * engine comes. The exhaustive search is itself checked against integer programming solved by HiGHS: chains are disjoint,
 * each has a root that sends one unit of flow to each of its qubits along the machine's couplers, so it is connected, and
 * each interaction chooses a coupler with an end in either chain.
 */
import loadHighs from 'highs'
import { beforeAll, describe, expect, it } from 'vitest'
import { findEmbedding } from '../../shared/engine/embedding/search'
import { graphFromEdges } from '../../shared/engine/graph/build'
import type { Graph } from '../../shared/engine/graph/graph'
import { buildFabric } from '../../shared/engine/machine/build-fabric'
import type { PublishedFamily } from '../../shared/engine/machine/fabric'
import { createRandom } from '../../shared/engine/random'
import { completeGraph, cycleGraph, gridGraph } from '../fixtures/graphs'
import { familyTask, UNTIMED } from '../fixtures/methods'
import { chainLists, isMinorByContraction, leastQubits } from '../fixtures/minors'

let highs: Awaited<ReturnType<typeof loadHighs>>
beforeAll(async () => {
  highs = await loadHighs()
})

/** A hub joined to n others. */
const star = (n: number): Graph => graphFromEdges(n + 1, Array.from({ length: n }, (_, i) => [0, i + 1]).flat())
const binaryTree = graphFromEdges(7, [0, 1, 0, 2, 1, 3, 1, 4, 2, 5, 2, 6])
const bipartite = (a: number, b: number): Graph =>
  graphFromEdges(a + b, Array.from({ length: a * b }, (_, k) => [Math.floor(k / b), a + (k % b)]).flat())
/** A cycle of n with a hub joined to all of it. */
const wheel = (n: number): Graph =>
  graphFromEdges(n + 1, Array.from({ length: n }, (_, i) => [i, (i + 1) % n, i, n]).flat())

const CHIMERA: PublishedFamily = { kind: 'chimera', m: 2, n: 2, t: 2 }
const HALF_CHIMERA: PublishedFamily = { kind: 'chimera', m: 2, n: 1, t: 2 }
const SMALL_SQUARE: PublishedFamily = { kind: 'square', width: 3, height: 2 }
const SQUARE: PublishedFamily = { kind: 'square', width: 3, height: 3 }
const LARGER_SQUARE: PublishedFamily = { kind: 'square', width: 4, height: 4 }
const KING: PublishedFamily = { kind: 'king', width: 3, height: 3 }
const LARGER_KING: PublishedFamily = { kind: 'king', width: 4, height: 4 }

const whole = (machine: Graph): Uint8Array => new Uint8Array(machine.order).fill(1)

/** Least total of qubits by integer programming, with chains of at most `longest`; null when there is none. */
function leastByProgramming(problem: Graph, machine: Graph, longest: number): number | null {
  const variables = Array.from({ length: problem.order }, (_, v) => v)
  const qubits = Array.from({ length: machine.order }, (_, q) => q)
  const arcs: [number, number][] = []
  for (let k = 0; k < machine.ends.length; k += 2) {
    const [a, b] = [machine.ends[k]!, machine.ends[k + 1]!]
    arcs.push([a, b], [b, a])
  }
  const sum = (names: readonly string[]): string => names.join(' + ')
  const rules = qubits.map((q) => `${sum(variables.map((v) => `x${v}_${q}`))} <= 1`)
  for (const v of variables) {
    rules.push(`${sum(qubits.map((q) => `root${v}_${q}`))} = 1`)
    for (const q of qubits) {
      const into = arcs.filter(([, b]) => b === q).map(([a]) => ` + f${v}_${a}_${q}`)
      const out = arcs.filter(([a]) => a === q).map(([, b]) => ` - f${v}_${q}_${b}`)
      rules.push(`root${v}_${q} - x${v}_${q} <= 0`)
      rules.push(`sent${v}_${q} - ${longest} root${v}_${q} <= 0`)
      rules.push(`sent${v}_${q}${into.join('')}${out.join('')} - x${v}_${q} = 0`)
    }
    for (const [a, b] of arcs) rules.push(...[a, b].map((q) => `f${v}_${a}_${b} - ${longest - 1} x${v}_${q} <= 0`))
  }
  for (let k = 0; k < problem.ends.length; k += 2) {
    const [u, v] = [problem.ends[k]!, problem.ends[k + 1]!]
    const nameOf = ([a, b]: readonly [number, number]): string => `by${k}_${a}_${b}`
    rules.push(`${sum(arcs.map(nameOf))} >= 1`)
    for (const q of qubits) {
      rules.push(`${sum(arcs.filter(([a]) => a === q).map(nameOf))} - x${u}_${q} <= 0`)
      rules.push(`${sum(arcs.filter(([, b]) => b === q).map(nameOf))} - x${v}_${q} <= 0`)
    }
  }
  const chosen = variables.flatMap((v) => qubits.map((q) => `x${v}_${q}`))
  const roots = variables.flatMap((v) => qubits.map((q) => `root${v}_${q}`))
  const text = `Minimize\n obj: ${chosen.join('\n + ')}\nSubject To\n${rules.map((rule, k) => ` c${k}: ${rule}\n`).join('')}Binaries\n ${[...chosen, ...roots].join('\n ')}\nEnd\n`
  const solution = highs.solve(text, { output_flag: false })
  if (solution.Status === 'Infeasible') return null
  expect(solution.Status).toBe('Optimal')
  return Math.round(solution.ObjectiveValue)
}

describe('the exhaustive search itself', () => {
  it.each<[string, Graph, PublishedFamily, number]>([
    ['K_4 on the 3 × 3 king’s graph', completeGraph(4), KING, 5],
    ['K_{2,3} on the 3 × 3 king’s graph', bipartite(2, 3), KING, 4],
    ['K_{2,3} on Chimera C(2, 1, 2)', bipartite(2, 3), HALF_CHIMERA, 4],
    ['C_5 on Chimera C(2, 1, 2)', cycleGraph(5), HALF_CHIMERA, 4],
    ['K_4 on the 3 × 2 grid, where there is none', completeGraph(4), SMALL_SQUARE, 3],
  ])('agrees with integer programming: %s', (_, problem, family, longest) => {
    const machine = buildFabric(family).graph
    expect(leastQubits(problem, machine, whole(machine))).toBe(leastByProgramming(problem, machine, longest))
  })

  it('agrees with what is known', () => {
    const square = buildFabric(SQUARE).graph
    // A graph without odd cycles holds C_n, n odd, only as a cycle of n + 1.
    expect(leastQubits(cycleGraph(3), square, whole(square))).toBe(4)
    expect(leastQubits(cycleGraph(5), square, whole(square))).toBe(6)
    // Planar graphs have neither K_5 nor K_{3,3} as a minor (Wagner, Math. Ann. 114, 1937).
    expect(leastQubits(completeGraph(5), square, whole(square))).toBeNull()
    expect(leastQubits(bipartite(3, 3), square, whole(square))).toBeNull()
  })
})

const SEEDS = Array.from({ length: 10 }, (_, i) => i + 1)
/** Share of all runs that have to end with the fewest qubits possible. */
const LEAST_SHARE = 0.85
const SETTINGS = { tries: 4, timeLimitSeconds: 2, objective: 'total qubits' } as const

/** Problem, machine. */
const CASES: readonly (readonly [string, Graph, PublishedFamily])[] = [
  ['K_3 on Chimera C(2, 2, 2)', completeGraph(3), CHIMERA],
  ['K_4 on Chimera C(2, 2, 2)', completeGraph(4), CHIMERA],
  ['K_5 on Chimera C(2, 2, 2)', completeGraph(5), CHIMERA],
  ['C_5 on Chimera C(2, 2, 2)', cycleGraph(5), CHIMERA],
  ['C_7 on Chimera C(2, 2, 2)', cycleGraph(7), CHIMERA],
  ['K_{2,3} on Chimera C(2, 2, 2)', bipartite(2, 3), CHIMERA],
  ['K_{3,3} on Chimera C(2, 2, 2)', bipartite(3, 3), CHIMERA],
  ['star of 6 on Chimera C(2, 2, 2)', star(6), CHIMERA],
  ['binary tree of 7 on Chimera C(2, 2, 2)', binaryTree, CHIMERA],
  ['wheel of 5 on Chimera C(2, 2, 2)', wheel(5), CHIMERA],
  ['3 × 3 grid on Chimera C(2, 2, 2)', gridGraph(3, 3), CHIMERA],
  ['K_4 on the 3 × 3 grid', completeGraph(4), SQUARE],
  ['binary tree of 7 on the 3 × 3 grid', binaryTree, SQUARE],
  ['K_{2,3} on the 4 × 4 grid', bipartite(2, 3), LARGER_SQUARE],
  ['star of 6 on the 4 × 4 grid', star(6), LARGER_SQUARE],
  ['wheel of 5 on the 4 × 4 grid', wheel(5), LARGER_SQUARE],
  ['3 × 3 grid on the 4 × 4 grid', gridGraph(3, 3), LARGER_SQUARE],
  ['K_4 on the 3 × 3 king’s graph', completeGraph(4), KING],
  ['star of 6 on the 3 × 3 king’s graph', star(6), KING],
  ['wheel of 5 on the 3 × 3 king’s graph', wheel(5), KING],
  ['K_5 on the 4 × 4 king’s graph', completeGraph(5), LARGER_KING],
  ['K_{3,3} on the 4 × 4 king’s graph', bipartite(3, 3), LARGER_KING],
  ['3 × 3 grid on the 4 × 4 king’s graph', gridGraph(3, 3), LARGER_KING],
]

describe('the engine against the fewest qubits of any embedding', () => {
  let reached = 0
  let runs = 0

  it.each(CASES)('%s: never fewer, found on at least 9 of 10 seeds', (_, problem, family) => {
    const task = familyTask(problem, family, { qubits: 0, couplers: 0 }, createRandom(1))
    const least = leastQubits(problem, task.machine, task.usable)!
    const totals = SEEDS.flatMap((seed) => {
      const { embedding } = findEmbedding(task, { ...SETTINGS, seed }, UNTIMED)
      if (!embedding) return []
      expect(isMinorByContraction(problem, task.machine, task.usable, chainLists(embedding))).toBe(true)
      return [embedding.qubits.length]
    })
    expect(Math.min(...totals)).toBeGreaterThanOrEqual(least)
    expect(totals.length).toBeGreaterThanOrEqual(9)
    reached += totals.filter((total) => total === least).length
    runs += SEEDS.length
  })

  it('reaches them on at least 85 % of the runs', () => {
    expect(runs).toBe(CASES.length * SEEDS.length)
    expect(reached / runs).toBeGreaterThanOrEqual(LEAST_SHARE)
  })
})
