import type { Control } from '../../../shared/engine/control'
import type { SearchProgress } from '../../../shared/engine/embedding/progress'
import type { SearchOptions, SearchResult } from '../../../shared/engine/embedding/search'
import { findEmbedding } from '../../../shared/engine/embedding/search'
import type { EmbeddingStats } from '../../../shared/engine/embedding/stats'
import { embeddingStats } from '../../../shared/engine/embedding/stats'
import type { EmbeddingTask } from '../../../shared/engine/embedding/task'
import type { Violation } from '../../../shared/engine/embedding/verify'
import { verifyEmbedding } from '../../../shared/engine/embedding/verify'

export interface SearchInput {
  task: EmbeddingTask
  options: Partial<SearchOptions>
}

export interface SearchOutput {
  result: SearchResult
  /** From the separate checker; anything in here is a fault of the search. */
  violations: Violation[]
  stats: EmbeddingStats | null
}

/** Searches for an embedding and has it verified before anything is saved. */
export function search({ task, options }: SearchInput, control: Control<SearchProgress>): SearchOutput {
  const result = findEmbedding(task, options, control)
  const { embedding } = result
  const { problem, machine, usable } = task
  return {
    result,
    violations: embedding ? verifyEmbedding(problem, machine, usable, embedding) : [],
    stats: embedding ? embeddingStats(embedding, problem, machine) : null,
  }
}
