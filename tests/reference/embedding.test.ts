import Graphology from 'graphology'
import { describe, expect, it } from 'vitest'
import { chainOf } from '../../shared/engine/embedding/embedding'
import { provedInfeasible } from '../../shared/engine/embedding/feasibility'
import { findEmbedding } from '../../shared/engine/embedding/search'
import { verifyEmbedding } from '../../shared/engine/embedding/verify'
import type { Graph } from '../../shared/engine/graph/graph'
import { buildFabric } from '../../shared/engine/machine/build-fabric'
import { createRandom } from '../../shared/engine/random'
import type { Random } from '../../shared/engine/random'
import {
  chimeraGraph,
  completeGraph,
  gridGraph,
  kingGraph,
  randomGraph,
  regularGraph,
  taskOf,
  usableExcept,
} from '../fixtures/graphs'

const control = { now: () => 0, cancelled: () => false, report: () => {} }

/** The usable machine as a graphology graph. */
function machineCopy(machine: Graph, usable: Uint8Array): Graphology {
  const copy = new Graphology({ type: 'undirected' })
  for (let q = 0; q < machine.order; q++) if (usable[q]) copy.addNode(q)
  for (let k = 0; k < machine.ends.length; k += 2)
    if (copy.hasNode(machine.ends[k]) && copy.hasNode(machine.ends[k + 1]))
      copy.addEdge(machine.ends[k], machine.ends[k + 1])
  return copy
}

/** Contracts an edge: node `from` is merged into node `into`. */
function contract(graph: Graphology, into: string, from: string): void {
  for (const neighbour of graph.neighbors(from)) if (neighbour !== into) graph.mergeEdge(into, neighbour)
  graph.dropNode(from)
}

/**
 * The definition of a minor by its operations (Diestel, Graph Theory, §1.7): contract every chain along edges of the
 * machine until one vertex is left, delete the rest, and look for the problem as a subgraph under the given names.
 */
function isMinorByContraction(problem: Graph, machine: Graph, usable: Uint8Array, chains: number[][]): boolean {
  const graph = machineCopy(machine, usable)
  const all = chains.flat()
  if (new Set(all).size !== all.length || !all.every((q) => graph.hasNode(q))) return false
  for (const chain of chains) {
    if (chain.length === 0) return false
    const left = new Set(chain.slice(1).map(String))
    while (left.size > 0) {
      const next = graph.neighbors(chain[0]).find((q) => left.has(q))
      if (next === undefined) return false
      contract(graph, String(chain[0]), next)
      left.delete(next)
    }
  }
  for (let k = 0; k < problem.ends.length; k += 2)
    if (!graph.hasEdge(chains[problem.ends[k]!]![0], chains[problem.ends[k + 1]!]![0])) return false
  return true
}

type Mutation = (chains: number[][], machine: Graph, random: Random) => void
const pick = (list: number[], random: Random): number => list[random.below(list.length)]!

const MUTATIONS: Record<string, Mutation> = {
  'drop a qubit': (chains, _, random) => {
    const chain = chains[random.below(chains.length)]!
    chain.splice(random.below(chain.length), 1)
  },
  'share a qubit': (chains, _, random) => {
    const chain = chains[random.below(chains.length)]!
    const q = pick(chains[random.below(chains.length)]!, random)
    if (!chain.includes(q)) chain.push(q)
  },
  'add any qubit': (chains, machine, random) => {
    const chain = chains[random.below(chains.length)]!
    const q = random.below(machine.order)
    if (!chain.includes(q)) chain.push(q)
  },
  'move a qubit': (chains, machine, random) => {
    const chain = chains[random.below(chains.length)]!
    const q = random.below(machine.order)
    if (!chain.includes(q)) chain[random.below(chain.length)] = q
  },
  'exchange two chains': (chains, _, random) => {
    const [i, j] = [random.below(chains.length), random.below(chains.length)]
    ;[chains[i], chains[j]] = [chains[j]!, chains[i]!]
  },
  'cut a chain short': (chains, _, random) => {
    const chain = chains[random.below(chains.length)]!
    chain.length = Math.ceil(chain.length / 2)
  },
}

const INSTANCES = (['king', 'chimera'] as const).flatMap((family) =>
  [1, 2, 3].map((seed) => {
    const random = createRandom(seed, 50)
    const machine = family === 'king' ? kingGraph(12, 12) : chimeraGraph(6, 6, 4)
    const usable = usableExcept(machine.order, 0.04, random)
    const problem =
      seed === 1
        ? randomGraph(10, 0.5, random)
        : seed === 2
          ? regularGraph(20, 3, random)
          : randomGraph(18, 0.2, random)
    return { name: `${family} ${seed}`, problem, machine, usable, seed }
  }),
)

describe.each(INSTANCES)(
  'embedding on $name against contraction in graphology',
  ({ problem, machine, usable, seed }) => {
    const { embedding } = findEmbedding(taskOf(problem, machine, usable), { seed, tries: 3 }, control)
    const found = Array.from({ length: problem.order }, (_, i) => [...chainOf(embedding!, i)])

    it('is a minor', () => {
      expect(isMinorByContraction(problem, machine, usable, found)).toBe(true)
      expect(verifyEmbedding(problem, machine, usable, embedding!)).toEqual([])
    })

    it.each(Object.keys(MUTATIONS))('has the same verdict of the checker after: %s', (name) => {
      const random = createRandom(seed, 60)
      const verdicts = new Set<boolean>()
      for (let round = 0; round < 15; round++) {
        const chains = found.map((chain) => [...chain])
        MUTATIONS[name]!(chains, machine, random)
        const valid = isMinorByContraction(problem, machine, usable, chains)
        verdicts.add(valid)
        expect(verifyEmbedding(problem, machine, usable, chains).length === 0).toBe(valid)
      }
      expect(verdicts.has(false)).toBe(true)
    })
  },
)

describe('published constructions bound what has to be found', () => {
  // Choi, Quantum Inf. Process. 10, 343 (2011): Chimera C(4, 4, 4) holds K_16 (chains of 5); half of that size must be
  // within reach of a heuristic. Boothby et al., arXiv:2003.00133: Pegasus P(6) holds K_62 by construction.
  it.each([
    ['K_8 in Chimera C(4, 4, 4)', completeGraph(8), chimeraGraph(4, 4, 4)],
    ['K_30 in Pegasus P(6)', completeGraph(30), buildFabric({ kind: 'pegasus', m: 6, trimmed: true }).graph],
  ])('%s', (_, problem, machine) => {
    const usable = new Uint8Array(machine.order).fill(1)
    const { embedding } = findEmbedding(taskOf(problem, machine, usable), { seed: 1, tries: 3 }, control)
    const chains = Array.from({ length: problem.order }, (_, i) => [...chainOf(embedding!, i)])
    expect(isMinorByContraction(problem, machine, usable, chains)).toBe(true)
  })

  it('finds no minor that theory forbids', () => {
    // A grid is planar and so has no K_5 minor (Wagner, Math. Ann. 114, 1937). One row of Chimera cells with t = 2 has
    // treewidth 2 (a path of bags of three: two horizontal qubits and one more), so it has no K_4 minor.
    for (const [problem, machine] of [
      [completeGraph(5), gridGraph(7, 7)],
      [completeGraph(4), chimeraGraph(1, 6, 2)],
    ] as const) {
      const usable = new Uint8Array(machine.order).fill(1)
      expect(provedInfeasible(taskOf(problem, machine, usable))).toBeNull()
      expect(findEmbedding(taskOf(problem, machine, usable), { tries: 3 }, control).status).toBe('none found')
    }
  })
})
