import { describe, expect, it } from 'vitest'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import { bandwidthOf, placesOf, reverseCuthillMcKee } from '../../../../shared/engine/graph/cuthill-mckee'
import { createRandom, shuffle } from '../../../../shared/engine/random'
import { gridGraph } from '../../../fixtures/graphs'

const identity = (n: number) => Array.from({ length: n }, (_, v) => v)

/** Pairs at most `band` apart on a line, some left out, under random names. */
function shuffledBand(n: number, band: number, seed: number) {
  const random = createRandom(seed)
  const names = identity(n)
  shuffle(names, random)
  const ends: number[] = []
  for (let a = 0; a < n; a++)
    for (let b = a + 1; b <= Math.min(n - 1, a + band); b++) if (random.float() < 0.7) ends.push(names[a]!, names[b]!)
  return graphFromEdges(n, ends)
}

describe('reverse Cuthill–McKee order', () => {
  it('is a permutation, also of many components and lone vertices', () => {
    for (let seed = 0; seed < 40; seed++) {
      const random = createRandom(seed)
      const n = random.below(40)
      const ends = Array.from({ length: random.below(30) }, () => [random.below(n || 1), random.below(n || 1)])
        .filter(([a, b]) => a !== b && n > 1)
        .flat()
      const order = reverseCuthillMcKee(graphFromEdges(n, ends))
      expect([...order].sort((a, b) => a - b)).toEqual(identity(n))
      expect(placesOf(order)).toEqual(Uint32Array.from(identity(n), (v) => order.indexOf(v)))
    }
  })

  it('is never wider than a shuffled band, and near the band itself', () => {
    for (let seed = 0; seed < 30; seed++) {
      const band = 1 + (seed % 6)
      const graph = shuffledBand(120, band, seed)
      const found = bandwidthOf(graph, placesOf(reverseCuthillMcKee(graph)))
      expect(found).toBeLessThanOrEqual(bandwidthOf(graph, identity(120)))
      expect(found).toBeLessThanOrEqual(2 * band)
    }
  })

  it('finds the band of a path, and about the shorter side of a grid', () => {
    const path = shuffledBand(50, 1, 3)
    expect(bandwidthOf(path, placesOf(reverseCuthillMcKee(path)))).toBe(1)
    const grid = gridGraph(5, 30)
    const found = bandwidthOf(grid, placesOf(reverseCuthillMcKee(grid)))
    expect(found).toBeGreaterThanOrEqual(5)
    expect(found).toBeLessThanOrEqual(6)
  })

  it('is the order by the book, backwards', () => {
    // A star with a tail: 0 – {1, 2, 3}, 3 – 4. From the far end: 4, 3, 0, then 1 and 2.
    expect([...reverseCuthillMcKee(graphFromEdges(5, [0, 1, 0, 2, 0, 3, 3, 4]))]).toEqual([2, 1, 0, 3, 4])
    // From 0, no further from its far end 3: of its neighbours 1 has the lower degree and comes before 2.
    expect([...reverseCuthillMcKee(graphFromEdges(5, [4, 2, 4, 3, 2, 1, 2, 0, 1, 0]))]).toEqual([3, 4, 2, 1, 0])
  })
})
