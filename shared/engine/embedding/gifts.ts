import { layChainTree } from './chain-tree'
import { countCouplers, inspectContacts, NO_CONTACT, soleContact } from './contacts'
import type { SearchState } from './state'

/**
 * Lays the tree from the middle of a longest path of an arbitrary tree, so that leaves lie far from the root on all
 * sides and every leaf but that of a chain of two can be followed upwards.
 */
function layTreeFromMiddle(state: SearchState, variable: number): number {
  const { chains, visit, up } = state
  const any = chains.qubit[chains.chainHead[variable]!]!
  const end = visit[layChainTree(state, variable, any) - 1]!
  const otherEnd = visit[layChainTree(state, variable, end) - 1]!
  let depth = 0
  for (let q = otherEnd; q !== end; q = up[q]!) depth++
  let middle = otherEnd
  for (let step = depth >> 1; step > 0; step--) middle = up[middle]!
  return layChainTree(state, variable, middle)
}

/** Number of qubits from the leaf upwards that serve no partner but `receiver`, up to a branch. */
function runLength(state: SearchState, leaf: number, receiver: number): number {
  const { treeDegree, up } = state
  let count = 1
  for (let q = up[leaf]!; q >= 0 && treeDegree[q]! <= 2; q = up[q]!) {
    const sole = soleContact(state, q)
    if (sole !== NO_CONTACT && sole !== receiver) break
    count++
  }
  return count
}

/** Moves one leaf of the chain under inspection to the partner it serves and keeps the contact counts exact. */
function give(state: SearchState, variable: number, qubit: number, receiver: number): void {
  const { machine, chains, contacts } = state
  countCouplers(state, qubit, -1)
  chains.remove(variable, qubit)
  if (chains.owns(receiver, qubit)) return
  chains.add(receiver, qubit)
  for (let p = machine.offsets[qubit]!; p < machine.offsets[qubit + 1]!; p++)
    if (chains.owns(variable, machine.targets[p]!)) contacts[receiver]!++
}

function giveFromLeaf(state: SearchState, variable: number, leaf: number, balanced: boolean): void {
  const { chains, treeDegree, up } = state
  const receiver = soleContact(state, leaf)
  if (receiver < 0) return
  const share = runLength(state, leaf, receiver) >> 1
  let q = leaf
  for (let given = 0; given < share; given++) {
    // A gift can make this qubit the last contact to a partner that the two of them touched.
    const sole = soleContact(state, q)
    if (sole !== receiver && sole !== NO_CONTACT) return
    if (balanced && chains.length[receiver]! + 1 >= chains.length[variable]!) return
    give(state, variable, q, receiver)
    q = up[q]!
    treeDegree[q]!--
  }
}

/**
 * Gives the outer half of every branch that serves a single partner to that partner's chain, so that both bear the
 * cost of the way between them. Chains stay connected and every contact is kept; the total of qubits does not grow.
 * @param balanced give only while the partner's chain stays shorter than this one
 */
export function giveOuterHalves(state: SearchState, variable: number, balanced: boolean): void {
  const { chains, visit, treeDegree } = state
  if (chains.length[variable]! < 2) return
  inspectContacts(state, variable)
  const count = layTreeFromMiddle(state, variable)
  for (let i = count - 1; i > 0; i--) {
    const q = visit[i]!
    if (treeDegree[q] === 1 && chains.owns(variable, q)) giveFromLeaf(state, variable, q, balanced)
  }
}
