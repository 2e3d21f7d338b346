import { describe, expect, it } from 'vitest'
import { edgeBetween, graphFromEdges, graphFromSortedEdges } from '../../../../shared/engine/graph/build'
import { degreeOf, sizeOf } from '../../../../shared/engine/graph/graph'
import { createRandom } from '../../../../shared/engine/random'

/** Random ends with many repeats in both directions, loops left out. */
function randomEnds(order: number, count: number, seed: number): number[] {
  const random = createRandom(seed)
  const ends: number[] = []
  while (ends.length < 2 * count) {
    const [a, b] = [random.below(order), random.below(order)]
    if (a !== b) ends.push(a, b)
  }
  return ends
}

describe('graphFromEdges', () => {
  it.each([1, 2, 3])('agrees with an adjacency matrix on random edge lists (seed %i)', (seed) => {
    const order = 23
    const ends = randomEnds(order, 150, seed)
    const joined = Array.from({ length: order }, () => new Array<boolean>(order).fill(false))
    for (let k = 0; k < ends.length; k += 2) {
      joined[ends[k]!]![ends[k + 1]!] = true
      joined[ends[k + 1]!]![ends[k]!] = true
    }
    const graph = graphFromEdges(order, ends)
    expect(sizeOf(graph)).toBe(joined.flat().filter(Boolean).length / 2)
    for (let v = 0; v < order; v++) {
      const neighbours = joined[v]!.flatMap((isJoined, w) => (isJoined ? [w] : []))
      expect(degreeOf(graph, v)).toBe(neighbours.length)
      expect([...graph.targets.subarray(graph.offsets[v]!, graph.offsets[v + 1]!)]).toEqual(neighbours)
      for (let w = 0; w < order; w++) expect(edgeBetween(graph, v, w) >= 0).toBe(joined[v]![w])
    }
  })

  it('labels every neighbour slot with the edge between the two', () => {
    const graph = graphFromEdges(17, randomEnds(17, 60, 5))
    for (let v = 0; v < graph.order; v++)
      for (let slot = graph.offsets[v]!; slot < graph.offsets[v + 1]!; slot++) {
        const edge = graph.edgeIds[slot]!
        const pair = [v, graph.targets[slot]!].sort((a, b) => a - b)
        expect([graph.ends[2 * edge], graph.ends[2 * edge + 1]]).toEqual(pair)
        expect(edgeBetween(graph, pair[1]!, pair[0]!)).toBe(edge)
      }
  })

  it('accepts vertices without edges and no vertices at all', () => {
    expect(sizeOf(graphFromEdges(4, []))).toBe(0)
    expect([...graphFromEdges(0, []).offsets]).toEqual([0])
  })

  it('refuses loops and ends outside the graph, naming the edge', () => {
    expect(() => graphFromEdges(3, [0, 1, 2, 2])).toThrow('edge 1 joins 2 to itself')
    expect(() => graphFromEdges(3, [0, 3])).toThrow('edge 0 joins 0 and 3, outside 0 … 2')
    expect(() => graphFromEdges(3, [0, 0.5])).toThrow(RangeError)
    expect(() => graphFromEdges(3, [-1, 0])).toThrow(RangeError)
  })
})

describe('graphFromSortedEdges', () => {
  it('gives the same graph as the general builder', () => {
    const graph = graphFromEdges(31, randomEnds(31, 200, 9))
    expect(graphFromSortedEdges(31, graph.ends.slice())).toEqual(graph)
  })
})
