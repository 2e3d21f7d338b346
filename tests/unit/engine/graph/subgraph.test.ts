import { describe, expect, it } from 'vitest'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import { keepEdges } from '../../../../shared/engine/graph/subgraph'
import { createRandom } from '../../../../shared/engine/random'

describe('keepEdges', () => {
  it('equals a graph built anew from the edges that are left', () => {
    const random = createRandom(4)
    const complete: number[] = []
    for (let a = 0; a < 14; a++) for (let b = a + 1; b < 14; b++) complete.push(a, b)
    const graph = graphFromEdges(14, complete)
    const keep = Uint8Array.from({ length: graph.ends.length / 2 }, () => random.below(2))
    const left = complete.filter((_, slot) => keep[slot >> 1] === 1)
    expect(keepEdges(graph, keep)).toEqual(graphFromEdges(14, left))
  })

  it('leaves the graph it was given as it was', () => {
    const graph = graphFromEdges(3, [0, 1, 1, 2])
    keepEdges(graph, Uint8Array.of(0, 1))
    expect(graph).toEqual(graphFromEdges(3, [0, 1, 1, 2]))
  })

  it('refuses a list of another length', () => {
    expect(() => keepEdges(graphFromEdges(3, [0, 1, 1, 2]), new Uint8Array(3))).toThrow(
      'keep has 3 entries for 2 edges',
    )
  })
})
