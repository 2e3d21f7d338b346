import type { Control } from '../../../shared/engine/control'
import type { SliceOutcome } from '../../../shared/engine/problem/optimum/enumerate-slice'
import { enumerateSlice } from '../../../shared/engine/problem/optimum/enumerate-slice'
import type { Problem } from '../../../shared/engine/problem/problem'
import type { Deadline } from '../deadline'
import { secondsLeft, untilDeadline } from '../deadline'

export interface EnumeratePartInput {
  qubo: Problem
  slice: number
  deadline: Deadline
}

/** One slice of the states of a component; null when the time was over before it got a thread. */
export function enumeratePart(
  { qubo, slice, deadline }: EnumeratePartInput,
  control: Control<{ share: number }>,
): SliceOutcome | null {
  const bounded = untilDeadline(control, deadline)
  return secondsLeft(deadline) > 0 ? enumerateSlice(qubo, slice, bounded) : null
}
