import { describe, expect, it } from 'vitest'
import { chainCouplers, interactionCouplers } from '../../../../shared/engine/embedding/couplers'
import type { CouplerGroups } from '../../../../shared/engine/embedding/couplers'
import { packChains } from '../../../../shared/engine/embedding/embedding'
import { embeddingStats } from '../../../../shared/engine/embedding/stats'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import type { Graph } from '../../../../shared/engine/graph/graph'
import { createRandom } from '../../../../shared/engine/random'
import { cycleGraph, gridGraph, kingGraph, randomGraph } from '../../../fixtures/graphs'

function edgesOf(groups: CouplerGroups, machine: Graph): string[][] {
  return Array.from({ length: groups.offsets.length - 1 }, (_, i) =>
    [...groups.edges.subarray(groups.offsets[i], groups.offsets[i + 1])].map(
      (k) => `${machine.ends[2 * k]}-${machine.ends[2 * k + 1]}`,
    ),
  )
}

describe('coupler groups', () => {
  // 3 × 3 grid: chains {0, 1, 3, 4} (a square), {2, 5}, {7}.
  const machine = gridGraph(3, 3)
  const embedding = packChains([[0, 1, 3, 4], [2, 5], [7]])

  it('lists the couplers inside each chain', () => {
    expect(edgesOf(chainCouplers(embedding, machine), machine)).toEqual([['0-1', '0-3', '1-4', '3-4'], ['2-5'], []])
  })

  it('lists the couplers of each interaction in the order of the problem, and no others', () => {
    const problem = graphFromEdges(3, [0, 1, 0, 2])
    expect(edgesOf(interactionCouplers(embedding, problem, machine), machine)).toEqual([['1-2', '4-5'], ['4-7']])
    const without = graphFromEdges(3, [0, 2, 1, 2])
    expect(edgesOf(interactionCouplers(embedding, without, machine), machine)).toEqual([['4-7'], []])
  })

  it('agrees with a comparison of all pairs of qubits', () => {
    const random = createRandom(5)
    for (let round = 0; round < 50; round++) {
      const king = kingGraph(5, 4)
      const owner = Array.from({ length: king.order }, () => random.below(7) - 1)
      const chains = Array.from({ length: 6 }, (_, i) => owner.flatMap((o, q) => (o === i ? [q] : [])))
      const problem = randomGraph(6, 0.5, random)
      const joined = new Set(
        Array.from({ length: king.ends.length / 2 }, (_, k) => `${king.ends[2 * k]}-${king.ends[2 * k + 1]}`),
      )
      const between = (a: number[], b: number[]): string[] =>
        [...new Set(a.flatMap((q) => b.map((r) => (q < r ? `${q}-${r}` : `${r}-${q}`))))]
          .filter((e) => joined.has(e))
          .sort()
      const packed = packChains(chains)
      const inside = edgesOf(chainCouplers(packed, king), king).map((list) => list.sort())
      expect(inside).toEqual(chains.map((chain) => between(chain, chain)))
      const across = edgesOf(interactionCouplers(packed, problem, king), king).map((list) => list.sort())
      const pairs = Array.from({ length: problem.ends.length / 2 }, (_, k) =>
        between(chains[problem.ends[2 * k]!]!, chains[problem.ends[2 * k + 1]!]!),
      )
      expect(across).toEqual(pairs)
    }
  })
})

describe('embeddingStats', () => {
  it('counts qubits, lengths and couplers', () => {
    const stats = embeddingStats(
      packChains([
        [0, 1, 3, 4],
        [2, 5],
        [7, 8],
      ]),
      cycleGraph(3),
      gridGraph(3, 3),
    )
    expect(stats).toEqual({
      qubitsUsed: 8,
      chainLength: { max: 4, mean: 8 / 3, min: 2 },
      chainCouplers: 6,
      interactionCouplers: 4,
      lengthHistogram: Uint32Array.of(0, 0, 2, 0, 1),
    })
  })

  it('has zeros for no chains', () => {
    const stats = embeddingStats(packChains([]), graphFromEdges(0, []), gridGraph(2, 2))
    expect(stats.chainLength).toEqual({ max: 0, mean: 0, min: 0 })
    expect([...stats.lengthHistogram]).toEqual([0])
  })
})
