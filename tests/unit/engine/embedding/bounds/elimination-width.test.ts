import { describe, expect, it } from 'vitest'
import { eliminationWidth } from '../../../../../shared/engine/embedding/bounds/elimination-width'
import { farToNear, sweepOrder } from '../../../../../shared/engine/embedding/bounds/sweeps'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import { buildFabric } from '../../../../../shared/engine/machine/build-fabric'
import { createRandom } from '../../../../../shared/engine/random'
import { completeGraph, gridGraph, permutation, randomGraph, usableExcept } from '../../../../fixtures/graphs'
import { exactTreewidth, widthByEliminating } from '../../../../fixtures/treewidth'

describe('eliminationWidth', () => {
  it('equals the width of the elimination carried out, for any order of any vertices', () => {
    const random = createRandom(31)
    for (let round = 0; round < 400; round++) {
      const n = 1 + random.below(40)
      const graph = randomGraph(n, random.float() ** 2, random)
      const sequence = Uint32Array.from(permutation(n, random).slice(0, 1 + random.below(n)))
      expect(eliminationWidth(graph, sequence)).toBe(widthByEliminating(graph, sequence))
    }
  })

  it('is never below the treewidth', () => {
    const random = createRandom(32)
    for (let round = 0; round < 100; round++) {
      const graph = randomGraph(8, random.float(), random)
      const order = Uint32Array.from(permutation(8, random))
      expect(eliminationWidth(graph, order)).toBeGreaterThanOrEqual(exactTreewidth(graph))
    }
  })

  it('takes no vertices, single ones and complete graphs', () => {
    expect(eliminationWidth(graphFromEdges(0, []), new Uint32Array(0))).toBe(0)
    expect(eliminationWidth(graphFromEdges(3, []), Uint32Array.of(2, 0, 1))).toBe(0)
    expect(eliminationWidth(completeGraph(7), Uint32Array.of(3, 1, 2, 0, 6, 5, 4))).toBe(6)
  })
})

describe('the orders of sweeps', () => {
  it('hold each usable qubit once', () => {
    const { graph, segments } = buildFabric({ kind: 'pegasus', m: 3, trimmed: true })
    const usable = usableExcept(graph.order, 0.2, createRandom(1))
    const expected = [...usable.keys()].filter((q) => usable[q])
    for (const direction of ['rightwards', 'leftwards', 'downwards', 'upwards'] as const)
      expect([...sweepOrder(segments, usable, direction, 2)].sort((a, b) => a - b)).toEqual(expected)
    expect([...farToNear(graph, usable)].sort((a, b) => a - b)).toEqual(expected)
  })

  it('copes with coordinates of any size', () => {
    const { graph, segments } = buildFabric({ kind: 'square', width: 6, height: 4 })
    const usable = new Uint8Array(graph.order).fill(1)
    const far = segments.map((value) => 1e6 * value - 3e7)
    const order = sweepOrder(far, usable, 'rightwards', 1)
    expect(eliminationWidth(graph, order)).toBe(eliminationWidth(graph, sweepOrder(segments, usable, 'rightwards', 1)))
  })

  it('see each part of a machine from its edge', () => {
    // Two paths: eliminated end by end, their width is 1.
    const graph = graphFromEdges(7, [0, 1, 1, 2, 2, 3, 4, 5, 5, 6])
    expect(eliminationWidth(graph, farToNear(graph, new Uint8Array(7).fill(1)))).toBe(1)
    expect(eliminationWidth(gridGraph(9, 2), farToNear(gridGraph(9, 2), new Uint8Array(18).fill(1)))).toBe(2)
  })
})
