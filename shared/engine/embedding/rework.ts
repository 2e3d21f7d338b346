import { degreeOf } from '../graph/graph'
import type { KernelChoice } from '../assembly'
import { fenceAllBut, isMet, negotiate, unmetPartners } from './chains/negotiate'
import { packState, partialOf, placeIsolated } from './chains/outcome'
import { Router } from './chains/router'
import { shortenChains } from './chains/shorten'
import { ChainState } from './chains/state'
import { chainOf } from './embedding'
import type { Embedding } from './embedding'
import { lacks } from './method'
import type { Attempt, PartialEmbedding } from './method'
import type { EmbeddingTask } from './task'

function stateOf(task: EmbeddingTask, chains: Embedding, kernel: KernelChoice): ChainState {
  const state = new ChainState(task.problem, task.machine, task.usable, kernel)
  for (let v = 0; v < task.problem.order; v++) for (const q of chainOf(chains, v)) state.add(v, q)
  return state
}

const startOf = ({ start }: EmbeddingTask): NonNullable<EmbeddingTask['start']> => {
  if (!start) throw new RangeError('there is no embedding to begin from')
  return start
}

/** Variables with interactions whose chains may change. */
const movableOf = ({ problem }: EmbeddingTask, frozen: Uint8Array): Int32Array =>
  Int32Array.from({ length: problem.order }, (_, v) => v).filter((v) => degreeOf(problem, v) > 0 && !frozen[v])

/**
 * Shortens a valid embedding by the means of the chain search, leaving frozen chains as they are; the outcome is never
 * worse. What it begins from must be valid.
 */
export function shortenEmbedding(task: EmbeddingTask, chains: Embedding, frozen: Uint8Array, attempt: Attempt): void {
  const state = stateOf(task, chains, attempt.kernel)
  state.frozen.set(frozen)
  const router = new Router(state, attempt.random)
  const give = (): void => attempt.offer(packState(state))
  shortenChains(state, router, movableOf(task, frozen), attempt, give)
}

/** The method `shorten`: makes the chains of the start shorter. */
export function shortenStart(task: EmbeddingTask, attempt: Attempt): PartialEmbedding | null {
  const { chains, frozen } = startOf(task)
  attempt.offer(chains)
  shortenEmbedding(task, chains, frozen, attempt)
  return null
}

/** The largest connected piece of what is left of a chain, by the state's neighbours. */
function largestPiece({ offsets, targets }: ChainState, qubits: readonly number[]): number[] {
  const left = new Set(qubits)
  let largest: number[] = []
  for (const first of qubits) {
    if (!left.delete(first)) continue
    const piece = [first]
    for (let i = 0; i < piece.length; i++)
      for (let p = offsets[piece[i]!]!; p < offsets[piece[i]! + 1]!; p++)
        if (left.delete(targets[p]!)) piece.push(targets[p]!)
    if (piece.length > largest.length) largest = piece
  }
  return largest
}

/** Chains as they stand on the machine now: broken qubits and what they cut off are gone, no qubit has two chains. */
function standing(task: EmbeddingTask, chains: Embedding, kernel: KernelChoice): ChainState {
  const state = new ChainState(task.problem, task.machine, task.usable, kernel)
  const { frozen } = startOf(task)
  const frozenFirst = Array.from(frozen, (_, v) => v).sort((a, b) => frozen[b]! - frozen[a]! || a - b)
  for (const v of frozenFirst) {
    const left = [...chainOf(chains, v)].filter((q) => task.usable[q] === 1 && state.use[q] === 0)
    for (const q of largestPiece(state, left)) state.add(v, q)
  }
  return state
}

/** Adds to the chosen chains the partners of the centres, and all chains that lie beside them. */
function widen(state: ChainState, chosen: Uint8Array, centres: Int32Array, frozen: Uint8Array): void {
  const owner = new Int32Array(state.qubits).fill(-1)
  const take = (v: number): void => {
    if (!frozen[v]) chosen[v] = 1
  }
  for (let v = 0; v < state.variables; v++)
    for (let record = state.head[v]!; record >= 0; record = state.recordNext[record]!)
      owner[state.recordQubit[record]!] = v
  for (const v of centres) {
    for (let p = state.partnerOffsets[v]!; p < state.partnerOffsets[v + 1]!; p++) take(state.partners[p]!)
    for (let record = state.head[v]!; record >= 0; record = state.recordNext[record]!) {
      const q = state.recordQubit[record]!
      for (let p = state.offsets[q]!; p < state.offsets[q + 1]!; p++)
        if (owner[state.targets[p]!]! >= 0) take(owner[state.targets[p]!]!)
    }
  }
}

const countOf = (chosen: Uint8Array): number => chosen.reduce((sum, one) => sum + one, 0)

/** Lets go of chains around those that found no way; around all that were let go where that adds none. */
function widenAround(
  state: ChainState,
  intact: ChainState,
  chosen: Uint8Array,
  variables: Int32Array,
  frozen: Uint8Array,
): void {
  const stuck = variables.filter(
    (v) => state.length[v] === 0 || state.isConflicted(v) || unmetPartners(state, v).length > 0,
  )
  widen(intact, chosen, stuck, frozen)
  if (countOf(chosen) === variables.length) widen(intact, chosen, variables, frozen)
}

/**
 * Puts chains back as they were in the start where nothing stands in the way: negotiation moves more than it has to.
 * @param whole chains that the machine still carries
 * @returns the variables that still differ
 */
function putBack(state: ChainState, chains: Embedding, variables: Int32Array, whole: Uint8Array): Int32Array {
  let differing = variables.filter((v) => !isChain(state, v, chainOf(chains, v)))
  for (let before = -1; differing.length !== before;) {
    before = differing.length
    differing = differing.filter((v) => !whole[v] || !replaced(state, v, chainOf(chains, v)))
  }
  return differing
}

function isChain(state: ChainState, v: number, chain: Uint32Array): boolean {
  const own = state.saved.slice(0, state.copyChain(v, state.saved)).sort()
  return own.length === chain.length && own.every((q, k) => q === chain[k])
}

/** Gives a variable that chain if its qubits are free and it meets all partners; else leaves everything as it is. */
function replaced(state: ChainState, v: number, chain: Uint32Array): boolean {
  const own = state.saved.slice(0, state.copyChain(v, state.saved))
  const lay = (qubits: Iterable<number>): void => {
    state.drop(v)
    for (const q of qubits) state.add(v, q)
  }
  state.drop(v)
  const isFree = chain.every((q) => state.use[q] === 0)
  lay(isFree ? chain : own)
  if (isFree && isMet(state, v)) return true
  if (isFree) lay(own)
  return false
}

/** Chains that are shorter than they were, empty, or do not meet a partner: what has to change at least. */
function damaged(state: ChainState, chains: Embedding, frozen: Uint8Array): Uint8Array {
  const chosen = new Uint8Array(state.variables)
  for (let v = 0; v < state.variables; v++)
    if (!frozen[v] && (state.length[v]! < chainOf(chains, v).length || state.length[v] === 0)) chosen[v] = 1
  for (let v = 0; v < state.variables; v++) {
    if (frozen[v] || chosen[v]) continue
    const first = state.partnerOffsets[v]!
    if (unmetPartners(state, v).some((k) => !chosen[state.partners[first + k]!])) chosen[v] = 1
  }
  return chosen
}

/** Whether all frozen chains are whole and meet each other where they interact: nothing else can mend that. */
function frozenStand(state: ChainState, chains: Embedding, frozen: Uint8Array): boolean {
  for (let v = 0; v < state.variables; v++) {
    if (!frozen[v]) continue
    if (state.length[v] === 0 || state.length[v]! < chainOf(chains, v).length) return false
    const first = state.partnerOffsets[v]!
    if (unmetPartners(state, v).some((k) => frozen[state.partners[first + k]!])) return false
  }
  return true
}

/**
 * The method `repair`: keeps every chain of the start that still stands and reroutes the others among free qubits.
 * Where that does not do, the chains around those that found no way are let go too, ring by ring, and put back as they
 * were afterwards where that can be; frozen ones never move.
 */
export function repairStart(task: EmbeddingTask, attempt: Attempt): PartialEmbedding | null {
  const { random, watch, offer, kernel } = attempt
  const { chains, frozen } = startOf(task)
  const intact = standing(task, chains, kernel)
  const kept = packState(intact)
  if (!frozenStand(intact, chains, frozen)) return partialOf(intact, task.problem)
  const chosen = damaged(intact, chains, frozen)
  const whole = intact.length.map((length, v) => (length > 0 && length === chainOf(chains, v).length ? 1 : 0))
  let closest: PartialEmbedding | null = null
  watch.phase = 'repairing'
  for (let before = -1; ;) {
    const state = stateOf(task, kept, kernel)
    const variables = Int32Array.from({ length: state.variables }, (_, v) => v).filter((v) => chosen[v])
    if (variables.length === before) return closest
    before = variables.length
    state.frozen.fill(1)
    for (const v of variables) state.frozen[v] = 0
    fenceAllBut(state, variables)
    sowBesidePartners(state, variables, task.usable)
    const connected = variables.filter((v) => state.partnersOf(v) > 0)
    const router = new Router(state, random)
    const valid = negotiate(state, router, connected, random, watch)
    if (placeIsolated(state, task.usable) && valid && lacks(partialOf(state, task.problem)) === 0) {
      const give = (): void => offer(packState(state))
      const differing = putBack(state, chains, variables, Uint8Array.from(whole))
      give()
      state.frozen.fill(1)
      for (const v of differing) state.frozen[v] = 0
      shortenChains(
        state,
        router,
        differing.filter((v) => state.partnersOf(v) > 0),
        attempt,
        give,
      )
      return null
    }
    const partial = partialOf(state, task.problem)
    if (!closest || lacks(partial) < lacks(closest)) closest = partial
    if (watch.shouldStop(state.overlap)) return closest
    widenAround(state, intact, chosen, variables, frozen)
  }
}

/** Gives empty chains a first qubit where a partner's chain has one beside it, so that they can be negotiated for. */
function sowBesidePartners(state: ChainState, variables: Int32Array, usable: Uint8Array): void {
  const { offsets, targets, fenced } = state
  const anyFree = fenced.findIndex((closed, q) => !closed && usable[q] === 1)
  for (const v of variables) {
    if (state.length[v]! > 0 || state.partnersOf(v) === 0) continue
    let seed = anyFree
    for (let p = state.partnerOffsets[v]!; p < state.partnerOffsets[v + 1]! && seed === anyFree; p++)
      for (let record = state.head[state.partners[p]!]!; record >= 0; record = state.recordNext[record]!) {
        const q = state.recordQubit[record]!
        for (let r = offsets[q]!; r < offsets[q + 1]!; r++) if (!fenced[targets[r]!]) seed = targets[r]!
      }
    if (seed >= 0) state.add(v, seed)
  }
}
