import { describe, expect, it } from 'vitest'
import { markTouches } from '../../../../../shared/engine/embedding/chains/grow'
import type { ChainState } from '../../../../../shared/engine/embedding/chains/state'
import { FAR } from '../../../../../shared/engine/embedding/chains/costs'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import { createRandom } from '../../../../../shared/engine/random'
import type { Random } from '../../../../../shared/engine/random'
import { chimeraGraph, gridGraph, kingGraph } from '../../../../fixtures/graphs'
import { isConnected, matrixOf, randomChains, stateOf, touches } from './fixtures'

/** Cost of the cheapest qubit path from beside one chain to beside another (Bellman–Ford over qubit costs). */
function cheapestPath(matrix: boolean[][], cost: number[], from: number[], to: number[]): number {
  const qubits = cost.map((_, q) => q)
  const best = qubits.map((q) => (touches(matrix, [q], from) ? cost[q]! : Infinity))
  for (let round = 0; round < qubits.length; round++)
    for (const q of qubits) for (const r of qubits) if (matrix[q]![r]) best[r] = Math.min(best[r]!, best[q]! + cost[r]!)
  return Math.min(...qubits.filter((q) => touches(matrix, [q], to)).map((q) => best[q]!))
}

/** A star of `partners` variables around variable 0. */
const star = (partners: number) =>
  graphFromEdges(partners + 1, Array.from({ length: partners }, (_, k) => [0, k + 1]).flat())

function drawCosts(state: ChainState, random: Random): void {
  for (let q = 0; q < state.qubits; q++) state.base[q] = 64 + random.below(64)
  state.setPenalty(3)
}

const costsOf = (state: ChainState): number[] => Array.from({ length: state.qubits }, (_, q) => state.nodes[2 * q]!)

describe.each(['plain', 'assembly'] as const)('growing a tree by the %s kernel', (kernel) => {
  it('joins two partners by a cheapest path', () => {
    const random = createRandom(13)
    for (let round = 0; round < 100; round++) {
      const machine = gridGraph(5, 4)
      const others = randomChains(machine, 2, random)
      const state = stateOf(star(2), machine, [[], ...others], kernel)
      drawCosts(state, random)
      const cost = costsOf(state)
      expect(markTouches(state, 0)).toBe(2)
      const size = state.grow(0, 0, 2, FAR)
      const tree = [...state.tree.subarray(0, size)]
      expect(state.treeCost).toBe(cheapestPath(matrixOf(machine), cost, others[0]!, others[1]!))
      expect(tree.reduce((sum, q) => sum + cost[q]!, 0)).toBe(state.treeCost)
    }
  })

  it('grows one connected tree beside all partners, of the cost it says, below the ceiling only', () => {
    const random = createRandom(14)
    for (let round = 0; round < 120; round++) {
      const machine = gridGraph(6, 6)
      // From seven partners on labels are kept from one to the next.
      const count = 3 + random.below(7)
      const others = randomChains(machine, count, random)
      const state = stateOf(star(count), machine, [[], ...others], kernel)
      drawCosts(state, random)
      const matrix = matrixOf(machine)
      const cost = costsOf(state)
      markTouches(state, 0)
      const start = random.below(count)
      const size = state.grow(0, start, count, FAR)
      const tree = [...state.tree.subarray(0, size)]
      const treeCost = state.treeCost
      expect(new Set(tree).size).toBe(size)
      expect(isConnected(matrix, tree)).toBe(true)
      for (const chain of others) expect(touches(matrix, tree, chain)).toBe(true)
      expect(tree.reduce((sum, q) => sum + cost[q]!, 0)).toBe(treeCost)
      const parents = tree.filter((q) => state.parent[q]! >= 0)
      expect(parents).toHaveLength(size - 1)
      for (const q of parents) expect(matrix[q]![state.parent[q]!]).toBe(true)
      expect(state.grow(0, start, count, treeCost)).toBe(0)
      expect(state.grow(0, start, count, treeCost + 1)).toBe(size)
    }
  })

  it('cannot pass qubits that are out of reach', () => {
    const state = stateOf(star(3), gridGraph(5, 1), [[], [0], [4], []], kernel)
    state.add(3, 2)
    markTouches(state, 0)
    expect(state.grow(0, 0, 3, FAR)).toBe(3)
    expect(state.treeCost).toBe(64 + 3 * 64 + 64)
    state.setPenalty(Infinity)
    expect(state.grow(0, 0, 3, FAR)).toBe(0)
  })
})

describe('the two kernels', () => {
  it('grow the same trees, qubit for qubit, also beyond 32 partners', () => {
    const random = createRandom(15)
    for (let round = 0; round < 150; round++) {
      const machine = round % 2 ? kingGraph(12, 12) : chimeraGraph(5, 5, 4)
      const count = 2 + random.below(round % 5 === 0 ? 60 : 6)
      const others = randomChains(machine, count, random)
      const states = (['plain', 'assembly'] as const).map((kernel) =>
        stateOf(star(count), machine, [[], ...others], kernel),
      )
      const start = random.below(count)
      const seed = random.uint32()
      const [plain, assembly] = states.map((state) => {
        drawCosts(state, createRandom(seed))
        markTouches(state, 0)
        const size = state.grow(0, start, count, FAR)
        const tree = [...state.tree.subarray(0, size)]
        return { cost: state.treeCost, tree, parents: tree.map((q) => state.parent[q]) }
      })
      expect(assembly).toEqual(plain)
      expect(plain!.tree.length).toBeGreaterThan(0)
    }
  })
})
