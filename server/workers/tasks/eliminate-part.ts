import type { Control } from '../../../shared/engine/control'
import type { EliminationOutcome } from '../../../shared/engine/problem/optimum/eliminate'
import { minimiseByElimination } from '../../../shared/engine/problem/optimum/eliminate'
import type { EliminationPlan } from '../../../shared/engine/problem/optimum/elimination-plan'
import type { Problem } from '../../../shared/engine/problem/problem'
import type { Deadline } from '../deadline'
import { untilDeadline } from '../deadline'

export interface EliminatePartInput {
  qubo: Problem
  plan: EliminationPlan
  deadline: Deadline
}

/** Dynamic programming over one component; null when it was given up. */
export function eliminatePart(
  { qubo, plan, deadline }: EliminatePartInput,
  control: Control<{ share: number }>,
): EliminationOutcome | null {
  return minimiseByElimination(qubo, plan, untilDeadline(control, deadline))
}
