import { markBeside } from './grow'
import type { ChainState } from './state'

/** What `soleContact` answers besides a partner's number. */
const NONE = -1
const SEVERAL = -2

/** Adds `sign` to the contact counts of all partners that the qubit touches. */
function countTouches(state: ChainState, qubit: number, sign: 1 | -1): void {
  const { touch, touchedAt, touchNow, words, contacts } = state
  if (touchedAt[qubit] !== touchNow) return
  for (let w = 0; w < words; w++)
    for (let rest = touch[qubit * words + w]!; rest !== 0; rest &= rest - 1)
      contacts[32 * w + 31 - Math.clz32(rest & -rest)]! += sign
}

/** The number of the one partner that the tree touches only by this qubit, or that there is none, or several. */
function soleContact(state: ChainState, qubit: number): number {
  const { touch, touchedAt, touchNow, words, contacts } = state
  if (touchedAt[qubit] !== touchNow) return NONE
  let sole = NONE
  for (let w = 0; w < words; w++) {
    for (let rest = touch[qubit * words + w]!; rest !== 0; rest &= rest - 1) {
      const k = 32 * w + 31 - Math.clz32(rest & -rest)
      if (contacts[k] !== 1) continue
      if (sole !== NONE) return SEVERAL
      sole = k
    }
  }
  return sole
}

/** Turns the tree's parents round so that `root` is the first. */
function reroot(parent: Int32Array, root: number): void {
  let previous = -1
  for (let q = root; q >= 0;) {
    const next = parent[q]!
    parent[q] = previous
    previous = q
    q = next
  }
}

/** Prepares the tree of `size` qubits: marks, degrees, contact counts. */
function inspect(state: ChainState, partners: number, size: number): void {
  const { tree, parent, treeAt, treeDegree, contacts } = state
  const now = ++state.treeNow
  contacts.fill(0, 0, partners)
  for (let i = 0; i < size; i++) {
    treeAt[tree[i]!] = now
    treeDegree[tree[i]!] = 0
  }
  for (let i = 0; i < size; i++) {
    const q = tree[i]!
    countTouches(state, q, 1)
    if (parent[q]! < 0) continue
    treeDegree[q]!++
    treeDegree[parent[q]!]!++
  }
}

/** Roots the tree at its first branch, or in the middle of a tree without one, so that every leaf leads upwards. */
function rootInside(state: ChainState, size: number): void {
  const { tree, parent, treeAt, treeNow, treeDegree } = state
  let end = -1
  let left = 0
  for (let i = 0; i < size; i++) {
    const q = tree[i]!
    if (treeAt[q] !== treeNow) continue
    left++
    if (treeDegree[q]! > 2) {
      reroot(parent, q)
      return
    }
    if (treeDegree[q] === 1) end = q
  }
  if (end < 0) return
  // Rooted at one end first, the middle is half the way up from the other.
  reroot(parent, end)
  let q = end
  for (let i = 0; i < size; i++)
    if (treeAt[tree[i]!] === treeNow && treeDegree[tree[i]!] === 1 && tree[i] !== end) q = tree[i]!
  for (let step = left >> 1; step > 0 && parent[q]! >= 0; step--) q = parent[q]!
  reroot(parent, q)
}

function leaveTree(state: ChainState, qubit: number): void {
  countTouches(state, qubit, -1)
  state.treeAt[qubit] = 0
  const above = state.parent[qubit]!
  if (above >= 0) state.treeDegree[above]!--
}

/** Takes leaves off the tree that no contact depends on, and what becomes a leaf by that. Never the last qubit. */
function trim(state: ChainState, size: number): void {
  const { tree, parent, treeAt, treeNow, treeDegree } = state
  for (let i = 0; i < size; i++) {
    let q = tree[i]!
    while (treeAt[q] === treeNow && treeDegree[q] === 1 && parent[q]! >= 0 && soleContact(state, q) === NONE) {
      leaveTree(state, q)
      q = parent[q]!
    }
  }
}

/** Tree qubits from the leaf upwards that serve no partner but `receiver`, up to a branch. */
function runLength(state: ChainState, leaf: number, receiver: number): number {
  const { parent, treeDegree } = state
  let count = 1
  for (let q = parent[leaf]!; q >= 0 && treeDegree[q]! <= 2; q = parent[q]!) {
    const sole = soleContact(state, q)
    if (sole !== NONE && sole !== receiver) break
    count++
  }
  return count
}

function give(state: ChainState, qubit: number, partner: number, receiver: number): void {
  const { offsets, targets, treeAt, treeNow, touch, touchedAt, touchNow, words, contacts } = state
  leaveTree(state, qubit)
  if (state.owns(receiver, qubit)) return
  state.add(receiver, qubit)
  const word = partner >>> 5
  const bit = 1 << (partner & 31)
  for (let p = offsets[qubit]!; p < offsets[qubit + 1]!; p++) {
    const r = targets[p]!
    if (treeAt[r] !== treeNow) continue
    if (touchedAt[r] !== touchNow || (touch[r * words + word]! & bit) === 0) contacts[partner]!++
  }
  markBeside(state, qubit, partner)
}

function giveFromLeaf(state: ChainState, variable: number, leaf: number, left: number, balanced: boolean): number {
  const { parent, partners, partnerOffsets, length } = state
  const partner = soleContact(state, leaf)
  if (partner < 0) return 0
  const receiver = partners[partnerOffsets[variable]! + partner]!
  if (state.frozen[receiver]) return 0
  const share = runLength(state, leaf, partner) >> 1
  let q = leaf
  let given = 0
  for (; given < share; given++) {
    // A gift can make this qubit the last contact to a partner that the two of them touched.
    const sole = soleContact(state, q)
    if (sole !== partner && sole !== NONE) break
    if (balanced && length[receiver]! + 1 >= left - given) break
    give(state, q, partner, receiver)
    q = parent[q]!
  }
  return given
}

/** Qubits still in the tree. */
function countTree({ tree, treeAt, treeNow }: ChainState, size: number): number {
  let left = 0
  for (let i = 0; i < size; i++) if (treeAt[tree[i]!] === treeNow) left++
  return left
}

/** How a tree becomes a chain. */
export interface Settling {
  /** Largest chain that is taken; a longer one, after trimming, changes nothing. */
  readonly longest: number
  /** Give only while the partner's chain stays shorter than this one. */
  readonly balanced: boolean
}

/**
 * Makes the grown tree the chain of the variable: trims what no contact depends on, then gives the outer half of every
 * branch that serves a single partner to that partner's chain, so that both bear the cost of the way between them.
 * Chains stay connected and every contact is kept. Touches must be marked, as `markTouches` leaves them.
 * @param size qubits in `state.tree`, connected by `state.parent`
 * @returns whether the chain was taken
 */
export function settleTree(
  state: ChainState,
  variable: number,
  size: number,
  { longest, balanced }: Settling,
): boolean {
  const { tree, treeAt, treeDegree, partnerOffsets } = state
  inspect(state, partnerOffsets[variable + 1]! - partnerOffsets[variable]!, size)
  trim(state, size)
  rootInside(state, size)
  trim(state, size)
  let left = countTree(state, size)
  if (left > longest) return false
  for (let i = 0; i < size && left > 1; i++) {
    const q = tree[i]!
    if (treeAt[q] === state.treeNow && treeDegree[q] === 1 && state.parent[q]! >= 0)
      left -= giveFromLeaf(state, variable, q, left, balanced)
  }
  for (let i = 0; i < size; i++) if (treeAt[tree[i]!] === state.treeNow) state.add(variable, tree[i]!)
  return true
}
