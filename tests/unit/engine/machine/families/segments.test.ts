import { describe, expect, it } from 'vitest'
import { buildFabric } from '../../../../../shared/engine/machine/build-fabric'
import type { PublishedFamily } from '../../../../../shared/engine/machine/fabric'
import type { LineSet } from '../../../../../shared/engine/machine/families/segments'
import { buildSegments } from '../../../../../shared/engine/machine/families/segments'
import { familyName } from '../../../../../shared/engine/machine/family'

interface Segment {
  readonly isVertical: boolean
  /** Position across, and reach along, the segment. */
  readonly at: number
  readonly from: number
  readonly to: number
}

function segmentAt(segments: Float32Array, q: number): Segment {
  const [x0, y0, x1, y1] = [...segments.subarray(4 * q, 4 * q + 4)] as [number, number, number, number]
  return x0 === x1 ? { isVertical: true, at: x0, from: y0, to: y1 } : { isVertical: false, at: y0, from: x0, to: x1 }
}

/** The coupler rule of domain knowledge, decided by looking at two drawn segments: no indices, no coordinates. */
function shouldCouple(a: Segment, b: Segment, partners: boolean): boolean {
  if (a.isVertical !== b.isVertical) return a.from < b.at && b.at < a.to && b.from < a.at && a.at < b.to
  if (a.at === b.at) return Math.min(Math.abs(a.from - b.to), Math.abs(b.from - a.to)) < 0.5
  const arePartners = Math.floor(a.at / 2) === Math.floor(b.at / 2)
  return partners && arePartners && Math.min(a.to, b.to) - Math.max(a.from, b.from) > 0.5
}

const FAMILIES: PublishedFamily[] = [
  { kind: 'chimera', m: 3, n: 4, t: 4 },
  { kind: 'chimera', m: 2, n: 3, t: 1 },
  { kind: 'pegasus', m: 2, trimmed: true },
  { kind: 'pegasus', m: 4, trimmed: false },
  { kind: 'pegasus', m: 4, trimmed: true },
  { kind: 'zephyr', m: 1, t: 2 },
  { kind: 'zephyr', m: 3, t: 4 },
]

describe('buildSegments', () => {
  it.each(FAMILIES.map((family) => [familyName(family), family] as const))(
    'couples exactly the segments that the drawing shows crossing, in line or side by side: %s',
    (_, family) => {
      const { graph, segments } = buildFabric(family)
      const drawn = Array.from({ length: graph.order }, (_unused, q) => segmentAt(segments, q))
      const expected: number[] = []
      for (let a = 0; a < graph.order; a++)
        for (let b = a + 1; b < graph.order; b++)
          if (shouldCouple(drawn[a]!, drawn[b]!, family.kind !== 'chimera')) expected.push(a, b)
      expect([...graph.ends]).toEqual(expected)
    },
  )

  it.each(FAMILIES.map((family) => [familyName(family), family] as const))(
    'keeps parallel lines one apart and leaves a gap of 0.4 between collinear segments: %s',
    (_, family) => {
      const { graph, segments } = buildFabric(family)
      const drawn = Array.from({ length: graph.order }, (_unused, q) => segmentAt(segments, q))
      for (const segment of drawn) {
        expect(Number.isInteger(segment.at)).toBe(true)
        const ahead = drawn.filter(
          ({ isVertical, at, from }) => isVertical === segment.isVertical && at === segment.at && from > segment.from,
        )
        if (ahead.length > 0) expect(Math.min(...ahead.map(({ from }) => from)) - segment.to).toBeCloseTo(0.4, 4)
      }
    },
  )

  it('numbers qubits densely in ascending order of their published numbers, gaps included', () => {
    const line = (id: LineSet['id']): LineSet => ({ lines: 2, perLine: 2, span: 2, start: () => -1, id })
    // Only crossings (x, y) with both segments covering them: the outer segments reach lines −1 to 2.
    const built = buildSegments({
      vertical: line((x, i) => 90 - 10 * x - i),
      horizontal: line((y, i) => 10 + 20 * y + i),
      partners: false,
      crossedOnly: true,
    })
    // Segment 0 of a line covers −1 and 0, segment 1 covers 1 and 2: each crosses one line of the other orientation.
    expect([...built.ids]).toEqual([10, 11, 30, 31, 79, 80, 89, 90])
    const pairs = Array.from({ length: built.graph.ends.length / 2 }, (_, k) => [
      built.ids[built.graph.ends[2 * k]!],
      built.ids[built.graph.ends[2 * k + 1]!],
    ])
    expect(pairs).toEqual([
      [10, 11],
      [10, 90],
      [11, 80],
      [30, 31],
      [30, 89],
      [31, 79],
      [79, 80],
      [89, 90],
    ])
    expect([...built.segments.subarray(0, 4)].map((v) => Math.round(v * 10) / 10)).toEqual([-1.3, 0, 0.3, 0])
  })

  it('leaves out segments that cross nothing when asked, and their couplers with them', () => {
    const build = (crossedOnly: boolean) =>
      buildSegments({
        vertical: { lines: 4, perLine: 1, span: 2, start: () => 0, id: (x) => x },
        horizontal: { lines: 2, perLine: 1, span: 2, start: () => 0, id: (y) => 4 + y },
        partners: true,
        crossedOnly,
      })
    expect([...build(false).ids]).toEqual([0, 1, 2, 3, 4, 5])
    expect(build(false).graph.ends.length / 2).toBe(4 + 3)
    expect([...build(true).ids]).toEqual([0, 1, 4, 5])
    expect(build(true).graph.ends.length / 2).toBe(4 + 2)
  })
})
