import { describe, expect, it } from 'vitest'
import { brokenPlanarity, isPlanar } from '../../../../../shared/engine/embedding/bounds/planar'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import type { Graph } from '../../../../../shared/engine/graph/graph'
import { createRandom } from '../../../../../shared/engine/random'
import { completeGraph, gridGraph, regularGraph, taskOf } from '../../../../fixtures/graphs'
import { randomMinor } from '../../../../fixtures/treewidth'

const onGrid = (problem: Graph) => ({
  ...taskOf(problem, gridGraph(40, 40)),
  family: { kind: 'square', width: 40, height: 40 } as const,
})

/** Triangles glued into triangles: as many edges as a planar graph can have. */
function stackedTriangulation(n: number): Graph {
  const random = createRandom(n)
  const ends = [0, 1, 0, 2, 1, 2]
  const faces = [[0, 1, 2]]
  for (let v = 3; v < n; v++) {
    const [[a, b, c]] = faces.splice(random.below(faces.length), 1) as [[number, number, number]]
    ends.push(a, v, b, v, c, v)
    faces.push([a, b, v], [a, c, v], [b, c, v])
  }
  return graphFromEdges(n, ends)
}

describe('brokenPlanarity', () => {
  it('lets planar graphs through, also those with as many edges as can be', () => {
    const random = createRandom(15)
    for (const n of [5, 12, 60, 300]) expect(brokenPlanarity(onGrid(stackedTriangulation(n)), 1e6)).toBeNull()
    for (let round = 0; round < 200; round++) {
      const planar = round % 2 ? stackedTriangulation(40) : gridGraph(7, 7)
      const minor = randomMinor(planar, new Uint8Array(planar.order).fill(1), random)
      expect(brokenPlanarity(onGrid(minor), 1e6)).toBeNull()
    }
  })

  it('finds one edge too many, K_5 among others, and random graphs', () => {
    const planar = stackedTriangulation(30)
    const free = Array.from({ length: 30 }, (_, v) => v).find((v) => v > 0 && !hasEdge(planar, 0, v))!
    const proof = brokenPlanarity(onGrid(graphFromEdges(30, [...planar.ends, 0, free])), 1e6)
    expect(proof).toMatchObject({ needed: 85, available: 84, by: 1 })
    const grid = gridGraph(6, 6)
    const withClique = graphFromEdges(41, [...grid.ends, ...[...completeGraph(5).ends].map((v) => v + 36), 0, 36])
    expect(brokenPlanarity(onGrid(withClique), 1e6)).not.toBeNull()
    expect(brokenPlanarity(onGrid(regularGraph(60, 3, createRandom(1))), 1e6)).not.toBeNull()
  })

  it('is not asked of other machines', () => {
    expect(isPlanar({ family: null })).toBe(false)
    expect(isPlanar({ family: { kind: 'king', width: 4, height: 4 } })).toBe(false)
    expect(brokenPlanarity(taskOf(completeGraph(9), gridGraph(9, 9)), 1e6)).toBeNull()
  })
})

function hasEdge(graph: Graph, a: number, b: number): boolean {
  return graph.targets.subarray(graph.offsets[a], graph.offsets[a + 1]).includes(b)
}
