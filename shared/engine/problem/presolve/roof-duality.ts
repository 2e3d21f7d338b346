/**
 * Roof duality (Hammer, Hansen & Simeone, Math. Programming 28, 1984) through a maximum flow on the implication network
 * (Boros & Hammer, Discrete Appl. Math. 123, 2002). The flow turns the posiform into one with the same values whose
 * constant is the roof dual, a lower bound. Were the flow symmetric (the mean of itself and its mirror), it would leave an
 * arc u → v open exactly if the product u·¬v is still in the posiform; hence a set of literals with no open arc out of it
 * and no literal together with its negation, all set to 1, makes every term vanish that it touches, and leaves the others
 * alone: the energy never rises. Sets without an open arc out of them are the minimum cuts, so they are the same for every
 * maximum flow (Picard & Queyranne, Math. Programming Study 13, 1980), symmetric or not. Two of them are used:
 * - strong persistency: all literals that can be reached from "true". Each is at the end of a chain of terms one of which
 *   is positive unless all are 1: they are so in every optimum;
 * - weak persistency: strongly connected components in an order in which each comes after those it leads to, set to 1
 *   where it comes before its mirror (as in 2-satisfiability: Aspvall, Plass & Tarjan, Inf. Process. Lett. 8, 1979): they
 *   are so in some optimum, all together and with the strong ones.
 */
import { sendExactMaximumFlow } from './exact-flow'
import { implicationNetworkOf } from './implication-network'
import type { Network } from './max-flow'
import { strongComponents } from './strong-components'
import type { WorkingProblem } from './working-problem'

/** Values that hold together in some optimum, and the bound that proves them. */
export interface RoofDuality {
  /** Twice the roof dual, in the units of the problem: a lower bound of its energy, the constant included. */
  readonly doubleBound: bigint
  readonly strong: readonly { readonly variable: number; readonly value: 0 | 1 }[]
  readonly weak: readonly { readonly variable: number; readonly value: 0 | 1 }[]
}

/** The least of maximal sets of literals that must be 1: what the source reaches. */
function reachable({ heads, offsets, arcs, nodes, source }: Network, isOpen: Uint8Array): Uint8Array {
  const isReached = new Uint8Array(nodes)
  const queue = [source]
  isReached[source] = 1
  for (let v = queue.pop(); v !== undefined; v = queue.pop())
    for (let p = offsets[v]!; p < offsets[v + 1]!; p++) {
      const u = heads[arcs[p]!]!
      if (isOpen[arcs[p]!] === 0 || isReached[u] === 1) continue
      isReached[u] = 1
      queue.push(u)
    }
  return isReached
}

/**
 * Literals set to 1 by strongly connected components among those not decided: all of a component that comes before its
 * mirror. It leads to such components only: from C to E means from E's mirror to C's, so a component that comes after its
 * mirror, or is its own, would have C's mirror before C.
 */
function settledByComponents(network: Network, isOpen: Uint8Array, isDecided: Uint8Array): Uint8Array {
  const { componentOf } = strongComponents(network, isOpen, isDecided)
  return Uint8Array.from(componentOf, (component, v) => (component < componentOf[v ^ 1]! ? 1 : 0))
}

/**
 * The roof dual of what is left of a problem and the values it proves, by exact arithmetic throughout.
 * @returns null when it was asked to stop
 */
export function roofDuality(working: WorkingProblem, shouldStop: () => boolean): RoofDuality | null {
  const { network, capacities, constant, variables } = implicationNetworkOf(working)
  const residual = [...capacities]
  if (!sendExactMaximumFlow(network, residual, shouldStop)) return null
  let flow = 0n
  for (let p = network.offsets[network.source]!; p < network.offsets[network.source + 1]!; p++) {
    const e = network.arcs[p]!
    flow += capacities[e]! - residual[e]!
  }
  const isOpen = Uint8Array.from(residual, (value) => (value > 0n ? 1 : 0))
  const isReached = reachable(network, isOpen)
  const isDecided = isReached.map((reached, v) => reached | isReached[v ^ 1]!)
  isDecided[network.source] = isDecided[network.sink] = 1
  const isSettled = settledByComponents(network, isOpen, isDecided)
  const valuesOf = (isSet: Uint8Array) =>
    Array.from(variables).flatMap((variable, k): { variable: number; value: 0 | 1 }[] =>
      isSet[2 * k] === isSet[2 * k + 1] ? [] : [{ variable, value: isSet[2 * k] === 1 ? 1 : 0 }],
    )
  return { doubleBound: 2n * constant + flow, strong: valuesOf(isReached), weak: valuesOf(isSettled) }
}
