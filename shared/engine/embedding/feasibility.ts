import { brokenCount } from './bounds/counts'
import type { Infeasibility } from './bounds/infeasibility'
import { brokenPlanarity } from './bounds/planar'
import { brokenTreewidth } from './bounds/treewidth'
import type { Effort } from './bounds/treewidth'
import type { EmbeddingTask } from './task'

export type { Infeasibility } from './bounds/infeasibility'
export { machineTreewidthBound } from './bounds/machine-treewidth'

/** Proofs that are found within about a tenth of a second on machines of some thousand qubits. */
export const AT_ONCE: Effort = { contractionWork: 1_500_000, routingWork: 3_000_000, cliqueWork: 200_000 }

/** Some seconds at most: for a search that found nothing. */
export const THOROUGH: Effort = { contractionWork: 30_000_000, routingWork: 60_000_000, cliqueWork: 2_000_000 }

/**
 * Checks bounds whose violation proves that no minor embedding exists: counts, planarity, cliques and treewidth. `null`
 * proves nothing: a search may still find none. The effort is counted, so the same task always gets the same answer.
 */
export function provedInfeasible(task: EmbeddingTask, effort: Effort = AT_ONCE): Infeasibility | null {
  return brokenCount(task) ?? brokenPlanarity(task, effort.contractionWork) ?? brokenTreewidth(task, effort)
}
