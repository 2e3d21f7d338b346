import { describe, expect, it } from 'vitest'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import { annealPlacement } from '../../../../../shared/engine/graph/layout/anneal'
import { rankEqualise, wirelength } from '../../../../../shared/engine/graph/layout/sites'
import type { Sites } from '../../../../../shared/engine/graph/layout/sites'
import { createRandom } from '../../../../../shared/engine/random'
import { completeGraph, gridGraph, randomGraph, regularGraph } from '../../../../fixtures/graphs'

function strewn(count: number, columns: number, rows: number, seed: number): Sites {
  const random = createRandom(seed)
  const draw = (): number[] => Array.from({ length: count }, () => random.float())
  return rankEqualise(draw(), draw(), columns, rows)
}

const never = (): boolean => false
const distinct = ({ column, row }: Sites): number => new Set(Array.from(column, (c, v) => `${c},${row[v]}`)).size

describe('annealPlacement', () => {
  it.each([
    ['full grid of sites', regularGraph(100, 3, createRandom(1)), 10, 10],
    ['many empty sites', regularGraph(60, 4, createRandom(2)), 9, 15],
    ['vertices without neighbours', randomGraph(80, 0.02, createRandom(3)), 9, 9],
    ['one row', gridGraph(40, 1), 40, 1],
    ['dense', completeGraph(12), 4, 4],
  ])('keeps sites distinct and the length exact: %s', (_, graph, columns, rows) => {
    const start = strewn(graph.order, columns, rows, 4)
    const { sites, length } = annealPlacement(graph, start, createRandom(5), 0.3, never)
    expect(wirelength(graph, sites)).toBe(length)
    expect(distinct(sites)).toBe(graph.order)
    expect(sites.column.every((c) => c >= 0 && c < columns)).toBe(true)
    expect(sites.row.every((r) => r >= 0 && r < rows)).toBe(true)
    expect(length).toBeLessThanOrEqual(wirelength(graph, start))
  })

  it('finds the shortest placement of a small grid', () => {
    const graph = gridGraph(4, 4)
    const lengths = [1, 2, 3, 4, 5].map(
      (seed) => annealPlacement(graph, strewn(16, 4, 4, seed), createRandom(seed), 10, never).length,
    )
    expect(Math.min(...lengths)).toBe(24)
  })

  it('makes a third of a strewn start’s length from a 3-regular graph', () => {
    const graph = regularGraph(200, 3, createRandom(6))
    const start = strewn(200, 15, 15, 7)
    const { length } = annealPlacement(graph, start, createRandom(8), 1, never)
    expect(length).toBeLessThan(wirelength(graph, start) / 3)
  })

  it('is the same for the same random numbers and leaves the start as it was', () => {
    const graph = regularGraph(50, 3, createRandom(9))
    const start = strewn(50, 8, 8, 10)
    const before = { ...start, column: start.column.slice(), row: start.row.slice() }
    const run = () => annealPlacement(graph, start, createRandom(11), 0.5, never)
    expect(run()).toEqual(run())
    expect(start).toEqual(before)
  })

  it('gives the start back when stopped at once or without effort', () => {
    const graph = regularGraph(50, 3, createRandom(12))
    const start = strewn(50, 8, 8, 13)
    expect(annealPlacement(graph, start, createRandom(14), 1, () => true).sites).toEqual(start)
    expect(annealPlacement(graph, start, createRandom(14), 0, never).sites).toEqual(start)
  })

  it('takes no vertices and a single one', () => {
    for (const order of [0, 1]) {
      const start = strewn(order, 2, 2, 1)
      expect(annealPlacement(graphFromEdges(order, []), start, createRandom(1), 1, never).length).toBe(0)
    }
  })

  it('refuses a start with two vertices on one site', () => {
    const start = { columns: 2, rows: 2, column: Int32Array.of(0, 0), row: Int32Array.of(1, 1) }
    expect(() => annealPlacement(completeGraph(2), start, createRandom(1), 1, never)).toThrow(
      'vertices 0 and 1 share a site',
    )
  })
})
