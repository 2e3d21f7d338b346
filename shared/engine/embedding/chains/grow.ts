import { FAR } from './costs'
import type { ChainState } from './state'

/** Packed heap keys hold the qubit below the distance: 2¹⁷ qubits at most. */
const KEY = 2 ** 17

function push(heap: Float64Array, size: number, key: number): void {
  let at = size
  while (at > 0) {
    const above = (at - 1) >> 2
    if (heap[above]! <= key) break
    heap[at] = heap[above]!
    at = above
  }
  heap[at] = key
}

/** Removes the least key, which is heap[0], from a heap of `size` keys. */
function removeLeast(heap: Float64Array, size: number): void {
  const last = size - 1
  const key = heap[last]!
  let at = 0
  for (;;) {
    const first = 4 * at + 1
    if (first >= last) break
    let least = first
    let leastKey = heap[first]!
    const end = first + 4 < last ? first + 4 : last
    for (let child = first + 1; child < end; child++) {
      if (heap[child]! < leastKey) {
        least = child
        leastKey = heap[child]!
      }
    }
    if (leastKey >= key) break
    heap[at] = leastKey
    at = least
  }
  heap[at] = key
}

/** Takes the stale keys out of the heap; what is left is at most one key a qubit. Returns their number. */
function dropStale({ heap, nodes }: ChainState, size: number): number {
  let kept = 0
  for (let i = 0; i < size; i++) {
    const key = heap[i]!
    const here = Math.floor(key / KEY)
    if (nodes[2 * (key - here * KEY) + 1] === here) push(heap, kept++, key)
  }
  return kept
}

/** Marks every qubit beside the chain of a placed partner with that partner's bit. Returns how many are placed. */
export function markTouches(state: ChainState, variable: number): number {
  const { partnerOffsets, partners, head } = state
  const first = partnerOffsets[variable]!
  const end = partnerOffsets[variable + 1]!
  state.touchNow++
  let placed = 0
  for (let p = first; p < end; p++) {
    let record = head[partners[p]!]!
    if (record < 0) continue
    placed++
    for (; record >= 0; record = state.recordNext[record]!) markBeside(state, state.recordQubit[record]!, p - first)
  }
  return placed
}

/** Marks every neighbour of the qubit with the bit of one partner. */
export function markBeside(state: ChainState, qubit: number, partner: number): void {
  const { offsets, targets, touch, touchedAt, touchNow, words } = state
  const word = partner >>> 5
  const bit = 1 << (partner & 31)
  for (let p = offsets[qubit]!; p < offsets[qubit + 1]!; p++) {
    const r = targets[p]!
    if (touchedAt[r] !== touchNow) {
      touchedAt[r] = touchNow
      for (let w = 0; w < words; w++) touch[r * words + w] = 0
    }
    touch[r * words + word]! |= bit
  }
}

/** Declares all placed partners missing but one. */
function startMissing(state: ChainState, variable: number, start: number): void {
  const { partnerOffsets, partners, head, missing } = state
  const first = partnerOffsets[variable]!
  missing.fill(0)
  for (let p = first; p < partnerOffsets[variable + 1]!; p++) {
    const k = p - first
    if (k !== start && head[partners[p]!]! >= 0) missing[k >>> 5]! |= 1 << (k & 31)
  }
}

function countBits(word: number): number {
  let count = 0
  for (let rest = word; rest !== 0; rest &= rest - 1) count++
  return count
}

/** Strikes the partners that the qubit touches off the missing ones; returns how many they were. */
function reach(state: ChainState, qubit: number): number {
  const { touch, missing, words } = state
  let reached = 0
  for (let w = 0; w < words; w++) {
    const found = touch[qubit * words + w]! & missing[w]!
    if (found === 0) continue
    missing[w]! &= ~found
    reached += countBits(found)
  }
  return reached
}

/** Whether the qubit touches a partner that is still missing. */
function touchesMissing(state: ChainState, qubit: number): boolean {
  const { touch, missing, words } = state
  for (let w = 0; w < words; w++) if ((touch[qubit * words + w]! & missing[w]!) !== 0) return true
  return false
}

/**
 * Partners up to which the labels are made anew after each one reached: then none need be made that are farther than
 * the nearest missing partner found so far, which saves more than it costs. Both ways give exact shortest paths.
 */
const FEW_PARTNERS = 6

/**
 * Grows a tree of qubits for a variable without a chain, from the qubits beside the chain of its partner number
 * `start` to all its other placed partners, nearest first (the shortest-path heuristic for Steiner trees of Takahashi
 * & Matsuyama, 1980, on the weighted qubits of Cai, Macready & Roy, arXiv:1406.2741, 2014). Exact shortest paths
 * throughout. Touches must be marked. The tree is left in `state.tree`, and in `state.parent` the way from each qubit
 * to the first, which is −1 there.
 * @param placed partners that have a chain
 * @param ceiling cost from which the tree is of no interest
 * @returns the size of the tree, 0 when it reaches the ceiling or a partner cannot be reached; its cost is
 * `state.treeCost`
 */
export function growTree(state: ChainState, variable: number, start: number, placed: number, ceiling: number): number {
  const { offsets, targets, nodes, parent, labelled, heap, touchedAt, touchNow, tree } = state
  startMissing(state, variable, start)
  const few = placed <= FEW_PARTNERS
  let missing = placed - 1
  let labels = 0
  let size = 0
  let treeSize = 0
  let treeCost = 0
  // Labels from here on are of no use.
  let bound = Math.min(ceiling, FAR)
  for (let record = state.head[state.partners[state.partnerOffsets[variable]! + start]!]!; record >= 0;) {
    const q = state.recordQubit[record]!
    for (let p = offsets[q]!; p < offsets[q + 1]!; p++) {
      const r = targets[p]!
      if (nodes[2 * r + 1]! !== FAR || nodes[2 * r]! >= bound) continue
      labelled[labels++] = r
      nodes[2 * r + 1] = nodes[2 * r]!
      parent[r] = -1
      push(heap, size++, nodes[2 * r]! * KEY + r)
      if (few && touchedAt[r] === touchNow && touchesMissing(state, r)) bound = nodes[2 * r]!
    }
    record = state.recordNext[record]!
  }
  let complete = false
  while (size > 0) {
    const key = heap[0]!
    const here = Math.floor(key / KEY)
    const q = key - here * KEY
    removeLeast(heap, size--)
    if (here !== nodes[2 * q + 1]) continue
    if (here > 0 && (missing === 0 || touchedAt[q] === touchNow)) {
      const reached = missing === 0 ? 0 : reach(state, q)
      if (missing === 0 || reached > 0) {
        const first = treeSize
        for (let r = q; r >= 0 && nodes[2 * r + 1]! !== 0; r = parent[r]!) {
          tree[treeSize++] = r
          treeCost += nodes[2 * r]!
        }
        missing -= reached
        if (treeCost >= ceiling) break
        if (missing === 0) {
          complete = true
          break
        }
        bound = Math.min(ceiling - treeCost, FAR)
        let from = first
        if (first === 0 || few) {
          // The first labels do not start in the tree: they would lead to a second, unconnected piece.
          for (let i = 0; i < labels; i++) nodes[2 * labelled[i]! + 1] = FAR
          labels = size = from = 0
          for (let i = 0; i < treeSize; i++) labelled[labels++] = tree[i]!
        }
        for (let i = from; i < treeSize; i++) {
          nodes[2 * tree[i]! + 1] = 0
          push(heap, size++, tree[i]!)
        }
        continue
      }
    }
    if (size + offsets[q + 1]! - offsets[q]! > state.heapRoom) size = dropStale(state, size)
    for (let p = offsets[q]!; p < offsets[q + 1]!; p++) {
      const r = targets[p]!
      const there = (here + nodes[2 * r]!) | 0
      if (there >= bound) continue
      const known = nodes[2 * r + 1]!
      if (there >= known) continue
      if (known === FAR) labelled[labels++] = r
      nodes[2 * r + 1] = there
      parent[r] = q
      push(heap, size++, there * KEY + r)
      if (few && touchedAt[r] === touchNow && touchesMissing(state, r)) bound = there
    }
  }
  for (let i = 0; i < labels; i++) nodes[2 * labelled[i]! + 1] = FAR
  state.treeCost = treeCost
  return complete ? treeSize : 0
}
