import type { Control } from '../../../shared/engine/control'
import type { PlannedTry } from '../../../shared/engine/embedding/plan'
import { planTries } from '../../../shared/engine/embedding/plan'
import type { SearchOptions } from '../../../shared/engine/embedding/search'
import { checkSearch } from '../../../shared/engine/embedding/search'
import type { EmbeddingTask } from '../../../shared/engine/embedding/task'

export interface PlanSearchInput {
  task: EmbeddingTask
  options: SearchOptions
}

/** The tries of a search. @throws RangeError for options out of range or arrays that do not belong together */
export function planSearch({ task, options }: PlanSearchInput, _control: Control<never>): PlannedTry[] {
  checkSearch(task, options)
  return planTries(task, options)
}
