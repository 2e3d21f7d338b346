import type { Graph } from '../../graph/graph'
import type { Assignment } from './assignment'
import type { Coin } from './coin'
import type { Ownership } from './ownership'

/** Claimants of each qubit; of several one is drawn, each with the same chance. Returns the winner by qubit, or −1. */
function drawWinners(assignment: Assignment, usable: Uint8Array, coin: Coin): Int32Array {
  const { crossings, line, low, high } = assignment
  const winner = new Int32Array(usable.length).fill(-1)
  const claims = new Int32Array(usable.length)
  for (let part = 0; part < line.length; part++) {
    const base = crossings.slotOf[crossings.first[part & 1]! + line[part]!]!
    for (let place = low[part]!; place <= high[part]!; place++) {
      const q = crossings.qubits[base + place]!
      if (usable[q] === 1 && coin.below(++claims[q]!) === 0) winner[q] = part >> 1
    }
  }
  return winner
}

/**
 * Makes disjoint chains of line intervals: an overused qubit goes to one of its users, and each chain keeps its largest
 * connected piece. Chains without overuse come out whole.
 */
export function carve(assignment: Assignment, machine: Graph, usable: Uint8Array, coin: Coin, chains: Ownership): void {
  const winner = drawWinners(assignment, usable, coin)
  const pieceOf = new Int32Array(machine.order).fill(-1)
  const queue = new Int32Array(machine.order)
  const largest = new Int32Array(chains.length.length).fill(-1)
  const largestSize = new Int32Array(chains.length.length)
  for (let root = 0; root < machine.order; root++) {
    const v = winner[root]!
    if (v < 0 || pieceOf[root]! >= 0) continue
    let count = 1
    queue[0] = root
    pieceOf[root] = root
    for (let i = 0; i < count; i++) {
      const q = queue[i]!
      for (let p = machine.offsets[q]!; p < machine.offsets[q + 1]!; p++) {
        const r = machine.targets[p]!
        if (winner[r] !== v || pieceOf[r]! >= 0) continue
        pieceOf[r] = root
        queue[count++] = r
      }
    }
    if (count <= largestSize[v]!) continue
    largestSize[v] = count
    largest[v] = root
  }
  chains.clear()
  for (let q = 0; q < machine.order; q++) {
    const v = winner[q]!
    if (v >= 0 && pieceOf[q] === largest[v]) chains.give(q, v)
  }
}
