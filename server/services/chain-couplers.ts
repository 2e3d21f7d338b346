import { interactionCouplers } from '../../shared/engine/embedding/couplers'
import { interactionGraph } from '../../shared/engine/problem/interaction-graph'
import type { Bench } from './programming'

/** Couplers to other interacting chains, per variable. */
export function couplerCountsOf({ ising, embedding, machine }: Bench): Uint32Array {
  const problem = interactionGraph(ising)
  const { offsets } = interactionCouplers(embedding, problem, machine.graph)
  const counts = new Uint32Array(ising.n)
  for (let k = 0; 2 * k < problem.ends.length; k++)
    for (const variable of [problem.ends[2 * k]!, problem.ends[2 * k + 1]!])
      counts[variable]! += offsets[k + 1]! - offsets[k]!
  return counts
}
