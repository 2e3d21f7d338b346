import type { ChainSet } from './chain-set'

/** Takes qubits from one chain for as long as it stays connected and keeps every interaction; returns how many. */
function thinChain(set: ChainSet, variable: number): number {
  const chain = set.chains[variable]!
  let removed = 0
  for (let again = true; again;) {
    again = false
    for (let i = chain.length - 1; i >= 0 && chain.length > 1; i--) {
      const q = chain[i]
      if (q === undefined || !set.isSpare(q) || !set.isRemovable(q)) continue
      set.remove(variable, q)
      removed++
      again = true
    }
  }
  return removed
}

/**
 * Takes spare qubits from all chains, the longest first: where two chains meet more than once, the longer one gives way.
 */
export function thinChains(set: ChainSet): void {
  const order = set.chains.map((_, i) => i)
  order.sort((a, b) => set.chains[b]!.length - set.chains[a]!.length || a - b)
  for (const variable of order) thinChain(set, variable)
}
