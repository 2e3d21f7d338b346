import { describe, expect, it } from 'vitest'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import type { Graph } from '../../../../../shared/engine/graph/graph'
import { layoutOfMachine } from '../../../../../shared/engine/graph/layout/machine'
import { createRandom } from '../../../../../shared/engine/random'
import { chimeraGraph, gridGraph, permutation, relabelled } from '../../../../fixtures/graphs'

const all = (graph: Graph): Uint8Array => new Uint8Array(graph.order).fill(1)

function couplerLengths({ ends }: Graph, segments: Float32Array): number[] {
  return Array.from({ length: ends.length / 2 }, (_, k) => {
    const [a, b] = [4 * ends[2 * k]!, 4 * ends[2 * k + 1]!]
    return Math.hypot(segments[a]! - segments[b]!, segments[a + 1]! - segments[b + 1]!)
  })
}

describe('layoutOfMachine', () => {
  it.each([
    ['grid', gridGraph(20, 20)],
    ['cells', chimeraGraph(8, 8, 4)],
  ])('draws a %s with couplers about one long, none very long', (_, lattice) => {
    const graph = relabelled(lattice, permutation(lattice.order, createRandom(1)))
    const segments = layoutOfMachine(graph, all(graph))
    const lengths = couplerLengths(graph, segments)
    expect(Math.sqrt(lengths.reduce((sum, length) => sum + length * length, 0) / lengths.length)).toBeCloseTo(1, 4)
    expect(Math.max(...lengths)).toBeLessThan(3)
    for (let q = 0; q < graph.order; q++) {
      expect(segments[4 * q]).toBe(segments[4 * q + 2])
      expect(segments[4 * q + 1]).toBe(segments[4 * q + 3])
    }
  })

  it('turns a square grid upright', () => {
    const graph = gridGraph(20, 20)
    const segments = layoutOfMachine(graph, all(graph))
    const widest = Math.max(...segments.filter((_, k) => k % 2 === 0))
    const tallest = Math.max(...segments.filter((_, k) => k % 2 === 1))
    expect(widest * tallest).toBeLessThan(1.4 * 400)
  })

  it('keeps the rectangles of connected parts apart', () => {
    const one = gridGraph(6, 5)
    const graph = graphFromEdges(60, [...one.ends, ...Array.from(one.ends, (v) => v + 30)])
    const segments = layoutOfMachine(graph, all(graph))
    const range = (part: number, axis: number): [number, number] => {
      const values = Array.from({ length: 30 }, (_, v) => segments[4 * (30 * part + v) + axis]!)
      return [Math.min(...values), Math.max(...values)]
    }
    const apart = [0, 1].some((axis) => range(0, axis)[1] < range(1, axis)[0])
    expect(apart).toBe(true)
  })

  it('puts qubits that are not usable in the middle', () => {
    const graph = graphFromEdges(5, [0, 1, 1, 2, 2, 3])
    const segments = layoutOfMachine(graph, Uint8Array.of(1, 1, 1, 1, 0))
    expect(segments[16]).toBeCloseTo(
      (Math.min(segments[0]!, segments[12]!) + Math.max(segments[0]!, segments[12]!)) / 2,
      4,
    )
  })

  it('is the same every time, and takes no qubits, one and two', () => {
    const graph = chimeraGraph(3, 3, 4)
    expect(layoutOfMachine(graph, all(graph))).toEqual(layoutOfMachine(graph, all(graph)))
    expect(layoutOfMachine(graphFromEdges(0, []), new Uint8Array(0))).toHaveLength(0)
    expect([...layoutOfMachine(graphFromEdges(1, []), Uint8Array.of(1))]).toEqual([0, 0, 0, 0])
    expect(
      couplerLengths(graphFromEdges(2, [0, 1]), layoutOfMachine(graphFromEdges(2, [0, 1]), Uint8Array.of(1, 1)))[0],
    ).toBeCloseTo(1, 5)
  })
})
