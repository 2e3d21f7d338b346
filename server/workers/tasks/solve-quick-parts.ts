import type { Control } from '../../../shared/engine/control'
import { annealRestarts } from '../../../shared/engine/problem/optimum/anneal-restarts'
import { minimiseByElimination } from '../../../shared/engine/problem/optimum/eliminate'
import { enumerateSlice } from '../../../shared/engine/problem/optimum/enumerate-slice'
import type { PartOutcome } from '../../../shared/engine/problem/optimum/outcome'
import { annealedOutcome, eliminatedOutcome, enumeratedOutcome } from '../../../shared/engine/problem/optimum/outcome'
import type { OptimumPart } from '../../../shared/engine/problem/optimum/plan'
import type { Deadline } from '../deadline'
import { untilDeadline } from '../deadline'

export interface SolveQuickPartsInput {
  /** Components that a thread enumerates or eliminates in a moment. */
  parts: readonly OptimumPart[]
  seed: number
  deadline: Deadline
}

const GUESS = { first: 0, restarts: 1, sweeps: 100 }

/** Many small components one after the other; those that the time does not reach get one restart of annealing. */
export function solveQuickParts(
  { parts, seed, deadline }: SolveQuickPartsInput,
  control: Control<{ done: number }>,
): PartOutcome[] {
  const bounded = untilDeadline(control, deadline)
  const inner: Control<unknown> = { ...bounded, report: () => {} }
  return parts.map((part, k) => {
    const outcome =
      solveQuick(part, inner) ?? annealedOutcome(part, annealRestarts(part.qubo, { ...GUESS, seed }, inner))
    control.report({ done: k + 1 })
    return outcome
  })
}

function solveQuick(part: OptimumPart, control: Control<unknown>): PartOutcome | null {
  if (part.elimination) {
    const eliminated = minimiseByElimination(part.qubo, part.elimination, control)
    return eliminated && eliminatedOutcome(part, eliminated, null)
  }
  const slice = enumerateSlice(part.qubo, 0, control)
  return slice.complete ? enumeratedOutcome(part, slice, null) : null
}
