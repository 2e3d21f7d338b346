import type { SearchState } from './state'

/** Declares the placed neighbours of the variable to be reached; returns how many there are. */
function wantPlacedNeighbours(state: SearchState, variable: number): number {
  const { problem, chains, wanted } = state
  const now = ++state.wantedNow
  let count = 0
  for (let p = problem.offsets[variable]!; p < problem.offsets[variable + 1]!; p++) {
    const u = problem.targets[p]!
    if (chains.length[u]! === 0) continue
    wanted[u] = now
    count++
  }
  return count
}

/** Marks every wanted chain beside the qubit as reached; returns how many there were. */
function reachBeside(state: SearchState, qubit: number): number {
  const { machine, chains, wanted, wantedNow } = state
  let count = 0
  for (let p = machine.offsets[qubit]!; p < machine.offsets[qubit + 1]!; p++) {
    for (let record = chains.ownerHead[machine.targets[p]!]!; record >= 0; record = chains.ownerNext[record]!) {
      const u = chains.variable[record]!
      if (wanted[u] !== wantedNow) continue
      wanted[u] = 0
      count++
    }
  }
  return count
}

/** Offers a label to a qubit and keeps it when it is nearer. */
function offer(state: SearchState, qubit: number, distance: number, parent: number): void {
  if (state.stamp[qubit] === state.stampNow) {
    if (distance >= state.distance[qubit]!) return
  } else if (distance === Infinity) return
  state.stamp[qubit] = state.stampNow
  state.distance[qubit] = distance
  state.parent[qubit] = parent
  state.heap.raise(qubit)
}

function forgetLabels(state: SearchState): void {
  state.heap.clear()
  state.stampNow++
}

/** Moves the path that ends in the qubit into the tree; its qubits start again at distance 0. Returns its weight. */
function joinPath(state: SearchState, end: number): number {
  const { tree, parent, distance, stamp, heap } = state
  const first = state.treeSize
  let weight = 0
  // Qubits of the tree are the only ones at distance 0: weights are at least 1.
  for (let q = end; q >= 0 && !(stamp[q] === state.stampNow && distance[q] === 0); q = parent[q]!) {
    tree[state.treeSize++] = q
    weight += state.weight(q)
  }
  // Labels that do not start in the tree would lead to a second, unconnected piece.
  if (first === 0) forgetLabels(state)
  for (let i = first; i < state.treeSize; i++) {
    const q = tree[i]!
    stamp[q] = state.stampNow
    distance[q] = 0
    parent[q] = -1
    heap.raise(q)
  }
  return weight
}

/** Runs the labelling until `missing` wanted chains are reached; returns the weight of the tree, or infinity. */
function spread(state: SearchState, missing: number, ceiling: number): number {
  const { machine, heap, distance, base, penaltyOf, chains } = state
  const { use } = chains
  let weight = 0
  while (heap.size > 0) {
    const q = heap.pop()
    const here = distance[q]!
    if (weight + here >= ceiling) return Infinity
    const reached = here === 0 ? 0 : reachBeside(state, q)
    if (reached > 0 || missing === 0) {
      weight += joinPath(state, q)
      missing -= reached
      if (missing === 0) return weight
      continue
    }
    for (let p = machine.offsets[q]!; p < machine.offsets[q + 1]!; p++) {
      const r = machine.targets[p]!
      offer(state, r, here + base[r]! * penaltyOf[use[r]!]!, q)
    }
  }
  return Infinity
}

/**
 * Grows a tree of qubits for a variable that has no chain at present, from the qubits beside the chain of its
 * neighbour `start` to all its other placed neighbours, nearest first (the shortest-path heuristic for Steiner trees
 * of Takahashi & Matsuyama, 1980, on the weighted qubits of Cai, Macready & Roy, arXiv:1406.2741, 2014). Exact
 * shortest paths throughout; the tree is left in `state.tree`.
 * @param ceiling weight from which the tree is of no interest
 * @returns the weight of the tree, infinite when it reaches the ceiling or a neighbour cannot be reached
 */
export function growFromNeighbour(state: SearchState, variable: number, start: number, ceiling: number): number {
  const { machine, chains } = state
  const missing = wantPlacedNeighbours(state, variable) - 1
  state.wanted[start] = 0
  state.treeSize = 0
  forgetLabels(state)
  for (let record = chains.chainHead[start]!; record >= 0; record = chains.chainNext[record]!) {
    const q = chains.qubit[record]!
    for (let p = machine.offsets[q]!; p < machine.offsets[q + 1]!; p++) {
      const r = machine.targets[p]!
      offer(state, r, state.weight(r), -1)
    }
  }
  return spread(state, missing, ceiling)
}
