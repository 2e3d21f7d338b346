import type { Graph } from '../../graph/graph'
import { packChains } from '../embedding'
import type { Embedding } from '../embedding'
import type { PartialEmbedding } from '../method'
import { unmetPartners } from './negotiate'
import type { ChainState } from './state'

/** The chains as they are. */
export function packState(state: ChainState): Embedding {
  const { saved, variables } = state
  return packChains(Array.from({ length: variables }, (_, v) => saved.slice(0, state.copyChain(v, saved))))
}

/** The state as it is, overlaps and all. */
export function partialOf(state: ChainState, problem: Graph): PartialEmbedding {
  const { overlap, use, length } = state
  const overlappedQubits: number[] = []
  use.forEach((chains, q) => chains > 1 && overlappedQubits.push(q))
  const unplaced = length.reduce((count, qubits) => count + (qubits === 0 ? 1 : 0), 0)
  const unmet: number[] = []
  for (let v = 0; v < problem.order; v++) {
    for (const k of unmetPartners(state, v)) {
      const p = problem.offsets[v]! + k
      if (problem.targets[p]! > v) unmet.push(problem.edgeIds[p]!)
    }
  }
  return { chains: packState(state), overlap, overlappedQubits, unmet: unmet.sort((a, b) => a - b), unplaced }
}

/** Gives each variable without a chain a free usable qubit, as long as there are any. Returns whether all have one. */
export function placeIsolated(state: ChainState, usable: Uint8Array): boolean {
  let q = 0
  for (let v = 0; v < state.variables; v++) {
    if (state.length[v]! > 0) continue
    while (q < usable.length && (usable[q] === 0 || state.use[q]! > 0)) q++
    if (q === usable.length) return false
    state.add(v, q)
  }
  return true
}
