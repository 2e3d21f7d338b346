import type { Network } from './max-flow'
import { networkOf } from './max-flow'
import type { WorkingProblem } from './working-problem'

/**
 * A problem as a posiform (a constant and non-negative multiples of literals and of products of two) and its implication
 * network (Boros & Hammer, Pseudo-Boolean optimization, Discrete Appl. Math. 123, 2002): node 2k is the literal x of the
 * k-th variable left, 2k + 1 its negation; the source is the literal "true", the sink "false". A term α·u·v gives the arcs
 * u → ¬v and v → ¬u of capacity α/2; a linear term α·u counts as α·u·true. Capacities are doubled here, so that they stay
 * whole. Arcs 4t … 4t + 3 belong to term t: u → ¬v and its opposite, v → ¬u and its opposite.
 */
export interface ImplicationNetwork {
  readonly network: Network
  readonly capacities: bigint[]
  /** The posiform's constant, in the units of the problem. */
  readonly constant: bigint
  /** The variable of the problem that node 2k and 2k + 1 stand for. */
  readonly variables: Uint32Array
}

/** O(variables + interactions left). */
export function implicationNetworkOf(working: WorkingProblem): ImplicationNetwork {
  const variables = Uint32Array.from(working.isLeft.keys()).filter((v) => working.isLeft[v] === 1)
  const place = new Uint32Array(working.n)
  variables.forEach((v, k) => (place[v] = k))
  const truth = 2 * variables.length
  const linear = Array.from(variables, (v) => working.linear[v]!)
  const heads: number[] = []
  const capacities: bigint[] = []
  const addTerm = (u: number, v: number, value: bigint): void => {
    heads.push(v ^ 1, u, u ^ 1, v)
    capacities.push(value, 0n, value, 0n)
  }
  variables.forEach((v, i) => {
    for (const [partner, value] of working.pairs[v]!) {
      const j = place[partner]!
      if (j < i) continue
      if (value > 0n) addTerm(2 * i, 2 * j, value)
      else {
        // b x y = b y + |b| (1 − x) y, with the larger linear coefficient for y: it may cancel.
        const [other, own] = linear[i]! > linear[j]! ? [j, i] : [i, j]
        linear[own]! += value
        addTerm(2 * other + 1, 2 * own, -value)
      }
    }
  })
  let constant = working.constant
  linear.forEach((value, i) => {
    if (value > 0n) addTerm(2 * i, truth, value)
    else if (value < 0n) {
      constant += value
      addTerm(2 * i + 1, truth, -value)
    }
  })
  const network = networkOf(truth + 2, Uint32Array.from(heads), truth, truth + 1)
  return { network, capacities, constant, variables }
}
