import { describe, expect, it } from 'vitest'
import { markTouches } from '../../../../../shared/engine/embedding/chains/grow'
import { settleTree } from '../../../../../shared/engine/embedding/chains/settle'
import type { ChainState } from '../../../../../shared/engine/embedding/chains/state'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import { createRandom } from '../../../../../shared/engine/random'
import { gridGraph, kingGraph, randomGraph } from '../../../../fixtures/graphs'
import { chainsOf, isConnected, matrixOf, met, randomChains, stateOf } from './fixtures'

/** Lays a tree over the qubits, breadth first from the first, as growth leaves it. */
function lay(state: ChainState, qubits: readonly number[]): void {
  const order = [qubits[0]!]
  const parents = new Map([[qubits[0]!, -1]])
  for (let i = 0; i < order.length; i++)
    for (let p = state.offsets[order[i]!]!; p < state.offsets[order[i]! + 1]!; p++) {
      const r = state.targets[p]!
      if (!qubits.includes(r) || parents.has(r)) continue
      parents.set(r, order[i]!)
      order.push(r)
    }
  order.forEach((q, i) => {
    state.tree[i] = q
    state.parent[q] = parents.get(q)!
  })
}

function settle(
  state: ChainState,
  variable: number,
  qubits: readonly number[],
  balanced = false,
  longest = Infinity,
): boolean {
  state.drop(variable)
  lay(state, qubits)
  markTouches(state, variable)
  return settleTree(state, variable, qubits.length, { longest, balanced })
}

describe('settling a tree', () => {
  it('takes off leaves that serve nobody, as far as the path between the contacts', () => {
    const state = stateOf(graphFromEdges(3, [0, 1, 0, 2]), gridGraph(6, 2), [[], [7], [9]])
    state.frozen.fill(1)
    expect(settle(state, 0, [0, 1, 2, 3, 4, 5])).toBe(true)
    expect(chainsOf(state)[0]).toEqual([1, 2, 3])
  })

  it('takes nothing that is too long, and changes nothing then', () => {
    const state = stateOf(graphFromEdges(3, [0, 1, 0, 2]), gridGraph(6, 2), [[], [7], [9]])
    expect(settle(state, 0, [0, 1, 2, 3, 4, 5], false, 2)).toBe(false)
    expect(chainsOf(state)).toEqual([[], [7], [9]])
  })

  it('shares a way with the partners at its ends', () => {
    // A line of eleven qubits: variable 0 has all but the last, partner 1 the last, partner 2 sits below the first.
    const line = [...Array.from({ length: 10 }, (_, q) => [q, q + 1]).flat(), 0, 11]
    const state = stateOf(graphFromEdges(3, [0, 1, 0, 2]), graphFromEdges(12, line), [[], [10], [11]])
    settle(state, 0, [0, 1, 2, 3, 4, 5, 6, 7, 8, 9])
    const [own, first, second] = chainsOf(state)
    expect(first!.length).toBeGreaterThanOrEqual(3)
    expect(second!.length).toBeGreaterThanOrEqual(3)
    expect([...own!, ...first!, ...second!].sort((a, b) => a - b)).toEqual(Array.from({ length: 12 }, (_, q) => q))
  })

  it('gives nothing to frozen chains', () => {
    const line = Array.from({ length: 10 }, (_, q) => [q, q + 1]).flat()
    const state = stateOf(graphFromEdges(2, [0, 1]), graphFromEdges(11, line), [[], [10]])
    state.frozen[1] = 1
    settle(state, 0, [9])
    expect(chainsOf(state)).toEqual([[9], [10]])
  })

  it('stops before it gives away the last contact to another partner', () => {
    // A line 0 … 8 with partner 1 on qubit 9 beside 0, partner 2 on qubit 10 beside both 0 and 1, partner 3 at the end.
    const ends = [...Array.from({ length: 8 }, (_, q) => [q, q + 1]).flat(), 0, 9, 0, 10, 1, 10, 8, 11]
    const problem = graphFromEdges(4, [0, 1, 0, 2, 0, 3])
    const machine = graphFromEdges(12, ends)
    const state = stateOf(problem, machine, [[], [9], [10], [11]])
    settle(state, 0, [0, 1, 2, 3, 4, 5, 6, 7, 8])
    expect(met(problem, matrixOf(machine), chainsOf(state))).toHaveLength(3)
  })

  it('does not make a partner as long as the giver when lengths are to be balanced', () => {
    const state = stateOf(graphFromEdges(3, [0, 1, 0, 2]), gridGraph(9, 1), [[], [5, 6, 7], [0]])
    settle(state, 0, [1, 2, 3, 4], true)
    expect(chainsOf(state).map((chain) => chain.length)).toEqual([3, 3, 2])
  })

  it('keeps chains connected and every contact, and adds no qubit, on random overlapping chains', () => {
    const random = createRandom(12)
    let given = 0
    let trimmed = 0
    for (let round = 0; round < 300; round++) {
      const machine = round % 2 ? gridGraph(6, 5) : kingGraph(6, 5)
      const problem = randomGraph(6, 0.5, random)
      const state = stateOf(problem, machine, randomChains(machine, 6, random))
      const matrix = matrixOf(machine)
      const before = chainsOf(state)
      for (let v = 0; v < 6; v++) {
        if (state.partnersOf(v) === 0) continue
        const own = chainsOf(state)[v]!
        settle(state, v, own, random.float() < 0.3)
      }
      const after = chainsOf(state)
      given += after.filter((chain, v) => chain.length > before[v]!.length).length
      trimmed += before.flat().length - after.flat().length
      expect(after.every((chain) => chain.length > 0 && isConnected(matrix, chain))).toBe(true)
      expect(met(problem, matrix, after)).toEqual(expect.arrayContaining(met(problem, matrix, before)))
      expect(after.flat().length).toBeLessThanOrEqual(before.flat().length)
      const use = new Map<number, number>()
      for (const q of after.flat()) use.set(q, (use.get(q) ?? 0) + 1)
      expect(state.overlap).toBe([...use.values()].reduce((sum, count) => sum + count - 1, 0))
      expect(state.qubitsUsed).toBe(use.size)
    }
    expect(given).toBeGreaterThan(20)
    expect(trimmed).toBeGreaterThan(100)
  })
})
