import { degreeOf } from '../graph/graph'
import type { Random } from '../random'
import { refreshWeights } from './negotiate'
import type { Watch } from './progress'
import type { Rerouter } from './reroute'
import { shuffle } from './seeding'
import type { SearchState } from './state'

const DEFAULTS = {
  /** Passes in a row that save nothing before shortening ends: sideways moves open ways for later ones. */
  idlePasses: 4,
}

/** Longest chain and total of qubits, now. */
function sizesOf(state: SearchState): { longest: number; total: number } {
  const { length } = state.chains
  let longest = 0
  let total = 0
  for (let v = 0; v < length.length; v++) {
    longest = Math.max(longest, length[v]!)
    total += length[v]!
  }
  return { longest, total }
}

/**
 * Shortens a valid embedding by rerouting chains through free qubits, each kept when it is not longer than before. The
 * embedding is valid after every single step. Returns the number of passes.
 */
export function shorten(state: SearchState, rerouter: Rerouter, random: Random, watch: Watch): number {
  const { problem, chains } = state
  const variables = Int32Array.from({ length: problem.order }, (_, v) => v).filter((v) => degreeOf(problem, v) > 0)
  watch.phase = 'shortening'
  state.setStrict()
  state.history.fill(0)
  let passes = 0
  for (let idle = 0; idle < DEFAULTS.idlePasses; passes++) {
    const before = sizesOf(state)
    refreshWeights(state, random)
    shuffle(variables, variables.length, random)
    for (const v of variables) {
      if (watch.shouldStop(chains.overlap)) return passes
      if (chains.length[v]! > 1) rerouter.shorten(v)
    }
    const after = sizesOf(state)
    idle = after.total < before.total || after.longest < before.longest ? 0 : idle + 1
    watch.report(chains.overlap, 0.9)
  }
  return passes
}
