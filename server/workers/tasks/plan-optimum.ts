import type { Control } from '../../../shared/engine/control'
import type { OptimumMethod, OptimumPlan } from '../../../shared/engine/problem/optimum/plan'
import { planOptimum as planFor, UnsuitableMethod } from '../../../shared/engine/problem/optimum/plan'
import type { Form, Problem } from '../../../shared/engine/problem/problem'

export interface PlanOptimumInput {
  problem: Problem
  form: Form
  /** For all components; null leaves the choice to the plan. */
  method: OptimumMethod | null
}

/** The components of a problem and how each is solved, or why the method asked for does not suit one of them. */
export function planOptimum(
  { problem, form, method }: PlanOptimumInput,
  _control: Control<never>,
): { plan: OptimumPlan; refusal: null } | { plan: null; refusal: string } {
  try {
    return { plan: planFor(problem, form, method), refusal: null }
  } catch (error) {
    if (error instanceof UnsuitableMethod) return { plan: null, refusal: error.message }
    throw error
  }
}
