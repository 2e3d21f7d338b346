import type { Control } from '../../../shared/engine/control'
import type { Infeasibility } from '../../../shared/engine/embedding/feasibility'
import { AT_ONCE, provedInfeasible, THOROUGH } from '../../../shared/engine/embedding/feasibility'
import type { EmbeddingTask } from '../../../shared/engine/embedding/task'

export interface ProveInfeasibleInput {
  task: EmbeddingTask
  /** Looks longer: for a search that found nothing. */
  thorough: boolean
}

/** The bound that rules every embedding out, or null. */
export function proveInfeasible(
  { task, thorough }: ProveInfeasibleInput,
  _control: Control<never>,
): Infeasibility | null {
  return provedInfeasible(task, thorough ? THOROUGH : AT_ONCE)
}
