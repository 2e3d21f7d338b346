import type { Control } from '../../../shared/engine/control'
import type { Embedding } from '../../../shared/engine/embedding/embedding'
import type { EmbeddingStats } from '../../../shared/engine/embedding/stats'
import { embeddingStats } from '../../../shared/engine/embedding/stats'
import type { EmbeddingTask } from '../../../shared/engine/embedding/task'
import type { Violation } from '../../../shared/engine/embedding/verify'
import { verifyEmbedding } from '../../../shared/engine/embedding/verify'

export interface CheckEmbeddingInput {
  task: Pick<EmbeddingTask, 'problem' | 'machine' | 'usable'>
  embedding: Embedding
  /** What messages call the variables and the qubits. */
  labels: readonly string[]
  ids: Uint32Array
}

export interface CheckEmbeddingOutput {
  violations: Violation[]
  /** Null where there are violations. */
  stats: EmbeddingStats | null
}

/** Checks an embedding by the definition, with code that no search uses, and counts what it takes. */
export function checkEmbedding(input: CheckEmbeddingInput, _control: Control<never>): CheckEmbeddingOutput {
  const { task, embedding, labels, ids } = input
  const { problem, machine, usable } = task
  const violations = verifyEmbedding(problem, machine, usable, embedding, {
    label: (i) => labels[i]!,
    qubitName: (q) => String(ids[q]),
  })
  return { violations, stats: violations.length === 0 ? embeddingStats(embedding, problem, machine) : null }
}
