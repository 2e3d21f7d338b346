import { describe, expect, it } from 'vitest'
import { equalisedSites, rankEqualise, wirelength } from '../../../../../shared/engine/graph/layout/sites'
import { createRandom } from '../../../../../shared/engine/random'
import { gridGraph, randomGraph } from '../../../../fixtures/graphs'

const strewn = (count: number, seed: number): { x: number[]; y: number[] } => {
  const random = createRandom(seed)
  const draw = (): number[] => Array.from({ length: count }, () => random.normal())
  return { x: draw(), y: draw() }
}

describe('rankEqualise', () => {
  it.each([
    [30, 6, 5],
    [23, 5, 5],
    [7, 20, 9],
    [1, 1, 1],
    [0, 3, 3],
  ])('gives %i points sites of their own on %i × %i', (count, columns, rows) => {
    const { x, y } = strewn(count, count)
    for (const rowsFirst of [false, true]) {
      const { column, row } = rankEqualise(x, y, columns, rows, rowsFirst)
      expect(new Set(Array.from(column, (c, v) => `${c},${row[v]}`)).size).toBe(count)
      expect(column.every((c) => c >= 0 && c < columns)).toBe(true)
      expect(row.every((r) => r >= 0 && r < rows)).toBe(true)
    }
  })

  it('keeps the order by x from column to column and by y within one, and the other way round', () => {
    const { x, y } = strewn(40, 3)
    const byColumn = rankEqualise(x, y, 8, 6)
    const byRow = rankEqualise(x, y, 8, 6, true)
    for (let a = 0; a < 40; a++)
      for (let b = 0; b < 40; b++) {
        if (byColumn.column[a]! < byColumn.column[b]!) expect(x[a]).toBeLessThan(x[b]!)
        else if (byColumn.column[a] === byColumn.column[b] && byColumn.row[a]! < byColumn.row[b]!)
          expect(y[a]).toBeLessThan(y[b]!)
        if (byRow.row[a]! < byRow.row[b]!) expect(y[a]).toBeLessThan(y[b]!)
        else if (byRow.row[a] === byRow.row[b] && byRow.column[a]! < byRow.column[b]!) expect(x[a]).toBeLessThan(x[b]!)
      }
  })

  it('settles ties by number and takes points that all coincide', () => {
    const { column, row } = rankEqualise([1, 1, 1, 1], [2, 2, 2, 2], 2, 2)
    expect([...column]).toEqual([0, 0, 1, 1])
    expect([...row]).toEqual([0, 1, 0, 1])
  })

  it('refuses more points than sites', () => {
    expect(() => rankEqualise([0, 1, 2], [0, 1, 2], 1, 2)).toThrow('3 points do not fit 1 × 2 sites')
  })
})

describe('wirelength', () => {
  it('is the edge count for a grid on its own sites', () => {
    const graph = gridGraph(4, 3)
    const sites = {
      column: Int32Array.from({ length: 12 }, (_, v) => v % 4),
      row: Int32Array.from({ length: 12 }, (_, v) => Math.floor(v / 4)),
    }
    expect(wirelength(graph, sites)).toBe(17)
  })

  it('is that of the better order in equalisedSites', () => {
    const graph = randomGraph(40, 0.1, createRandom(1))
    const { x, y } = strewn(40, 9)
    const { sites, length } = equalisedSites(graph, x, y, 7, 6)
    const both = [false, true].map((rowsFirst) => wirelength(graph, rankEqualise(x, y, 7, 6, rowsFirst)))
    expect(length).toBe(Math.min(...both))
    expect(wirelength(graph, sites)).toBe(length)
  })
})
