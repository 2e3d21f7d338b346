import { chainOf } from './embedding'
import type { Embedding } from './embedding'
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

/** Where the machine has room: on most of it, with hardly any placement, for a first valid embedding as soon as can be. */
const QUICK = { effort: 0.1, slack: 3 }
/** Share of the machine that a problem may need for that; beyond it the first round is as quick. */
const QUICK_NEED = 0.6

/**
 * How each round of a try goes about it: first on as much of the machine as the problem may need, with little work on
 * the placement; then with more room and more work. Near what the machine can take one round in six or so succeeds.
 */
const ROUNDS = [
  { effort: 0.3, slack: 1 },
  { effort: 3, slack: 1.5 },
  ...Array.from({ length: 10 }, () => ({ effort: 3, slack: Infinity })),
]

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

/** One try of the chain search: rounds of sowing and routing on one state. */
class ChainSearch {
  readonly state: ChainState
  private readonly router: Router
  private readonly seeds: Seeds
  private readonly variables: Int32Array

  constructor(
    private readonly task: EmbeddingTask,
    private readonly attempt: Attempt,
  ) {
    const { problem, machine, usable } = task
    this.state = new ChainState(problem, machine, usable, attempt.kernel)
    this.router = new Router(this.state, attempt.random)
    this.seeds = new Seeds(problem, machine, usable, positionsOf(task))
    this.variables = Int32Array.from({ length: problem.order }, (_, v) => v).filter((v) => degreeOf(problem, v) > 0)
  }

  /** Whether there is room to be wasteful with. */
  get isRoomy(): boolean {
    return this.seeds.need <= QUICK_NEED * this.seeds.room
  }

  /** Places and routes from nothing; returns whether all is well, isolated variables included. */
  round({ effort, slack }: { effort: number; slack: number }): boolean {
    const { state, router, variables, task, attempt } = this
    const { random, watch } = attempt
    state.clear()
    watch.phase = 'placing'
    this.seeds.sow(state, random, effort, slack, () => watch.shouldStop(state.overlap))
    watch.phase = 'rerouting'
    if (!negotiate(state, router, variables, random, watch)) return false
    return placeIsolated(state, task.usable) || makeRoom(state, router, variables, task, attempt)
  }

  /** Goes back to chains that were valid. */
  restore(chains: Embedding): void {
    this.state.clear()
    for (let v = 0; v < this.state.variables; v++) for (const q of chainOf(chains, v)) this.state.add(v, q)
  }

  shorten(): void {
    shortenChains(this.state, this.router, this.variables, this.attempt, () =>
      this.attempt.offer(packState(this.state)),
    )
  }
}

/**
 * One try of placing variables on the machine's plane, routing their chains under negotiated congestion, and shortening
 * them (sources at the parts). Where there is room, a quick round gives the first valid embedding, which is shortened
 * only when a closer one is not found at once; else begins anew a number of times before it gives up.
 */
export function searchChains(task: EmbeddingTask, attempt: Attempt): PartialEmbedding | null {
  const search = new ChainSearch(task, attempt)
  const { state } = search
  const { watch } = attempt
  let closest: PartialEmbedding | null = null
  let quick: Embedding | null = null
  if (search.isRoomy && search.round(QUICK)) {
    quick = packState(state)
    attempt.offer(quick)
    if (watch.shouldStop(0)) return null
  }
  for (const round of ROUNDS) {
    const valid = search.round(round)
    if (!valid && quick) search.restore(quick)
    if (valid || quick) {
      search.shorten()
      return null
    }
    placeIsolated(state, task.usable)
    const partial = partialOf(state, task.problem)
    if (!closest || lacks(partial) < lacks(closest)) closest = partial
    if (watch.shouldStop(state.overlap)) break
  }
  return closest
}
