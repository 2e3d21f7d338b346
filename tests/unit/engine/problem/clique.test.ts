import { describe, expect, it } from 'vitest'
import { edgeBetween, graphFromEdges } from '../../../../shared/engine/graph/build'
import type { Graph } from '../../../../shared/engine/graph/graph'
import { largeClique } from '../../../../shared/engine/problem/clique'
import { createRandom } from '../../../../shared/engine/random'
import { completeGraph, cycleGraph, randomGraph } from '../../../fixtures/graphs'

const isClique = (graph: Graph, vertices: readonly number[]): boolean =>
  vertices.every((a, i) => vertices.slice(i + 1).every((b) => edgeBetween(graph, a, b) >= 0))

/** By trying all sets of vertices. */
function largestBySets(graph: Graph): number {
  let most = 0
  for (let set = 0; set < 2 ** graph.order; set++) {
    const vertices = Array.from({ length: graph.order }, (_, v) => v).filter((v) => set & (1 << v))
    if (vertices.length > most && isClique(graph, vertices)) most = vertices.length
  }
  return most
}

describe('largeClique', () => {
  it('finds a largest one where it has the time', () => {
    const random = createRandom(6)
    for (let round = 0; round < 120; round++) {
      const graph = randomGraph(1 + random.below(10), random.float(), random)
      const clique = largeClique(graph)
      expect(isClique(graph, clique)).toBe(true)
      expect(clique).toHaveLength(largestBySets(graph))
    }
  })

  it('finds a hidden one, and none where there is none so large', () => {
    const random = createRandom(2)
    const noise = randomGraph(120, 0.1, random)
    const hidden = Array.from({ length: 14 }, (_, i) => 3 + 8 * i)
    const ends = [...noise.ends, ...[...completeGraph(14).ends].map((v) => hidden[v]!)]
    const graph = graphFromEdges(120, ends)
    expect(largeClique(graph)).toEqual(hidden)
    expect(largeClique(graph, { atLeast: 15 })).toEqual([])
  })

  it('ends when the work does, with a clique all the same', () => {
    const graph = randomGraph(150, 0.5, createRandom(9))
    for (const maxWork of [0, 1000, 10_000]) expect(isClique(graph, largeClique(graph, { maxWork }))).toBe(true)
  })

  it('copes with complete and with empty graphs', () => {
    expect(largeClique(completeGraph(300))).toHaveLength(300)
    expect(largeClique(cycleGraph(9))).toHaveLength(2)
    expect(largeClique(graphFromEdges(3, []))).toHaveLength(1)
    expect(largeClique(graphFromEdges(0, []))).toEqual([])
  })
})
