import { describe, expect, it } from 'vitest'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import { pivotLayout } from '../../../../../shared/engine/graph/layout/pivot'
import { createRandom } from '../../../../../shared/engine/random'
import { gridGraph, regularGraph } from '../../../../fixtures/graphs'

describe('pivotLayout', () => {
  it('lays a path out in its order, evenly', () => {
    const { x } = pivotLayout(gridGraph(30, 1), createRandom(1))
    const steps = Array.from({ length: 29 }, (_, v) => x[v + 1]! - x[v]!)
    for (const step of steps) expect(step / steps[0]!).toBeCloseTo(1, 6)
  })

  it('follows the distances in a grid', () => {
    const { x, y } = pivotLayout(gridGraph(15, 15), createRandom(2))
    const between = (a: number, b: number): number => Math.hypot(x[a]! - x[b]!, y[a]! - y[b]!)
    const [corner, next, middle, opposite] = [0, 1, 7 * 15 + 7, 224]
    expect(between(corner, next)).toBeLessThan(between(corner, middle))
    expect(between(corner, middle)).toBeLessThan(0.7 * between(corner, opposite))
  })

  it('puts the middle at the origin', () => {
    const { x, y } = pivotLayout(regularGraph(50, 3, createRandom(8)), createRandom(9))
    for (const axis of [x, y]) {
      const spread = Math.hypot(...axis)
      expect(axis.reduce((sum, value) => sum + value, 0) / spread).toBeCloseTo(0, 9)
    }
  })

  it('is the same for the same random numbers', () => {
    const graph = regularGraph(60, 3, createRandom(6))
    expect(pivotLayout(graph, createRandom(7))).toEqual(pivotLayout(graph, createRandom(7)))
  })

  it('takes graphs of no, one and two vertices', () => {
    expect(pivotLayout(graphFromEdges(0, []), createRandom(1)).x).toHaveLength(0)
    expect([...pivotLayout(graphFromEdges(1, []), createRandom(1)).x]).toEqual([0])
    const { x } = pivotLayout(graphFromEdges(2, [0, 1]), createRandom(1))
    expect(Math.abs(x[0]! - x[1]!)).toBeGreaterThan(0.1)
  })

  it('refuses a graph in parts', () => {
    expect(() => pivotLayout(graphFromEdges(3, [0, 1]), createRandom(1))).toThrow('a connected graph is needed')
  })
})
