import type { Graph } from '../../shared/engine/graph/graph'

/**
 * Whether chains are a minor embedding, found in another way than the engine's checker: joins qubits of one chain along
 * couplers until nothing changes, and marks the pairs of chains that couplers join. Returns what is wrong, else null.
 */
export function faultOf(
  problem: Graph,
  machine: Graph,
  usable: Uint8Array,
  chains: readonly ArrayLike<number>[],
): string | null {
  const owner = new Int32Array(machine.order).fill(-1)
  let qubits = 0
  for (const [v, chain] of chains.entries()) {
    if (chain.length === 0) return `variable ${v} has no chain`
    for (const q of Array.from(chain)) {
      if (!usable[q]) return `qubit ${q} does not work`
      if (owner[q]! >= 0) return `qubit ${q} is in two chains`
      owner[q] = v
      qubits++
    }
  }
  const leader = Int32Array.from({ length: machine.order }, (_, q) => q)
  const find = (q: number): number => {
    while (leader[q] !== q) q = leader[q] = leader[leader[q]!]!
    return q
  }
  let pieces = qubits
  const joined = new Set<number>()
  for (let k = 0; k < machine.ends.length; k += 2) {
    const [a, b] = [machine.ends[k]!, machine.ends[k + 1]!]
    const [v, w] = [owner[a]!, owner[b]!]
    if (v < 0 || w < 0) continue
    if (v !== w) joined.add(Math.min(v, w) * problem.order + Math.max(v, w))
    else if (find(a) !== find(b)) {
      leader[find(a)] = find(b)
      pieces--
    }
  }
  if (pieces !== problem.order) return 'a chain is not connected'
  for (let k = 0; k < problem.ends.length; k += 2)
    if (!joined.has(problem.ends[k]! * problem.order + problem.ends[k + 1]!))
      return `no coupler joins ${problem.ends[k]} and ${problem.ends[k + 1]}`
  return null
}
