import { describe, expect, it } from 'vitest'
import { indexSegments, nearestSegment } from '../../../../utils/lattice/hit-test'
import { latticeOf, seeded } from './small-lattice'

/** Distance by walking along the segment in small steps: slow, and sharing nothing with the index. */
function walkedDistance(segments: Float32Array, s: number, x: number, y: number): number {
  let best = Infinity
  for (let k = 0; k <= 4000; k++) {
    const t = k / 4000
    const px = segments[4 * s]! + t * (segments[4 * s + 2]! - segments[4 * s]!)
    const py = segments[4 * s + 1]! + t * (segments[4 * s + 3]! - segments[4 * s + 1]!)
    best = Math.min(best, Math.hypot(px - x, py - y))
  }
  return best
}

describe('nearestSegment', () => {
  it('finds the nearest segment of a machine, as looking at all of them does', () => {
    const { segments } = latticeOf({ kind: 'pegasus', m: 2, trimmed: true })
    const index = indexSegments(segments)
    const random = seeded(5)
    for (let k = 0; k < 60; k++) {
      const x = random() * 30 - 3
      const y = random() * 30 - 3
      const distances = Array.from({ length: segments.length / 4 }, (_, s) => walkedDistance(segments, s, x, y))
      const least = Math.min(...distances)
      const found = nearestSegment(index, x, y, 1.4)
      if (least > 1.41) expect(found).toBe(-1)
      else if (least < 1.39) expect(distances[found]).toBeCloseTo(least, 2)
    }
  })

  it('prefers what has a bonus, but never beyond its reach', () => {
    const index = indexSegments(Float32Array.of(0, 0, 10, 0, 0, 1, 10, 1))
    expect(nearestSegment(index, 5, 0.45, 1)).toBe(0)
    expect(nearestSegment(index, 5, 0.45, 1, (s) => (s === 1 ? 0.2 : 0))).toBe(1)
    expect(nearestSegment(index, 5, 0.45, 0.5, (s) => (s === 1 ? 5 : 0))).toBe(0)
    expect(nearestSegment(index, 5, 3, 1)).toBe(-1)
  })

  it('handles points and an empty machine', () => {
    expect(nearestSegment(indexSegments(Float32Array.of(2, 2, 2, 2)), 2.2, 2, 0.5)).toBe(0)
    expect(nearestSegment(indexSegments(new Float32Array(0)), 0, 0, 1)).toBe(-1)
  })
})
