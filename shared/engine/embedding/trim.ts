import { layChainTree } from './chain-tree'
import { countCouplers, inspectContacts, NO_CONTACT, soleContact } from './contacts'
import type { SearchState } from './state'

/** A qubit of the chain that some contact depends on, so that it may root the tree; else any qubit of the chain. */
function neededQubit(state: SearchState, variable: number): number {
  const { chains } = state
  const head = chains.chainHead[variable]!
  for (let record = head; record >= 0; record = chains.chainNext[record]!)
    if (soleContact(state, chains.qubit[record]!) !== NO_CONTACT) return chains.qubit[record]!
  return chains.qubit[head]!
}

/** One pass from the leaves of a spanning tree inwards; returns how many qubits went. */
function trimOnce(state: SearchState, variable: number): number {
  const { chains, visit, up, treeDegree } = state
  const count = layChainTree(state, variable, neededQubit(state, variable))
  let removed = 0
  for (let i = count - 1; i > 0; i--) {
    const q = visit[i]!
    if (treeDegree[q] !== 1 || soleContact(state, q) !== NO_CONTACT) continue
    countCouplers(state, q, -1)
    chains.remove(variable, q)
    treeDegree[up[q]!]!--
    removed++
  }
  return removed
}

/**
 * Removes qubits from a chain until no leaf of its spanning tree can go: the chain stays connected, never empty, and
 * keeps every contact it had. Leaves the variable under inspection. Returns how many qubits went.
 */
export function trimChain(state: SearchState, variable: number): number {
  if (state.chains.length[variable]! < 2) return 0
  inspectContacts(state, variable)
  let total = 0
  for (;;) {
    const removed = trimOnce(state, variable)
    total += removed
    if (removed === 0 || state.chains.length[variable]! < 2) return total
  }
}
