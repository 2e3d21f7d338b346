import { unmetEdges } from './contacts'
import { packChains } from './embedding'
import type { Embedding } from './embedding'
import type { Attempt, PartialEmbedding } from './method'
import { negotiate } from './negotiate'
import { Rerouter } from './reroute'
import { shorten } from './shorten'
import { SearchState } from './state'
import type { EmbeddingTask } from './task'

/** Gives each variable without interactions a free usable qubit, as long as there are any. */
function placeIsolated(state: SearchState): void {
  const { chains, usable } = state
  let q = 0
  for (let v = 0; v < state.problem.order; v++) {
    if (chains.length[v]! > 0) continue
    while (q < usable.length && (usable[q] === 0 || chains.use[q]! > 0)) q++
    if (q === usable.length) return
    chains.add(v, q)
  }
}

function snapshot(state: SearchState): Embedding {
  const { chains, saved, problem } = state
  return packChains(Array.from({ length: problem.order }, (_, v) => saved.slice(0, chains.copyChain(v, saved))))
}

/** The state as it is, overlaps and all. */
function partialOf(state: SearchState): PartialEmbedding {
  const { overlap, use, length } = state.chains
  const overlappedQubits: number[] = []
  use.forEach((chains, q) => chains > 1 && overlappedQubits.push(q))
  const unplaced = length.reduce((count, qubits) => count + (qubits === 0 ? 1 : 0), 0)
  return { chains: snapshot(state), overlap, overlappedQubits, unmet: unmetEdges(state), unplaced }
}

/** One try of placing, rerouting and shortening chains one at a time (sources at the parts). */
export function searchChains({ problem, machine, usable }: EmbeddingTask, attempt: Attempt): PartialEmbedding | null {
  const { random, watch, offer } = attempt
  const state = new SearchState(problem, machine, usable)
  const rerouter = new Rerouter(state, random)
  const { valid } = negotiate(state, rerouter, random, watch)
  placeIsolated(state)
  if (!valid || state.chains.length.some((qubits) => qubits === 0)) return partialOf(state)
  offer(snapshot(state))
  shorten(state, rerouter, random, watch)
  offer(snapshot(state))
  return null
}
