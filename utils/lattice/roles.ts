import type { ChainLayer, LatticeData } from './types'

/** What qubits and couplers do in an embedding. */
export interface Roles {
  /** Variable whose chain holds the qubit, or −1. */
  readonly owner: Int32Array
  /** Couplers with both qubits in one chain. */
  readonly chainCouplers: Uint32Array
  /** Couplers between the chains of two interacting variables. */
  readonly interactionCouplers: Uint32Array
}

export function rolesOf(data: LatticeData, chains: ChainLayer): Roles {
  const variables = chains.labels.length
  const owner = new Int32Array(data.ids.length).fill(-1)
  for (let i = 0; i < variables; i++)
    for (let k = chains.offsets[i]!; k < chains.offsets[i + 1]!; k++) owner[chains.qubits[k]!] = i

  const interacting = new Set<number>()
  for (let k = 0; k < chains.neighbours.length; k += 2) {
    const i = chains.neighbours[k]!
    const j = chains.neighbours[k + 1]!
    interacting.add(Math.min(i, j) * variables + Math.max(i, j))
  }
  const within: number[] = []
  const between: number[] = []
  for (let c = 0; 2 * c < data.ends.length; c++) {
    const i = owner[data.ends[2 * c]!]!
    const j = owner[data.ends[2 * c + 1]!]!
    if (i < 0 || j < 0) continue
    if (i === j) within.push(c)
    else if (interacting.has(Math.min(i, j) * variables + Math.max(i, j))) between.push(c)
  }
  return { owner, chainCouplers: Uint32Array.from(within), interactionCouplers: Uint32Array.from(between) }
}

/** For each variable the variables it interacts with, ascending. */
export function neighboursOf(chains: ChainLayer): number[][] {
  const around = chains.labels.map(() => new Set<number>())
  for (let k = 0; k < chains.neighbours.length; k += 2) {
    const i = chains.neighbours[k]!
    const j = chains.neighbours[k + 1]!
    if (i === j) continue
    around[i]?.add(j)
    around[j]?.add(i)
  }
  return around.map((others) => [...others].sort((a, b) => a - b))
}
