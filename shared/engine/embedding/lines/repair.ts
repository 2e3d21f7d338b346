import type { Graph } from '../../graph/graph'
import { shuffle } from '../../random'
import type { Assignment } from './assignment'
import { carve } from './carve'
import type { Coin } from './coin'
import { Mender } from './mender'
import { FREE, Ownership } from './ownership'

/** Gives variables that have no qubit (those without interactions) a free one each. Returns how many get none. */
function placeLeft(chains: Ownership): number {
  let q = 0
  let unplaced = 0
  for (let v = 0; v < chains.length.length; v++) {
    if (chains.length[v]! > 0) continue
    while (q < chains.owner.length && chains.owner[q] !== FREE) q++
    if (q < chains.owner.length) chains.give(q, v)
    else unplaced++
  }
  return unplaced
}

/** Disjoint chains and what they still lack. */
export interface Mended {
  readonly chains: Ownership
  readonly unmet: readonly number[]
  readonly unplaced: number
}

/** Number of things that are lacking. */
export const lacks = ({ unmet, unplaced }: Mended): number => unmet.length + unplaced

/** Whether the chains are an embedding. */
export const isWhole = (mended: Mended): boolean => lacks(mended) === 0

/**
 * Carves disjoint chains out of the intervals, trims them, and joins those that lost touch through free qubits, in
 * random order. With an assignment without overuse, nothing is lost.
 */
export function mendOnce(assignment: Assignment, machine: Graph, usable: Uint8Array, coin: Coin): Mended {
  const { problem } = assignment
  const chains = new Ownership(problem.order, usable)
  const mender = new Mender(problem, machine, chains)
  carve(assignment, machine, usable, coin, chains)
  const order = Array.from({ length: problem.order }, (_, v) => v)
  shuffle(order, coin)
  for (const v of order) mender.trim(v)
  const lost = mender.unmet()
  shuffle(lost, coin)
  for (const k of lost) mender.connect(problem.ends[2 * k]!, problem.ends[2 * k + 1]!)
  for (const v of order) mender.trim(v)
  const unplaced = placeLeft(chains)
  return { chains, unmet: mender.unmet(), unplaced }
}
