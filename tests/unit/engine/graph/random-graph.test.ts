import { describe, expect, it } from 'vitest'
import { sizeOf } from '../../../../shared/engine/graph/graph'
import { randomGraph } from '../../../../shared/engine/graph/random-graph'
import { createRandom } from '../../../../shared/engine/random'

describe('randomGraph', () => {
  it.each([
    [1, 0.5],
    [2, 1],
    [30, 0],
    [30, 0.37],
    [30, 1],
  ])('of %d vertices has the edges that density %d asks for', (order, density) => {
    const graph = randomGraph(order, density, createRandom(4))
    expect(graph.order).toBe(order)
    expect(sizeOf(graph)).toBe(Math.round((density * order * (order - 1)) / 2))
  })

  it('draws every pair equally often', () => {
    const rounds = 4000
    const counts = new Map<string, number>()
    for (let seed = 0; seed < rounds; seed++) {
      const { ends } = randomGraph(6, 0.4, createRandom(seed))
      for (let k = 0; k < ends.length; k += 2) {
        const key = `${ends[k]}-${ends[k + 1]}`
        counts.set(key, (counts.get(key) ?? 0) + 1)
      }
    }
    expect(counts.size).toBe(15)
    // Chi-square with 14 degrees of freedom, scaled for drawing without replacement; 36.1 is its 0.1 % point.
    const expected = 0.4 * rounds
    const chi = [...counts.values()].reduce((sum, count) => sum + (count - expected) ** 2 / (expected * 0.6), 0)
    expect((chi * 14) / 15).toBeLessThan(36.1)
  })

  it('is the same for the same seed, and refuses densities that are none', () => {
    expect(randomGraph(20, 0.3, createRandom(7)).ends).toEqual(randomGraph(20, 0.3, createRandom(7)).ends)
    expect(() => randomGraph(5, 1.1, createRandom(1))).toThrow(RangeError)
  })
})
