import Graph from 'graphology'
import { describe, expect, it } from 'vitest'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import { graphFigures } from '../../../../../shared/engine/machine/graph-files/figures'
import { createRandom } from '../../../../../shared/engine/random'

/** Parts, each flooded from a node that was not reached before. */
function partsOf(graph: Graph): number {
  const seen = new Set<string>()
  return graph.filterNodes((start) => {
    if (seen.has(start)) return false
    const waiting = [start]
    for (let v = waiting.pop(); v !== undefined; v = waiting.pop()) {
      seen.add(v)
      waiting.push(...graph.filterNeighbors(v, (w) => !seen.has(w)))
    }
    return true
  }).length
}

describe('graphFigures', () => {
  it('counts parts and degrees as an independent library does', () => {
    const random = createRandom(2)
    for (let round = 0; round < 60; round++) {
      const order = 1 + random.below(30)
      const other = new Graph({ type: 'undirected' })
      for (let v = 0; v < order; v++) other.addNode(v)
      for (let k = random.below(40); k > 0; k--) {
        const [a, b] = [random.below(order), random.below(order)]
        if (a !== b) other.mergeEdge(a, b)
      }
      const ends = other.mapEdges((_, __, a, b) => [Number(a), Number(b)]).flat()
      const degrees = other.mapNodes((v) => other.degree(v))
      expect(
        graphFigures(
          graphFromEdges(order, ends),
          Uint32Array.from({ length: order }, (_, q) => 3 * q + 1),
        ),
      ).toEqual({
        qubits: order,
        couplers: other.size,
        leastDegree: Math.min(...degrees),
        mostDegree: Math.max(...degrees),
        parts: partsOf(other),
        isolatedQubits: degrees.filter((degree) => degree === 0).length,
        lowestNumber: 1,
        highestNumber: 3 * order - 2,
      })
    }
  })
})
