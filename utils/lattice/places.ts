import { alongAxis, axisOf } from './segments'
import type { Axis } from './segments'

/**
 * Where a coupler between two qubits meets them, whether or not the machine has it: the crossing point of two segments,
 * the facing ends of two collinear ones, and for parallel ones the feet of the middle of the stretch they share.
 *
 * @returns x and y on the first qubit, x and y on the second
 */
export function placesOfPair(segments: Float32Array, a: number, b: number): [number, number, number, number] {
  const p = axisOf(segments, a)
  const q = axisOf(segments, b)
  const cross = p.dx * q.dy - p.dy * q.dx
  if (p.length > 0 && q.length > 0 && Math.abs(cross) > 1e-6) {
    const t = ((q.x - p.x) * q.dy - (q.y - p.y) * q.dx) / cross
    const onFirst = Math.min(p.length, Math.max(0, t))
    const x = p.x + onFirst * p.dx
    const y = p.y + onFirst * p.dy
    const onSecond = Math.min(q.length, Math.max(0, alongAxis(q, x, y)))
    return [x, y, q.x + onSecond * q.dx, q.y + onSecond * q.dy]
  }
  return parallelPlaces(p, q)
}

function parallelPlaces(p: Axis, q: Axis): [number, number, number, number] {
  const line = p.length > 0 ? p : q
  const from = alongAxis(line, q.x, q.y)
  const to = alongAxis(line, q.x + q.length * q.dx, q.y + q.length * q.dy)
  const ownFrom = alongAxis(line, p.x, p.y)
  const ownTo = alongAxis(line, p.x + p.length * p.dx, p.y + p.length * p.dy)
  const low = Math.max(Math.min(from, to), Math.min(ownFrom, ownTo))
  const high = Math.min(Math.max(from, to), Math.max(ownFrom, ownTo))
  const middle = (low + high) / 2
  const onFirst = clampTo(middle, ownFrom, ownTo) - ownFrom
  const onSecond = clampTo(middle, from, to) - from
  return [p.x + onFirst * line.dx, p.y + onFirst * line.dy, q.x + onSecond * line.dx, q.y + onSecond * line.dy]
}

const clampTo = (value: number, a: number, b: number) => Math.min(Math.max(a, b), Math.max(Math.min(a, b), value))
