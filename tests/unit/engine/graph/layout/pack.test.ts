import { describe, expect, it } from 'vitest'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import { sizeOf } from '../../../../../shared/engine/graph/graph'
import type { Graph } from '../../../../../shared/engine/graph/graph'
import { packParts } from '../../../../../shared/engine/graph/layout/pack'
import { wirelength } from '../../../../../shared/engine/graph/layout/sites'
import { createRandom } from '../../../../../shared/engine/random'
import { gridGraph, permutation, relabelled } from '../../../../fixtures/graphs'

function sideBySide(graphs: readonly Graph[]): Graph {
  const ends: number[] = []
  let order = 0
  for (const graph of graphs) {
    for (const v of graph.ends) ends.push(v + order)
    order += graph.order
  }
  return relabelled(graphFromEdges(order, ends), permutation(order, createRandom(order)))
}

const all = (graph: Graph): Uint8Array => new Uint8Array(graph.order).fill(1)

describe('packParts', () => {
  it.each([
    ['two, left and right', 2, 20, 10],
    ['two, one below the other', 2, 10, 20],
    ['four', 4, 20, 20],
  ])('puts grids where each keeps all its edges at length 1: %s', (_, count, columns, rows) => {
    const graph = sideBySide(Array.from({ length: count }, () => gridGraph(10, 10)))
    const packed = packParts(graph, all(graph), columns, rows, createRandom(1))
    expect(wirelength(packed.graph, packed.sites)).toBe(sizeOf(graph))
  })

  it('numbers vertices on from part to part, with the edges that they had', () => {
    const graph = sideBySide([gridGraph(3, 3), gridGraph(4, 5), gridGraph(1, 1)])
    const packed = packParts(graph, all(graph), 6, 5, createRandom(2))
    expect([...packed.vertices].sort((a, b) => a - b)).toEqual([...graph.offsets.keys()].slice(0, 30))
    const renamed = graphFromEdges(
      30,
      Array.from(packed.graph.ends, (v) => packed.vertices[v]!),
    )
    expect(renamed.ends).toEqual(graph.ends)
  })

  it('lays out as many parts of very unequal size as there are sites', () => {
    const graph = sideBySide([gridGraph(9, 9), ...Array.from({ length: 19 }, () => gridGraph(1, 1))])
    const { column, row } = packParts(graph, all(graph), 10, 10, createRandom(3)).sites
    expect(new Set(Array.from(column, (c, v) => `${c},${row[v]}`)).size).toBe(100)
  })
})
