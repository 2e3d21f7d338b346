import type { Control } from '../../../shared/engine/control'
import type { EmbeddingAdvice } from '../../../shared/engine/embedding/advice'
import { adviseOn } from '../../../shared/engine/embedding/advice'
import type { PartialEmbedding } from '../../../shared/engine/embedding/method'
import type { EmbeddingTask } from '../../../shared/engine/embedding/task'

export interface AdviseInput {
  task: EmbeddingTask
  partial: PartialEmbedding
}

/** What stood in the way in the closest state of a search, and what may help. */
export function advise({ task, partial }: AdviseInput, _control: Control<never>): EmbeddingAdvice {
  return adviseOn(task, partial)
}
