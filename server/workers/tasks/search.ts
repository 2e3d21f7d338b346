import type { Control } from '../../../shared/engine/control'
import type { SearchOptions, SearchProgress, SearchResult } from '../../../shared/engine/embedding/search'
import { findEmbedding } from '../../../shared/engine/embedding/search'
import type { EmbeddingStats } from '../../../shared/engine/embedding/stats'
import { embeddingStats } from '../../../shared/engine/embedding/stats'
import type { Violation } from '../../../shared/engine/embedding/verify'
import { verifyEmbedding } from '../../../shared/engine/embedding/verify'
import type { Graph } from '../../../shared/engine/graph/graph'

export interface SearchInput {
  problem: Graph
  machine: Graph
  usable: Uint8Array
  options: SearchOptions
}

export interface SearchOutput {
  result: SearchResult
  /** From the separate checker; anything in here is a fault of the search. */
  violations: Violation[]
  stats: EmbeddingStats | null
}

/** Searches for an embedding and has it verified before anything is saved. */
export function search(
  { problem, machine, usable, options }: SearchInput,
  control: Control<SearchProgress>,
): SearchOutput {
  const result = findEmbedding(problem, machine, usable, options, control)
  const { embedding } = result
  return {
    result,
    violations: embedding ? verifyEmbedding(problem, machine, usable, embedding) : [],
    stats: embedding ? embeddingStats(embedding, problem, machine) : null,
  }
}
