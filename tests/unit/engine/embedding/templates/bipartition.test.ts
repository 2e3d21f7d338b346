import { describe, expect, it } from 'vitest'
import { bipartition } from '../../../../../shared/engine/embedding/templates/bipartition'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import { createRandom } from '../../../../../shared/engine/random'
import { cycleGraph, randomGraph } from '../../../../fixtures/graphs'

/** Whether some assignment of two sides works, by trying all. */
function hasTwoSides(order: number, ends: Uint32Array): boolean {
  for (let sides = 0; sides < 2 ** order; sides++) {
    let fits = true
    for (let k = 0; k < ends.length && fits; k += 2) fits = ((sides >> ends[k]!) & 1) !== ((sides >> ends[k + 1]!) & 1)
    if (fits) return true
  }
  return false
}

describe('bipartition', () => {
  it('agrees with trying all assignments', () => {
    const random = createRandom(3)
    for (let k = 0; k < 200; k++) {
      const graph = randomGraph(1 + random.below(8), 0.4 * random.float(), random)
      const found = bipartition(graph)
      expect(found !== null).toBe(hasTwoSides(graph.order, graph.ends))
      if (!found) continue
      for (let e = 0; e < graph.ends.length; e += 2)
        expect(found.side[graph.ends[e]!]).not.toBe(found.side[graph.ends[e + 1]!])
      const ones = found.side.reduce((sum, side) => sum + side, 0)
      expect(found.sizes).toEqual([graph.order - ones, ones])
    }
  })

  it('evens the sides out by turning whole parts', () => {
    // Two stars of three rays: turned against each other, each side has four vertices.
    expect(bipartition(graphFromEdges(8, [0, 1, 0, 2, 0, 3, 4, 5, 4, 6, 4, 7]))!.sizes).toEqual([4, 4])
    expect(bipartition(cycleGraph(7))).toBeNull()
  })
})
