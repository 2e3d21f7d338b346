import type { Fabric } from './fabric'

export type Orientation = 'vertical' | 'horizontal' | 'point'

/** Internal: crossing qubits. External: successive on one line. Odd: side by side. Lattice: between two points. */
export type CouplerKind = 'internal' | 'external' | 'odd' | 'lattice'

/** The smallest rectangle around all qubits, in line spacings; y grows downwards. */
export interface Bounds {
  readonly left: number
  readonly top: number
  readonly right: number
  readonly bottom: number
}

type Drawing = Pick<Fabric, 'segments'>

/** The rectangle that holds every qubit of the fabric. */
export function bounds({ segments }: Drawing): Bounds {
  let [left, top, right, bottom] = [Infinity, Infinity, -Infinity, -Infinity]
  for (let k = 0; k < segments.length; k += 2) {
    left = Math.min(left, segments[k]!)
    right = Math.max(right, segments[k]!)
    top = Math.min(top, segments[k + 1]!)
    bottom = Math.max(bottom, segments[k + 1]!)
  }
  return { left, top, right, bottom }
}

/** How qubit q (dense index) lies in the plane. */
export function orientationOf({ segments }: Drawing, q: number): Orientation {
  if (segments[4 * q] !== segments[4 * q + 2]) return 'horizontal'
  return segments[4 * q + 1] === segments[4 * q + 3] ? 'point' : 'vertical'
}

/** The kind of coupler that edge `edgeId` of the fabric's graph is, read off the geometry. */
export function couplerKind(fabric: Pick<Fabric, 'graph' | 'segments'>, edgeId: number): CouplerKind {
  const { graph, segments } = fabric
  const a = graph.ends[2 * edgeId]!
  const b = graph.ends[2 * edgeId + 1]!
  const orientation = orientationOf(fabric, a)
  if (orientation === 'point') return 'lattice'
  if (orientation !== orientationOf(fabric, b)) return 'internal'
  const across = orientation === 'vertical' ? 0 : 1
  return segments[4 * a + across] === segments[4 * b + across] ? 'external' : 'odd'
}

/** Where parallel segments a and b are joined, measured along them: facing ends, or twice the middle of the overlap. */
function parallelPlaces(segments: Float32Array, a: number, b: number, along: 0 | 1): [number, number] {
  const [fromA, toA] = [segments[4 * a + along]!, segments[4 * a + along + 2]!]
  const [fromB, toB] = [segments[4 * b + along]!, segments[4 * b + along + 2]!]
  if (toA < fromB) return [toA, fromB]
  if (toB < fromA) return [fromA, toB]
  const middle = (Math.max(fromA, fromB) + Math.min(toA, toB)) / 2
  return [middle, middle]
}

/**
 * Where the coupler `edgeId` of the fabric's graph attaches: writes (x, y) on its lower-indexed qubit, then (x, y) on
 * the other. Internal: the crossing, twice. External: the two facing ends. Odd: two points side by side in the middle
 * of the overlap. Lattices of points: the two points.
 * @param out length 4; returned for convenience
 */
export function couplerPlace(
  fabric: Pick<Fabric, 'graph' | 'segments'>,
  edgeId: number,
  out: Float32Array,
): Float32Array {
  const { graph, segments } = fabric
  const a = graph.ends[2 * edgeId]!
  const b = graph.ends[2 * edgeId + 1]!
  out[0] = segments[4 * a]!
  out[1] = segments[4 * a + 1]!
  out[2] = segments[4 * b]!
  out[3] = segments[4 * b + 1]!
  const kind = couplerKind(fabric, edgeId)
  const vertical = orientationOf(fabric, a) === 'vertical'
  if (kind === 'internal') {
    out[0] = out[2] = segments[4 * (vertical ? a : b)]!
    out[1] = out[3] = segments[4 * (vertical ? b : a) + 1]!
  } else if (kind !== 'lattice') {
    const along = vertical ? 1 : 0
    const [placeA, placeB] = parallelPlaces(segments, a, b, along)
    out[along] = placeA
    out[along + 2] = placeB
  }
  return out
}
