import { degreeOf } from '../graph/graph'
import type { Random } from '../random'
import { unmetEdges } from './contacts'
import type { Watch } from './progress'
import type { Rerouter } from './reroute'
import { placingOrder, Seeder, shuffle } from './seeding'
import type { SearchState } from './state'

const DEFAULTS = {
  /** Factor on a qubit's weight for each chain that has it, in the first pass. */
  penalty: 2,
  /** Growth of that factor from pass to pass. */
  penaltyGrowth: 1.07,
  /** Added to a qubit's history after a pass for each chain beyond the first. */
  historyStep: 0.5,
  /** Every so many passes all variables are rerouted, else the conflicted and some of the rest. */
  fullPassEvery: 5,
  shareOfRest: 0.5,
  /** Passes without less overlap before a try is given up. */
  patience: 40,
  /** Largest random part of a weight; small enough to decide between equal ways only. */
  tieBreak: 1e-3,
}

/** Weights for the coming pass: history, and fresh tie-breaks. */
export function refreshWeights(state: SearchState, random: Random): void {
  const { base, history, usable } = state
  for (let q = 0; q < base.length; q++)
    base[q] = usable[q] ? (1 + history[q]!) * (1 + DEFAULTS.tieBreak * random.float()) : Infinity
}

function rememberOveruse(state: SearchState): void {
  const { use } = state.chains
  for (let q = 0; q < use.length; q++) if (use[q]! > 1) state.history[q]! += DEFAULTS.historyStep * (use[q]! - 1)
}

/** First chains for all variables that have interactions. Returns whether it was stopped. */
function place(state: SearchState, rerouter: Rerouter, random: Random, watch: Watch): boolean {
  const seeder = new Seeder(state, random)
  for (const v of placingOrder(state.problem, random)) {
    if (watch.shouldStop(state.chains.overlap)) return true
    if (rerouter.negotiate(v)) continue
    const seed = seeder.pick(v)
    if (seed >= 0) state.chains.add(v, seed)
  }
  return false
}

/** How a negotiation ended, and how many passes it took. */
export interface Negotiation {
  readonly valid: boolean
  readonly passes: number
}

/**
 * Places all variables that have interactions and reroutes them one at a time until no qubit has two chains: weights
 * grow with present overuse (Cai, Macready & Roy, arXiv:1406.2741, 2014) and with past overuse (negotiated
 * congestion, McMurchie & Ebeling, FPGA 1995). Gives up after a number of passes without less overlap.
 */
export function negotiate(state: SearchState, rerouter: Rerouter, random: Random, watch: Watch): Negotiation {
  const { problem, chains } = state
  const variables = Int32Array.from({ length: problem.order }, (_, v) => v).filter((v) => degreeOf(problem, v) > 0)
  state.setPenalty(DEFAULTS.penalty)
  refreshWeights(state, random)
  watch.phase = 'placing'
  if (place(state, rerouter, random, watch)) return { valid: false, passes: 0 }
  watch.phase = 'rerouting'
  const firstOverlap = chains.overlap
  let best = Infinity
  let sinceBest = 0
  let pass = 1
  let penalty = DEFAULTS.penalty
  for (; ; pass++) {
    if (chains.overlap === 0 && unmetEdges(state).length === 0) return { valid: true, passes: pass }
    sinceBest = chains.overlap < best ? 0 : sinceBest + 1
    best = Math.min(best, chains.overlap)
    if (sinceBest >= DEFAULTS.patience) return { valid: false, passes: pass }
    rememberOveruse(state)
    refreshWeights(state, random)
    state.setPenalty((penalty *= DEFAULTS.penaltyGrowth))
    watch.report(chains.overlap, 0.8 * (1 - best / Math.max(1, firstOverlap, best)))
    const share = pass % DEFAULTS.fullPassEvery === 0 ? 1 : DEFAULTS.shareOfRest
    shuffle(variables, variables.length, random)
    for (const v of variables) {
      if (watch.shouldStop(chains.overlap)) return { valid: false, passes: pass }
      if (random.float() < share || chains.isConflicted(v)) rerouter.negotiate(v)
    }
  }
}
