import { Router } from './chains/router'
import { negotiate } from './chains/negotiate'
import { Seeds } from './chains/seeds'
import { shortenChains } from './chains/shorten'
import { ChainState } from './chains/state'
import { packState, partialOf, placeIsolated } from './chains/outcome'
import { degreeOf } from '../graph/graph'
import { lacks } from './method'
import type { Attempt, PartialEmbedding } from './method'
import { positionsOf } from './positions'
import type { EmbeddingTask } from './task'

/**
 * How each round of a try goes about it: first on as much of the machine as the problem may need, with little work on
 * the placement; then with more room and more work, in turns.
 */
const ROUNDS = [
  { effort: 0.3, slack: 1 },
  { effort: 1, slack: 1.5 },
  { effort: 4, slack: Infinity },
  { effort: 1, slack: Infinity },
  { effort: 4, slack: 2 },
] as const

/**
 * Shortens the chains to leave free qubits for variables without interactions, which have found too few. Returns
 * whether all have one then.
 */
function makeRoom(
  state: ChainState,
  router: Router,
  variables: Int32Array,
  { problem, usable }: EmbeddingTask,
  attempt: Attempt,
): boolean {
  for (let v = 0; v < problem.order; v++) if (degreeOf(problem, v) === 0) state.drop(v)
  shortenChains(state, router, variables, { ...attempt, objective: 'total qubits' }, () => {})
  return placeIsolated(state, usable)
}

/**
 * One try of placing variables on the machine's plane, routing their chains under negotiated congestion, and shortening
 * them (sources at the parts). Begins anew a few times, with more room and effort, before it gives up.
 */
export function searchChains(task: EmbeddingTask, attempt: Attempt): PartialEmbedding | null {
  const { problem, machine, usable } = task
  const { random, watch } = attempt
  const state = new ChainState(problem, machine, usable, attempt.kernel)
  const router = new Router(state, random)
  const seeds = new Seeds(problem, machine, usable, positionsOf(task))
  const variables = Int32Array.from({ length: problem.order }, (_, v) => v).filter((v) => degreeOf(problem, v) > 0)
  let closest: PartialEmbedding | null = null
  for (const { effort, slack } of ROUNDS) {
    state.clear()
    watch.phase = 'placing'
    seeds.sow(state, random, effort, slack, () => watch.shouldStop(state.overlap))
    watch.phase = 'rerouting'
    const valid = negotiate(state, router, variables, random, watch)
    if (valid && (placeIsolated(state, usable) || makeRoom(state, router, variables, task, attempt))) {
      const give = (): void => attempt.offer(packState(state))
      give()
      shortenChains(state, router, variables, attempt, give)
      return null
    }
    placeIsolated(state, usable)
    const partial = partialOf(state, problem)
    if (!closest || lacks(partial) < lacks(closest)) closest = partial
    if (watch.shouldStop(state.overlap)) break
  }
  return closest
}
