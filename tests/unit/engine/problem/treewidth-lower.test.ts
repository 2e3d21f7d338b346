import { describe, expect, it } from 'vitest'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import { treewidthLowerBound, treewidthReach } from '../../../../shared/engine/problem/treewidth-lower'
import { treewidthUpperBound } from '../../../../shared/engine/problem/treewidth'
import { createRandom } from '../../../../shared/engine/random'
import {
  completeGraph,
  cycleGraph,
  gridGraph,
  permutation,
  randomGraph,
  regularGraph,
  relabelled,
} from '../../../fixtures/graphs'
import { exactTreewidth } from '../../../fixtures/treewidth'

describe('treewidthLowerBound', () => {
  it('is never above the exact treewidth, with any amount of work', () => {
    const random = createRandom(3)
    let tight = 0
    for (let round = 0; round < 500; round++) {
      const graph = randomGraph(2 + random.below(8), random.float(), random)
      const exact = exactTreewidth(graph)
      for (const work of [0, 30, 100, 1_000_000]) {
        const bound = treewidthLowerBound(graph, { contractionWork: work, routingWork: work })
        expect(bound).toBeLessThanOrEqual(exact)
        if (work === 1_000_000 && bound === exact) tight++
      }
    }
    expect(tight).toBeGreaterThan(400)
  })

  it('is never above what elimination reaches on larger graphs', () => {
    const random = createRandom(8)
    for (let round = 0; round < 60; round++) {
      const n = 20 + random.below(60)
      const graph = round % 2 ? randomGraph(n, 0.02 + 0.3 * random.float(), random) : regularGraph(2 * n, 3, random)
      expect(treewidthLowerBound(graph)).toBeLessThanOrEqual(treewidthUpperBound(graph)!)
    }
  })

  it('knows graphs whose treewidth their degrees give away', () => {
    expect(treewidthLowerBound(completeGraph(30))).toBe(29)
    expect(treewidthLowerBound(cycleGraph(12))).toBe(2)
    expect(treewidthLowerBound(graphFromEdges(6, [0, 1, 1, 2, 2, 3, 3, 4, 3, 5]))).toBe(1)
    expect(treewidthLowerBound(graphFromEdges(4, []))).toBe(0)
    expect(treewidthLowerBound(graphFromEdges(0, []))).toBe(0)
  })

  it('finds dense minors of sparse graphs by contracting, and the spread of grids by routing', () => {
    // Every edge of K_8 halved: degrees alone say 2.
    const k8 = completeGraph(8)
    const halved = graphFromEdges(
      8 + 28,
      Array.from({ length: 28 }, (_, k) => [k8.ends[2 * k]!, 8 + k, 8 + k, k8.ends[2 * k + 1]!]).flat(),
    )
    expect(treewidthLowerBound(halved, { contractionWork: 0, routingWork: 0 })).toBe(2)
    expect(treewidthLowerBound(halved, { routingWork: 0 })).toBe(7)
    const grid = gridGraph(30, 30)
    expect(treewidthLowerBound(grid, { routingWork: 0 })).toBeLessThan(8)
    const routed = treewidthLowerBound(grid)
    expect(routed).toBeGreaterThanOrEqual(14)
    expect(routed).toBeLessThanOrEqual(30)
  })

  it('holds under other names of the vertices, parts and isolated vertices', () => {
    const random = createRandom(5)
    const graph = randomGraph(9, 0.5, random)
    const exact = exactTreewidth(graph)
    const ends = [...graph.ends, ...[...cycleGraph(5).ends].map((v) => v + 9)]
    for (let round = 0; round < 20; round++)
      expect(treewidthLowerBound(relabelled(graphFromEdges(16, ends), permutation(16, random)))).toBeLessThanOrEqual(
        exact,
      )
  })

  it('ends once above what is asked for, and gives the same every time', () => {
    const graph = regularGraph(300, 4, createRandom(4))
    const best = treewidthLowerBound(graph)
    expect(treewidthLowerBound(graph)).toBe(best)
    expect(treewidthLowerBound(graph, { enough: 2 })).toBeGreaterThan(2)
    expect(treewidthLowerBound(graph, { enough: best })).toBeLessThanOrEqual(best)
    expect(treewidthReach(graph)).toBeGreaterThanOrEqual(best)
  })

  it('estimates its reach from above, also where there is no work to be done', () => {
    const random = createRandom(41)
    for (let round = 0; round < 100; round++) {
      const graph = randomGraph(4 + random.below(50), random.float(), random)
      for (const work of [0, 2000, 1_000_000]) {
        const limits = { contractionWork: work, routingWork: 0 }
        expect(treewidthReach(graph, limits)).toBeGreaterThanOrEqual(treewidthLowerBound(graph, limits))
      }
    }
  })
})
