import type { Box } from './types'

/**
 * A qubit's segment as a line with a direction: a point on it is start + t · direction, 0 ≤ t ≤ length.
 * A qubit of a lattice of points has length 0 and direction (1, 0).
 */
export interface Axis {
  readonly x: number
  readonly y: number
  readonly dx: number
  readonly dy: number
  readonly length: number
}

export function axisOf(segments: Float32Array, qubit: number): Axis {
  const x = segments[4 * qubit]!
  const y = segments[4 * qubit + 1]!
  const ex = segments[4 * qubit + 2]! - x
  const ey = segments[4 * qubit + 3]! - y
  const length = Math.hypot(ex, ey)
  return length === 0 ? { x, y, dx: 1, dy: 0, length } : { x, y, dx: ex / length, dy: ey / length, length }
}

/** Position along the axis of the foot of (px, py). */
export const alongAxis = (axis: Axis, px: number, py: number): number =>
  (px - axis.x) * axis.dx + (py - axis.y) * axis.dy

/** Distance of (px, py) from the line through the axis. */
export const acrossAxis = (axis: Axis, px: number, py: number): number =>
  Math.abs((py - axis.y) * axis.dx - (px - axis.x) * axis.dy)

/** Squared distance from a point to the segment between two others. */
export function squaredDistanceToSegment(
  px: number,
  py: number,
  x1: number,
  y1: number,
  x2: number,
  y2: number,
): number {
  const ex = x2 - x1
  const ey = y2 - y1
  const squared = ex * ex + ey * ey
  const t = squared === 0 ? 0 : Math.min(1, Math.max(0, ((px - x1) * ex + (py - y1) * ey) / squared))
  const fx = px - x1 - t * ex
  const fy = py - y1 - t * ey
  return fx * fx + fy * fy
}

/** Smallest box around the segments, or null when there are none. `qubits` limits it to some of them. */
export function boxOfSegments(segments: Float32Array, qubits?: ArrayLike<number>): Box | null {
  let x1 = Infinity
  let y1 = Infinity
  let x2 = -Infinity
  let y2 = -Infinity
  const count = qubits ? qubits.length : segments.length / 4
  for (let k = 0; k < count; k++) {
    const at = 4 * (qubits ? qubits[k]! : k)
    for (let end = at; end < at + 4; end += 2) {
      x1 = Math.min(x1, segments[end]!)
      x2 = Math.max(x2, segments[end]!)
      y1 = Math.min(y1, segments[end + 1]!)
      y2 = Math.max(y2, segments[end + 1]!)
    }
  }
  return x1 <= x2 ? { x1, y1, x2, y2 } : null
}
