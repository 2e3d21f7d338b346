import { describe, expect, it } from 'vitest'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import type { Graph } from '../../../../shared/engine/graph/graph'
import { routingLowerBound, routingReach } from '../../../../shared/engine/problem/treewidth-routing'
import { createRandom } from '../../../../shared/engine/random'
import type { Random } from '../../../../shared/engine/random'
import { gridGraph, permutation, randomGraph, regularGraph, relabelled } from '../../../fixtures/graphs'
import { exactTreewidth } from '../../../fixtures/treewidth'

/** A random k-tree, whose treewidth is k by construction: each vertex joins a clique of k that is there. */
function randomKTree(n: number, k: number, random: Random): Graph {
  const cliques = [Array.from({ length: k }, (_, v) => v)]
  const ends: number[] = []
  for (let a = 0; a < k; a++) for (let b = a + 1; b < k; b++) ends.push(a, b)
  for (let v = k; v < n; v++) {
    const clique = cliques[random.below(cliques.length)]!
    for (const u of clique) ends.push(u, v)
    for (const left of clique) cliques.push([...clique.filter((u) => u !== left), v])
  }
  return relabelled(graphFromEdges(n, ends), permutation(n, random))
}

describe('routingLowerBound', () => {
  it('is never above the exact treewidth', () => {
    const random = createRandom(12)
    for (let round = 0; round < 150; round++) {
      const graph = randomGraph(6 + random.below(6), 0.15 + 0.8 * random.float(), random)
      expect(routingLowerBound(graph)).toBeLessThanOrEqual(exactTreewidth(graph))
    }
  })

  it('is never above k for k-trees, with all vertices as terminals or some', () => {
    const random = createRandom(13)
    for (let round = 0; round < 60; round++) {
      const k = 1 + random.below(5)
      const graph = randomKTree(30 + random.below(120), k, random)
      for (const maxWork of [5_000, 20_000, 3_000_000])
        expect(routingLowerBound(graph, { maxWork })).toBeLessThanOrEqual(k)
    }
  })

  it('lies between a third of the side and the side of square grids', () => {
    for (const side of [12, 20, 28]) {
      const bound = routingLowerBound(gridGraph(side, side))
      expect(bound).toBeLessThanOrEqual(side)
      expect(bound).toBeGreaterThan(side / 3)
    }
  })

  it('grows with random regular graphs, and is not tried where it cannot reach', () => {
    const graph = regularGraph(400, 4, createRandom(3))
    const bound = routingLowerBound(graph)
    expect(bound).toBeGreaterThan(25)
    expect(routingReach(graph)).toBeGreaterThan(bound)
    expect(routingLowerBound(graph, { useless: bound - 1 })).toBe(bound)
    expect(routingLowerBound(graph, { useless: 150 })).toBe(0)
    expect(routingLowerBound(graph, { maxWork: 100 })).toBe(0)
  })

  it('says nothing of graphs without edges', () => {
    expect(routingLowerBound(graphFromEdges(0, []))).toBe(0)
    expect(routingLowerBound(graphFromEdges(5, []))).toBe(0)
    expect(routingReach(graphFromEdges(5, []))).toBe(0)
  })
})
