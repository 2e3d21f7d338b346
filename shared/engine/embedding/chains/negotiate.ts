import { shuffle } from '../../random'
import type { Random } from '../../random'
import type { Watch } from '../progress'
import { markTouches } from './grow'
import type { Router } from './router'
import { COST_UNIT } from './costs'
import type { ChainState } from './state'

export const NEGOTIATION = {
  /** Factor on a qubit's cost for each chain that has it, in the first pass, and its growth from pass to pass. */
  penalty: 3,
  penaltyGrowth: 1.2,
  /** Passes in which each tree is grown from one partner only; later ones take the cheapest of a few. */
  roughPasses: 8,
  starts: 3,
  /** Beyond it chains only make detours. */
  penaltyMost: 10,
  /** Added to a qubit's history after a pass for each chain beyond the first. */
  historyStep: 0.5,
  /** Every so many passes all variables are rerouted, else the conflicted and some of the rest. */
  fullPassEvery: 5,
  shareOfRest: 0.5,
  /** Share of used qubits that are overused below which only so many times the overuse of the rest are rerouted. */
  quietOveruse: 0.02,
  quietShare: 8,
  /** Reroutes without less overlap, as a multiple of the variables, before it is given up. */
  patience: 20,
  /** How many random parts a cost may have, in 64ths; they decide between equal ways only. */
  tieBreaks: 4,
}

/** Variables between two looks at the clock. */
const VARIABLES_PER_LOOK = 16

/** Costs for the coming pass: history, and a fresh random part of fewer than `spread` 64ths. */
export function refreshCosts(state: ChainState, random: Random, penalty: number, spread: number): void {
  const { base, history } = state
  for (let q = 0; q < base.length; q++) base[q] = Math.floor(COST_UNIT * (1 + history[q]!)) + random.below(spread)
  state.setPenalty(penalty)
}

/** Puts the qubits of all chains but the given ones' out of reach, from the next refresh of costs on. */
export function fenceAllBut(state: ChainState, variables: Int32Array): void {
  const { use, fenced, head, recordQubit, recordNext } = state
  for (let q = 0; q < fenced.length; q++) fenced[q] = use[q]! > 0 ? 1 : 0
  for (let i = 0; i < variables.length; i++)
    for (let record = head[variables[i]!]!; record >= 0; record = recordNext[record]!) fenced[recordQubit[record]!] = 0
}

function rememberOveruse({ use, history }: ChainState): void {
  for (let q = 0; q < use.length; q++) if (use[q]! > 1) history[q]! += NEGOTIATION.historyStep * (use[q]! - 1)
}

/** Numbers of the variable's partners whose chains do not touch its own. */
export function unmetPartners(state: ChainState, variable: number): number[] {
  const { touch, touchedAt, words, partnerOffsets } = state
  const partners = partnerOffsets[variable + 1]! - partnerOffsets[variable]!
  markTouches(state, variable)
  const seen = state.missing.fill(0)
  for (let record = state.head[variable]!; record >= 0; record = state.recordNext[record]!) {
    const q = state.recordQubit[record]!
    if (touchedAt[q] === state.touchNow) for (let w = 0; w < words; w++) seen[w]! |= touch[q * words + w]!
  }
  const unmet: number[] = []
  for (let k = 0; k < partners; k++) if ((seen[k >>> 5]! & (1 << (k & 31))) === 0) unmet.push(k)
  return unmet
}

/** Whether each partner of the variable touches its chain. */
export const isMet = (state: ChainState, variable: number): boolean => unmetPartners(state, variable).length === 0

/**
 * Reroutes the given variables one at a time until no qubit has two chains: costs grow with present overuse (Cai,
 * Macready & Roy, arXiv:1406.2741, 2014) and with past overuse (negotiated congestion, McMurchie & Ebeling, FPGA
 * 1995). Each of them has a chain already, a single qubit will do. Gives up after so many reroutes without less overlap.
 */
export function negotiate(
  state: ChainState,
  router: Router,
  variables: Int32Array,
  random: Random,
  watch: Watch,
): boolean {
  const patience = NEGOTIATION.patience * variables.length
  const unmet = new Uint8Array(state.variables)
  let penalty: number = NEGOTIATION.penalty
  let best = Infinity
  // A pass counts too, so that those in which nothing can be rerouted come to an end.
  let spent = 0
  let bestAt = 0
  state.history.fill(0)
  for (let pass = 0; ; pass++) {
    if (pass > 0) {
      const lacking = state.overlap > 0 ? 0 : markUnmet(state, variables, unmet)
      if (state.overlap + lacking === 0) return true
      if (state.overlap + lacking < best) {
        best = state.overlap + lacking
        bestAt = spent
      }
      if (spent - bestAt >= patience) return false
      rememberOveruse(state)
      penalty = Math.min(NEGOTIATION.penaltyMost, penalty * NEGOTIATION.penaltyGrowth)
      watch.report(state.overlap, 0.5 * (1 - best / state.qubitsUsed))
    }
    refreshCosts(state, random, penalty, NEGOTIATION.tieBreaks)
    const quiet = pass > 0 && state.overlap < NEGOTIATION.quietOveruse * state.qubitsUsed
    router.mostStarts = pass < NEGOTIATION.roughPasses ? 1 : NEGOTIATION.starts
    const rest = pass % NEGOTIATION.fullPassEvery === 0 ? 1 : NEGOTIATION.shareOfRest
    const share = quiet ? (NEGOTIATION.quietShare * state.overlap) / variables.length : rest
    shuffle(variables, random)
    spent++
    for (let i = 0; i < variables.length; i++) {
      const v = variables[i]!
      if (i % VARIABLES_PER_LOOK === 0 && watch.shouldStop(state.overlap)) return false
      if (random.float() < share || unmet[v] || state.isConflicted(v)) {
        router.reroute(v)
        spent++
      }
    }
  }
}

/** Marks the variables that do not touch all their partners; returns how many. */
function markUnmet(state: ChainState, variables: Int32Array, unmet: Uint8Array): number {
  let count = 0
  for (const v of variables) {
    unmet[v] = isMet(state, v) ? 0 : 1
    count += unmet[v]
  }
  return count
}
