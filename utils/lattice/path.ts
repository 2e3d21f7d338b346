import type { Graph } from '#shared/engine/graph/graph'
import { coupledTo } from './machine-graph'

export type QubitPair = readonly [number, number]

/** How two chains lie to each other on the machine. */
export type ChainPath =
  /** They share couplers: each from a qubit of the first to one of the second. */
  | { readonly kind: 'touching'; readonly couplers: readonly QubitPair[] }
  | {
      readonly kind: 'apart'
      /** From the first chain to the second, without the qubits of either. */
      readonly between: readonly number[]
      /** Those of `between` that other chains use; none where free qubits do. */
      readonly used: readonly number[]
      /** One more than there are qubits between. */
      readonly couplers: readonly QubitPair[]
    }
  /** No working qubits join them. */
  | { readonly kind: 'none' }

export interface PathInput {
  readonly machine: Graph
  readonly usable: Uint8Array
  /** Chain of each qubit, or −1. */
  readonly owner: Int32Array
  readonly from: number
  readonly to: number
}

/**
 * The shortest path from one chain to another through free qubits; where there is none, the shortest through working
 * qubits of other chains, and of those the one that uses the fewest. Breadth-first search from all qubits of the first
 * chain at once: O(qubits + couplers).
 */
export function pathBetweenChains(input: PathInput): ChainPath {
  const touching = sharedCouplers(input)
  if (touching.length > 0) return { kind: 'touching', couplers: touching }
  const line = shortest(input, (q) => input.owner[q]! < 0) ?? shortest(input, () => true)
  if (!line) return { kind: 'none' }
  const between = line.slice(1, -1)
  return {
    kind: 'apart',
    between,
    used: between.filter((q) => input.owner[q]! >= 0),
    couplers: line.slice(1).map((q, i): QubitPair => [line[i]!, q]),
  }
}

/** Couplers between two chains, the first chain's qubit first. */
export function sharedCouplers({ machine, owner, from, to }: Omit<PathInput, 'usable'>): QubitPair[] {
  const pairs: QubitPair[] = []
  owner.forEach((chain, q) => {
    if (chain !== from) return
    for (const r of coupledTo(machine, q)) if (owner[r] === to) pairs.push([q, r])
  })
  return pairs
}

/** Qubits from the first chain to the second, one of each included. */
function shortest({ machine, usable, owner, from, to }: PathInput, mayPass: (q: number) => boolean): number[] | null {
  const distance = new Int32Array(owner.length).fill(-1)
  const passed = new Int32Array(owner.length)
  const previous = new Int32Array(owner.length).fill(-1)
  const queue: number[] = []
  owner.forEach((chain, q) => {
    if (chain !== from || !usable[q]) return
    distance[q] = 0
    queue.push(q)
  })
  let end = -1
  for (const q of queue) {
    if (end >= 0 && distance[q]! >= distance[end]!) break
    for (const r of coupledTo(machine, q)) {
      const isEnd = owner[r] === to
      if (!usable[r] || !(isEnd || mayPass(r))) continue
      const uses = passed[q]! + (isEnd || owner[r]! < 0 ? 0 : 1)
      if (distance[r]! < 0) {
        distance[r] = distance[q]! + 1
        queue.push(r)
      } else if (distance[r] !== distance[q]! + 1 || uses >= passed[r]!) continue
      passed[r] = uses
      previous[r] = q
      if (isEnd && (end < 0 || uses < passed[end]!)) end = r
    }
  }
  if (end < 0) return null
  const line = [end]
  while (previous[line.at(-1)!]! >= 0) line.push(previous[line.at(-1)!]!)
  return line.reverse()
}
