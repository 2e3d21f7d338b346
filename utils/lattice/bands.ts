import { acrossAxis, alongAxis, axisOf } from './segments'
import type { Span } from './spans'
import type { LatticeData } from './types'
import type { Roles } from './roles'

/** A straight piece of a chain as drawn: one span, or several joined along one line. */
export interface Band {
  readonly chain: number
  readonly qubits: readonly number[]
  readonly x1: number
  readonly y1: number
  readonly x2: number
  readonly y2: number
}

/** A coupler inside a chain that is not on a band: a square where two bands cross, a bridge between two lines. */
export interface Joint {
  readonly chain: number
  readonly coupler: number
  readonly kind: 'crossing' | 'bridge' | 'join'
  readonly x1: number
  readonly y1: number
  readonly x2: number
  readonly y2: number
}

const TOLERANCE = 1e-3

/** How each coupler inside a chain is drawn: crossing, bridge between parallel lines, or join along one line. */
export function jointsOf(data: LatticeData, roles: Roles): Joint[] {
  return Array.from(roles.chainCouplers, (coupler): Joint => {
    const a = data.ends[2 * coupler]!
    const b = data.ends[2 * coupler + 1]!
    const x1 = data.places[4 * coupler]!
    const y1 = data.places[4 * coupler + 1]!
    const x2 = data.places[4 * coupler + 2]!
    const y2 = data.places[4 * coupler + 3]!
    const place = { chain: roles.owner[a]!, coupler, x1, y1, x2, y2 }
    if (areCollinear(data.segments, a, b)) return { ...place, kind: 'join' }
    return { ...place, kind: Math.hypot(x2 - x1, y2 - y1) > TOLERANCE ? 'bridge' : 'crossing' }
  })
}

function areCollinear(segments: Float32Array, a: number, b: number): boolean {
  const p = axisOf(segments, a)
  const q = axisOf(segments, b)
  if (p.length === 0 || q.length === 0) return false
  return acrossAxis(p, q.x, q.y) < TOLERANCE && acrossAxis(p, q.x + q.dx * q.length, q.y + q.dy * q.length) < TOLERANCE
}

/** Bands in ascending order of their first qubit: spans that a chain joins along one line become one. */
export function bandsOf(data: LatticeData, spans: readonly Span[], joints: readonly Joint[]): Band[] {
  const parent = new Map<number, number>(spans.map((span) => [span.qubit, span.qubit]))
  const rootOf = (qubit: number): number => {
    let root = qubit
    while (parent.get(root) !== root) root = parent.get(root)!
    parent.set(qubit, root)
    return root
  }
  for (const { kind, coupler } of joints) {
    if (kind !== 'join') continue
    const a = rootOf(data.ends[2 * coupler]!)
    const b = rootOf(data.ends[2 * coupler + 1]!)
    parent.set(Math.max(a, b), Math.min(a, b))
  }
  const groups = new Map<number, Span[]>()
  for (const span of spans) {
    const root = rootOf(span.qubit)
    const group = groups.get(root)
    if (group) group.push(span)
    else groups.set(root, [span])
  }
  return [...groups.values()].map((group) => bandAround(data.segments, group))
}

function bandAround(segments: Float32Array, group: readonly Span[]): Band {
  const axis = axisOf(segments, group[0]!.qubit)
  let low = Infinity
  let high = -Infinity
  for (const span of group) {
    for (const t of [alongAxis(axis, span.x1, span.y1), alongAxis(axis, span.x2, span.y2)]) {
      low = Math.min(low, t)
      high = Math.max(high, t)
    }
  }
  return {
    chain: group[0]!.chain,
    qubits: group.map((span) => span.qubit),
    x1: axis.x + low * axis.dx,
    y1: axis.y + low * axis.dy,
    x2: axis.x + high * axis.dx,
    y2: axis.y + high * axis.dy,
  }
}
