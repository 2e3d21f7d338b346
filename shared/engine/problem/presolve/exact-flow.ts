import type { Network } from './max-flow'
import { sendMaximumFlow } from './max-flow'

/** Bits of an arc's capacity that one pass looks at; with its opposite they stay within the 53 of a double. */
const BITS = 52

/** The integers without their last `shift` bits. */
function leading(residual: readonly bigint[], ceiling: bigint, shift: bigint): Float64Array {
  return Float64Array.from(residual, (value) => Number((value < ceiling ? value : ceiling) >> shift))
}

const bitsOf = (value: bigint): number => (value === 0n ? 0 : value.toString(2).length)

/**
 * Maximum flow with integer capacities of any size, exact: capacity scaling (Edmonds & Karp, J. ACM 19, 1972) with 52
 * bits at a time. After a pass on the leading bits, a cut has none left, so what may still flow is less than arcs · 2^shift;
 * no arc needs more capacity than that in the next pass, which therefore looks at lower bits. Turns `residual` into what
 * the flow leaves.
 * @returns false when it was asked to stop: the flow is then valid, but may not be a maximum
 */
export function sendExactMaximumFlow(network: Network, residual: bigint[], shouldStop: () => boolean): boolean {
  let ceiling = residual.reduce((most, value) => (value > most ? value : most), 0n)
  for (;;) {
    const shift = BigInt(Math.max(0, bitsOf(ceiling) - BITS))
    const capacity = leading(residual, ceiling, shift)
    const left = capacity.slice()
    const isMaximum = sendMaximumFlow(network, left, shouldStop)
    for (let e = 0; e < residual.length; e++)
      if (left[e] !== capacity[e]) residual[e]! -= BigInt(capacity[e]! - left[e]!) << shift
    if (shift === 0n || !isMaximum) return isMaximum
    ceiling = BigInt(residual.length) << shift
  }
}
