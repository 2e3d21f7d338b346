import type { Control } from '../../../shared/engine/control'
import type { AnnealedBest, RestartOptions } from '../../../shared/engine/problem/optimum/anneal-restarts'
import { annealRestarts } from '../../../shared/engine/problem/optimum/anneal-restarts'
import type { Problem } from '../../../shared/engine/problem/problem'
import type { Deadline } from '../deadline'
import { untilDeadline } from '../deadline'

export interface AnnealPartInput {
  qubo: Problem
  options: RestartOptions
  deadline: Deadline
}

/** Some restarts of annealing over one component. Even past the deadline one is begun and ended by descent at once. */
export function annealPart(
  { qubo, options, deadline }: AnnealPartInput,
  control: Control<{ done: number; energy: number }>,
): AnnealedBest | null {
  return annealRestarts(qubo, options, untilDeadline(control, deadline))
}
