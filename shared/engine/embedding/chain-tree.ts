import type { SearchState } from './state'

/**
 * Lays a breadth-first tree over a chain from one of its qubits: `visit` in order, `up` (−1 at the root) and
 * `treeDegree` by qubit. Returns the number of qubits reached, which is the chain's length as chains are connected.
 */
export function layChainTree(state: SearchState, variable: number, root: number): number {
  const { machine, chains, visit, up, treeDegree, visited } = state
  const now = ++state.visitedNow
  let count = 1
  visit[0] = root
  up[root] = -1
  treeDegree[root] = 0
  visited[root] = now
  for (let i = 0; i < count; i++) {
    const q = visit[i]!
    for (let p = machine.offsets[q]!; p < machine.offsets[q + 1]!; p++) {
      const r = machine.targets[p]!
      if (visited[r] === now || !chains.owns(variable, r)) continue
      visited[r] = now
      visit[count++] = r
      up[r] = q
      treeDegree[r] = 1
      treeDegree[q]!++
    }
  }
  return count
}
