import { alongAxis, axisOf } from './segments'
import type { LatticeData } from './types'
import type { Roles } from './roles'

/** The part of a used qubit's segment that its couplers need. */
export interface Span {
  readonly qubit: number
  readonly chain: number
  readonly x1: number
  readonly y1: number
  readonly x2: number
  readonly y2: number
}

export const SPAN_DEFAULTS = {
  /** How far a band goes on beyond its outermost coupler, in line spacings. */
  overhang: 0.38,
}

/**
 * One span for each used qubit, in ascending order of qubit: from its first to its last used coupler, with a little more
 * at both ends so that the coupler sits on the band. A qubit with no used coupler gets a short span at its middle.
 */
export function spansOf(data: LatticeData, roles: Roles, overhang = SPAN_DEFAULTS.overhang): Span[] {
  const low = new Float32Array(data.ids.length).fill(Infinity)
  const high = new Float32Array(data.ids.length).fill(-Infinity)
  const stretch = (coupler: number) => {
    for (let end = 0; end < 2; end++) {
      const qubit = data.ends[2 * coupler + end]!
      const at = 4 * coupler + 2 * end
      const t = alongAxis(axisOf(data.segments, qubit), data.places[at]!, data.places[at + 1]!)
      low[qubit] = Math.min(low[qubit]!, t)
      high[qubit] = Math.max(high[qubit]!, t)
    }
  }
  roles.chainCouplers.forEach(stretch)
  roles.interactionCouplers.forEach(stretch)

  const spans: Span[] = []
  roles.owner.forEach((chain, qubit) => {
    if (chain < 0) return
    const { x, y, dx, dy, length } = axisOf(data.segments, qubit)
    const from = (low[qubit]! <= high[qubit]! ? low[qubit]! : length / 2) - overhang
    const to = (low[qubit]! <= high[qubit]! ? high[qubit]! : length / 2) + overhang
    spans.push({ qubit, chain, x1: x + from * dx, y1: y + from * dy, x2: x + to * dx, y2: y + to * dy })
  })
  return spans
}
