import { describe, expect, it } from 'vitest'
import { giveOuterHalves } from '../../../../shared/engine/embedding/gifts'
import { growFromNeighbour } from '../../../../shared/engine/embedding/grow'
import { unmetEdges, inspectContacts, soleContact } from '../../../../shared/engine/embedding/contacts'
import { SearchState } from '../../../../shared/engine/embedding/state'
import { trimChain } from '../../../../shared/engine/embedding/trim'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import type { Graph } from '../../../../shared/engine/graph/graph'
import type { Random } from '../../../../shared/engine/random'
import { createRandom } from '../../../../shared/engine/random'
import { completeGraph, gridGraph, kingGraph, randomGraph } from '../../../fixtures/graphs'

function stateOf(problem: Graph, machine: Graph, chains: readonly (readonly number[])[]): SearchState {
  const state = new SearchState(problem, machine, new Uint8Array(machine.order).fill(1))
  state.base.fill(1)
  state.setPenalty(3)
  chains.forEach((chain, v) => chain.forEach((q) => state.chains.add(v, q)))
  return state
}

function chainsOf(state: SearchState): number[][] {
  const buffer = new Int32Array(state.machine.order)
  return Array.from({ length: state.problem.order }, (_, v) =>
    [...buffer.subarray(0, state.chains.copyChain(v, buffer))].sort((a, b) => a - b),
  )
}

const matrixOf = (graph: Graph): boolean[][] => {
  const matrix = Array.from({ length: graph.order }, () => new Array<boolean>(graph.order).fill(false))
  for (let k = 0; k < graph.ends.length; k += 2) {
    matrix[graph.ends[k]!]![graph.ends[k + 1]!] = true
    matrix[graph.ends[k + 1]!]![graph.ends[k]!] = true
  }
  return matrix
}

const touches = (matrix: boolean[][], a: readonly number[], b: readonly number[]): boolean =>
  a.some((q) => b.some((r) => matrix[q]![r]))

function isConnected(matrix: boolean[][], chain: readonly number[]): boolean {
  let reached = chain.slice(0, 1)
  for (;;) {
    const more = chain.filter((q) => reached.includes(q) || touches(matrix, [q], reached))
    if (more.length === reached.length) return more.length === chain.length
    reached = more
  }
}

/** The met interactions, as text. */
const met = (problem: Graph, matrix: boolean[][], chains: number[][]): string[] =>
  Array.from({ length: problem.ends.length / 2 }, (_, k) => [problem.ends[2 * k]!, problem.ends[2 * k + 1]!] as const)
    .filter(([i, j]) => touches(matrix, chains[i]!, chains[j]!))
    .map(String)

/** Connected random chains that may overlap. */
function randomChains(machine: Graph, count: number, random: Random): number[][] {
  return Array.from({ length: count }, () => {
    const chain = [random.below(machine.order)]
    for (let step = random.below(12); step > 0; step--) {
      const q = chain[random.below(chain.length)]!
      const slots = machine.offsets[q + 1]! - machine.offsets[q]!
      const r = machine.targets[machine.offsets[q]! + random.below(slots)]!
      if (!chain.includes(r)) chain.push(r)
    }
    return chain
  })
}

describe('contacts', () => {
  it('names the one partner that only this qubit serves', () => {
    // Chain of variable 0 along the middle row of a 4 × 3 grid; 1 above its left end, 2 below its right end.
    const problem = graphFromEdges(3, [0, 1, 0, 2])
    const state = stateOf(problem, gridGraph(4, 3), [[4, 5, 6, 7], [0], [11]])
    inspectContacts(state, 0)
    expect([4, 5, 6, 7].map((q) => soleContact(state, q))).toEqual([1, -1, -1, 2])
  })

  it('counts unmet interactions', () => {
    const state = stateOf(completeGraph(3), gridGraph(4, 1), [[0], [1], [3]])
    expect(unmetEdges(state)).toEqual([1, 2])
  })
})

describe('trimChain', () => {
  it('removes leaves that serve nobody, as far as the path between the contacts', () => {
    const problem = graphFromEdges(3, [0, 1, 0, 2])
    const machine = gridGraph(6, 2)
    const state = stateOf(problem, machine, [[0, 1, 2, 3, 4, 5], [7], [9]])
    expect(trimChain(state, 0)).toBe(3)
    expect(chainsOf(state)[0]).toEqual([1, 2, 3])
  })

  it('keeps one qubit of a chain without partners', () => {
    const state = stateOf(graphFromEdges(1, []), gridGraph(4, 1), [[0, 1, 2]])
    trimChain(state, 0)
    expect(chainsOf(state)[0]).toHaveLength(1)
  })

  it('keeps chains connected and every contact, on random overlapping chains', () => {
    const random = createRandom(11)
    for (let round = 0; round < 200; round++) {
      const machine = gridGraph(5, 5)
      const problem = randomGraph(6, 0.6, random)
      const state = stateOf(problem, machine, randomChains(machine, 6, random))
      const matrix = matrixOf(machine)
      const before = met(problem, matrix, chainsOf(state))
      for (let v = 0; v < 6; v++) trimChain(state, v)
      const after = chainsOf(state)
      expect(after.every((chain) => chain.length > 0 && isConnected(matrix, chain))).toBe(true)
      expect(met(problem, matrix, after)).toEqual(before)
    }
  })
})

describe('giveOuterHalves', () => {
  it('gives half of the way from its middle to the partner at its end', () => {
    // A line of eleven qubits: variable 0 has all but the last, partner 1 the last, partner 2 sits below the first.
    const line = [...Array.from({ length: 10 }, (_, q) => [q, q + 1]).flat(), 0, 11]
    const chains = [[0, 1, 2, 3, 4, 5, 6, 7, 8, 9], [10], [11]]
    const state = stateOf(graphFromEdges(3, [0, 1, 0, 2]), graphFromEdges(12, line), chains)
    giveOuterHalves(state, 0, false)
    const [own, first, second] = chainsOf(state)
    expect(first!.length).toBeGreaterThanOrEqual(3)
    expect(second!.length).toBeGreaterThanOrEqual(3)
    expect([...own!, ...first!, ...second!].sort((a, b) => a - b)).toEqual(chains.flat())
  })

  it('stops before it gives away the last contact to another partner', () => {
    // A line 0 … 8 with partner 1 on qubit 9 beside 0, partner 2 on qubit 10 beside both 0 and 1, partner 3 at the end.
    const ends = [...Array.from({ length: 8 }, (_, q) => [q, q + 1]).flat(), 0, 9, 0, 10, 1, 10, 8, 11]
    const problem = graphFromEdges(4, [0, 1, 0, 2, 0, 3])
    const state = stateOf(problem, graphFromEdges(12, ends), [[0, 1, 2, 3, 4, 5, 6, 7, 8], [9], [10], [11]])
    giveOuterHalves(state, 0, false)
    expect(chainsOf(state)[1]).toEqual([0, 9])
    expect(unmetEdges(state)).toEqual([])
  })

  it('does not make a partner as long as the giver when lengths are to be balanced', () => {
    const state = stateOf(graphFromEdges(2, [0, 1]), gridGraph(9, 1), [
      [0, 1, 2, 3],
      [4, 5, 6],
    ])
    giveOuterHalves(state, 0, true)
    expect(chainsOf(state).map((chain) => chain.length)).toEqual([4, 3])
  })

  it('keeps chains connected and every contact, and adds no qubit, on random overlapping chains', () => {
    const random = createRandom(12)
    let given = 0
    for (let round = 0; round < 200; round++) {
      const machine = round % 2 ? gridGraph(6, 5) : kingGraph(6, 5)
      const problem = randomGraph(6, 0.5, random)
      const state = stateOf(problem, machine, randomChains(machine, 6, random))
      const matrix = matrixOf(machine)
      const before = chainsOf(state)
      for (let variable = 0; variable < 6; variable++) giveOuterHalves(state, variable, random.float() < 0.3)
      const after = chainsOf(state)
      given += after.filter((chain, v) => chain.length > before[v]!.length).length
      expect(after.every((chain) => chain.length > 0 && isConnected(matrix, chain))).toBe(true)
      expect(met(problem, matrix, after)).toEqual(expect.arrayContaining(met(problem, matrix, before)))
      expect(after.flat().length).toBeLessThanOrEqual(before.flat().length)
    }
    expect(given).toBeGreaterThan(50)
  })
})

describe('growFromNeighbour', () => {
  /** Weight of the lightest qubit path from beside one chain to beside another (Bellman–Ford over qubit weights). */
  function lightestPath(matrix: boolean[][], weight: number[], from: number[], to: number[]): number {
    const qubits = weight.map((_, q) => q)
    const best = qubits.map((q) => (touches(matrix, [q], from) ? weight[q]! : Infinity))
    for (let round = 0; round < qubits.length; round++)
      for (const q of qubits)
        for (const r of qubits) if (matrix[q]![r]) best[r] = Math.min(best[r]!, best[q]! + weight[r]!)
    return Math.min(...qubits.filter((q) => touches(matrix, [q], to)).map((q) => best[q]!))
  }

  it('joins two partners by a lightest path', () => {
    const random = createRandom(13)
    for (let round = 0; round < 100; round++) {
      const machine = gridGraph(5, 4)
      const others = randomChains(machine, 3, random)
      const state = stateOf(graphFromEdges(4, [0, 1, 0, 2]), machine, [[], ...others])
      for (let q = 0; q < machine.order; q++) state.base[q] = 1 + random.float()
      const weight = Array.from({ length: machine.order }, (_, q) => state.weight(q))
      const matrix = matrixOf(machine)
      const found = growFromNeighbour(state, 0, 1, Infinity)
      expect(found).toBeCloseTo(lightestPath(matrix, weight, others[0]!, others[1]!), 9)
      const tree = [...state.tree.subarray(0, state.treeSize)]
      expect(tree.reduce((sum, q) => sum + weight[q]!, 0)).toBeCloseTo(found, 9)
    }
  })

  it('grows one connected tree beside all partners, of the weight it says', () => {
    const random = createRandom(14)
    for (let round = 0; round < 100; round++) {
      const machine = gridGraph(6, 6)
      const others = randomChains(machine, 5, random)
      const state = stateOf(graphFromEdges(6, [0, 1, 0, 2, 0, 3, 0, 4, 0, 5]), machine, [[], ...others])
      const matrix = matrixOf(machine)
      const start = 1 + random.below(5)
      const weight = growFromNeighbour(state, 0, start, Infinity)
      const tree = [...state.tree.subarray(0, state.treeSize)]
      expect(new Set(tree).size).toBe(tree.length)
      expect(isConnected(matrix, tree)).toBe(true)
      for (const chain of others) expect(touches(matrix, tree, chain)).toBe(true)
      expect(tree.reduce((sum, q) => sum + state.weight(q), 0)).toBeCloseTo(weight, 9)
      expect(growFromNeighbour(state, 0, start, weight)).toBe(Infinity)
      expect(growFromNeighbour(state, 0, start, weight + 1e-6)).toBe(weight)
    }
  })

  it('cannot pass used qubits in strict mode', () => {
    const state = stateOf(graphFromEdges(4, [0, 1, 0, 2]), gridGraph(5, 1), [[], [0], [4], [2]])
    expect(growFromNeighbour(state, 0, 1, Infinity)).toBe(3 + 2)
    state.setStrict()
    expect(growFromNeighbour(state, 0, 1, Infinity)).toBe(Infinity)
  })
})
