import { describe, expect, it } from 'vitest'
import { edgeBetween, graphFromEdges } from '../../../../../shared/engine/graph/build'
import { sizeOf } from '../../../../../shared/engine/graph/graph'
import { connectedGraphs } from '../../../../../shared/engine/graph/layout/parts'
import { createRandom } from '../../../../../shared/engine/random'
import { randomGraph, usableExcept } from '../../../../fixtures/graphs'

describe('connectedGraphs', () => {
  it.each([1, 2, 3])('splits what is kept without losing or adding an edge (seed %i)', (seed) => {
    const graph = randomGraph(80, 0.02, createRandom(seed))
    const kept = usableExcept(80, 0.2, createRandom(seed, 1))
    const parts = connectedGraphs(graph, kept)
    const seen = parts.flatMap(({ vertices }) => [...vertices])
    expect(seen.sort((a, b) => a - b)).toEqual([...kept.keys()].filter((v) => kept[v] === 1))
    let edges = 0
    for (const part of parts) {
      const { ends } = part.graph
      for (let k = 0; k < ends.length; k += 2)
        expect(edgeBetween(graph, part.vertices[ends[k]!]!, part.vertices[ends[k + 1]!]!)).toBeGreaterThanOrEqual(0)
      edges += sizeOf(part.graph)
    }
    const among = Array.from(
      { length: sizeOf(graph) },
      (_, k) => kept[graph.ends[2 * k]!]! * kept[graph.ends[2 * k + 1]!]!,
    )
    expect(edges).toBe(among.reduce((sum, both) => sum + both, 0))
  })

  it('puts the largest part first', () => {
    const parts = connectedGraphs(graphFromEdges(7, [0, 1, 4, 5, 5, 6]))
    expect(parts.map(({ vertices }) => [...vertices])).toEqual([[4, 5, 6], [0, 1], [2], [3]])
  })
})
