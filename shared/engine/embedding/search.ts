import type { Control } from '../control'
import type { Graph } from '../graph/graph'
import { createRandom } from '../random'
import { countUnmet } from './contacts'
import { packChains } from './embedding'
import type { Embedding } from './embedding'
import { provedInfeasible } from './feasibility'
import { negotiate } from './negotiate'
import { Watch } from './progress'
import type { SearchProgress } from './progress'
import { Rerouter } from './reroute'
import { qualityOf, shorten } from './shorten'
import { SearchState } from './state'
import { verifyEmbedding } from './verify'

export type { SearchProgress } from './progress'

export interface SearchOptions {
  /** Any non-negative safe integer. */
  readonly seed: number
  /** Independent tries, at least 1; the best embedding of all is kept. */
  readonly tries: number
  /** Seconds on the given clock after which the search ends with the best so far. */
  readonly timeLimitSeconds: number
}

export const DEFAULTS: SearchOptions = { seed: 1, tries: 4, timeLimitSeconds: 30 }

/** The state with least overlap when no embedding was found. */
export interface PartialEmbedding {
  /** Chains that may share qubits; empty for a variable that was not placed. */
  readonly chains: Embedding
  /** Σ over qubits of the chains beyond the first. */
  readonly overlap: number
  /** Qubits with more than one chain, ascending. */
  readonly overlappedQubits: readonly number[]
  /** Interactions without a coupler between their chains. */
  readonly unmet: number
  /** Variables without a qubit. */
  readonly unplaced: number
}

export interface SearchResult {
  readonly status: 'found' | 'none found' | 'cancelled' | 'timed out'
  readonly embedding: Embedding | null
  /** Whether cancellation or the time limit ended the search before all tries were done. */
  readonly stoppedEarly: boolean
  /** The best invalid state when there is no embedding, unless a proved bound forbids any. */
  readonly partial: PartialEmbedding | null
  /** The try that gave the embedding or the partial state, from 1; 0 when none was begun. */
  readonly tryNumber: number
  readonly tries: number
  readonly seconds: number
  /** Passes over the variables, all tries and phases together. */
  readonly passes: number
}

interface Best {
  embedding: Embedding | null
  longest: number
  total: number
  partial: PartialEmbedding | null
  tryNumber: number
  passes: number
}

function checkArguments(machine: Graph, usable: Uint8Array, options: SearchOptions): void {
  if (usable.length !== machine.order)
    throw new RangeError(`usable has ${usable.length} entries for a machine of ${machine.order} qubits`)
  if (!Number.isSafeInteger(options.seed) || options.seed < 0)
    throw new RangeError(`seed must be a non-negative integer, not ${options.seed}`)
  if (!Number.isSafeInteger(options.tries) || options.tries < 1)
    throw new RangeError(`tries must be an integer of at least 1, not ${options.tries}`)
  if (!(options.timeLimitSeconds > 0))
    throw new RangeError(`timeLimitSeconds must be above 0, not ${options.timeLimitSeconds}`)
}

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

function keepPartial(state: SearchState, best: Best, tryNumber: number): void {
  const { overlap, use, length } = state.chains
  const unmet = countUnmet(state)
  const unplaced = length.reduce((count, qubits) => count + (qubits === 0 ? 1 : 0), 0)
  const old = best.partial
  if (best.embedding || (old && old.overlap + old.unmet + old.unplaced <= overlap + unmet + unplaced)) return
  const overlappedQubits: number[] = []
  use.forEach((chains, q) => chains > 1 && overlappedQubits.push(q))
  best.partial = { chains: snapshot(state), overlap, overlappedQubits, unmet, unplaced }
  best.tryNumber = tryNumber
}

function keepEmbedding(state: SearchState, best: Best, tryNumber: number, watch: Watch): void {
  const { longest, total } = qualityOf(state)
  if (best.embedding && (best.longest < longest || (best.longest === longest && best.total <= total))) return
  const embedding = snapshot(state)
  const [violation] = verifyEmbedding(state.problem, state.machine, state.usable, embedding)
  if (violation) throw new Error(`the search made an invalid embedding: ${violation.message}`)
  best.embedding = embedding
  best.partial = null
  best.longest = watch.longestChain = longest
  best.total = watch.qubitsUsed = total
  best.tryNumber = tryNumber
}

function runTry(state: SearchState, seed: number, tryNumber: number, watch: Watch, best: Best): void {
  const random = createRandom(seed, tryNumber)
  const rerouter = new Rerouter(state, random)
  state.clear()
  const { valid, passes } = negotiate(state, rerouter, random, watch)
  best.passes += passes
  if (valid) best.passes += shorten(state, rerouter, random, watch)
  placeIsolated(state)
  if (valid && state.chains.length.every((qubits) => qubits > 0)) keepEmbedding(state, best, tryNumber, watch)
  else keepPartial(state, best, tryNumber)
}

/**
 * Searches for a minor embedding of the problem graph in the usable part of the machine graph: each variable gets a
 * connected chain of qubits, chains are disjoint, and each interaction has a coupler between its chains. A heuristic:
 * rerouting under overuse and history weights, then shortening (sources at the parts); that none is found proves
 * nothing.
 *
 * The same graphs, seed and tries give the same embedding; the time limit and cancellation can only cut the search
 * short, and keep the best embedding found until then. Embeddings are compared by longest chain, then by total qubits.
 * @param usable 1 for each machine qubit that may be used; length machine.order
 * @throws RangeError for options out of range or a `usable` of the wrong length
 */
export function findEmbedding(
  problem: Graph,
  machine: Graph,
  usable: Uint8Array,
  options: Partial<SearchOptions>,
  control: Control<SearchProgress>,
): SearchResult {
  const settings = { ...DEFAULTS, ...options }
  checkArguments(machine, usable, settings)
  const { seed, tries, timeLimitSeconds } = settings
  const watch = new Watch(control, tries, timeLimitSeconds)
  const best: Best = { embedding: null, longest: 0, total: 0, partial: null, tryNumber: 0, passes: 0 }
  if (!provedInfeasible(problem, machine, usable)) {
    const state = new SearchState(problem, machine, usable)
    for (let tryNumber = 1; tryNumber <= tries && !watch.shouldStop(0); tryNumber++) {
      watch.tryNumber = tryNumber
      runTry(state, seed, tryNumber, watch, best)
      watch.report(0, 1)
    }
  }
  const { embedding, partial, tryNumber, passes } = best
  const status = embedding ? 'found' : (watch.stopped ?? 'none found')
  return {
    status,
    embedding,
    stoppedEarly: watch.stopped !== null,
    partial,
    tryNumber,
    tries,
    seconds: watch.seconds(),
    passes,
  }
}
