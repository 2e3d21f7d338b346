import { describe, expect, it } from 'vitest'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import { buildFabric } from '../../../../../shared/engine/machine/build-fabric'
import { drawnSegments, medianSpacing, segmentsAt } from '../../../../../shared/engine/machine/graph-files/places'
import { createRandom } from '../../../../../shared/engine/random'

const pointsOf = (segments: Float32Array): [number, number][] =>
  Array.from({ length: segments.length / 4 }, (_, q) => [segments[4 * q]!, segments[4 * q + 1]!])

const drawn = (order: number, ends: ArrayLike<number>): Float32Array => {
  const graph = graphFromEdges(order, ends)
  return drawnSegments({ ids: Uint32Array.from({ length: order }, (_, q) => q), ends: graph.ends })
}

/** Mean length of the couplers over the mean distance of any two qubits. */
function nearness(segments: Float32Array, ends: ArrayLike<number>): number {
  const points = pointsOf(segments)
  const distance = (a: number, b: number): number =>
    Math.hypot(points[a]![0] - points[b]![0], points[a]![1] - points[b]![1])
  const random = createRandom(3)
  let [coupled, any] = [0, 0]
  for (let k = 0; k < ends.length; k += 2) {
    coupled += distance(ends[k]!, ends[k + 1]!)
    any += distance(random.below(points.length), random.below(points.length))
  }
  return coupled / any
}

describe('segmentsAt', () => {
  it('leaves a grid of spacing 1 as it is, moved to the corner', () => {
    const positions = Float64Array.of(5, 7, 6, 7, 5, 8, 6, 8)
    expect([...segmentsAt(positions)]).toEqual([0, 0, 0, 0, 1, 0, 1, 0, 0, 1, 0, 1, 1, 1, 1, 1])
  })

  it('brings the median distance to the nearest neighbour to 1', () => {
    const random = createRandom(5)
    const positions = Float64Array.from({ length: 400 }, () => 1e-6 * random.float() + 40)
    const segments = segmentsAt(positions) as Float32Array
    expect(medianSpacing(Float64Array.from(pointsOf(segments).flat()))).toBeCloseTo(1, 4)
  })

  it('takes a single qubit, and refuses places that a drawing cannot tell apart', () => {
    expect([...segmentsAt(Float64Array.of(1e300, -1e300))]).toEqual([0, 0, 0, 0])
    expect(segmentsAt(Float64Array.of(0, 0, 1, 0, 2, 0, 1e30, 0))).toMatch(/too near each other/)
    expect(segmentsAt(Float64Array.of(-1e308, 0, 1e308, 0))).toMatch(/too near each other/)
  })

  it('draws qubits nearer than 1 where the whole would become too large', () => {
    const positions = Float64Array.of(0, 0, 1, 0, 0, 1, 1, 1, 5e5, 5e5)
    const points = pointsOf(segmentsAt(positions) as Float32Array)
    expect(Math.max(...points.flat())).toBeCloseTo(4095, 0)
    expect(points[1]![0]).toBeGreaterThan(0)
    // A long row takes no room.
    const row = Float64Array.from({ length: 200_000 }, (_, k) => (k % 2 ? 0 : k / 2))
    expect((segmentsAt(row) as Float32Array)[4 * 99_999]).toBe(99_999)
  })
})

describe('drawnSegments', () => {
  const families = [
    { kind: 'king', width: 30, height: 20 },
    { kind: 'pegasus', m: 4, trimmed: true },
    { kind: 'heavy-hex', rows: 8, columns: 8 },
  ] as const

  it.each(families)('puts coupled qubits near each other, each in a place of its own: %o', (family) => {
    const { graph } = buildFabric(family)
    const segments = drawn(graph.order, graph.ends)
    expect(new Set(pointsOf(segments).map(String)).size).toBe(graph.order)
    expect(nearness(segments, graph.ends)).toBeLessThan(0.4)
    for (let q = 0; q < graph.order; q++)
      expect(segments.subarray(4 * q + 2, 4 * q + 4)).toEqual(segments.subarray(4 * q, 4 * q + 2))
  })

  it('places stars, lone qubits and random graphs apart, the same each time', () => {
    const random = createRandom(11)
    const ends = Array.from({ length: 2400 }, () => random.below(600))
    const pairs = ends.flatMap((a, k) => (k % 2 || a === ends[k + 1] ? [] : [a, ends[k + 1]!]))
    const star = Array.from({ length: 500 }, (_, k) => [0, k + 1]).flat()
    for (const [order, list] of [
      [600, pairs],
      [501, star],
      [300, []],
      [1, []],
    ] as const) {
      const segments = drawn(order, list)
      expect(new Set(pointsOf(segments).map(String)).size).toBe(order)
      expect(drawn(order, list)).toEqual(segments)
    }
  })
})
