import { chainOf } from '../../../shared/engine/embedding/embedding'
import type { PartialEmbedding } from '../../../shared/engine/embedding/method'
import type { EmbeddingRow } from '../../database/repositories/embeddings'
import type { Subject } from '../../services/embedding-subject'

type StoredUnmet = NonNullable<EmbeddingRow['unmet']>

/** What stood in the way: the shared qubits of the closest state, and whose chains share them. */
export function unmetOf({ labels, machine }: Subject, partial: PartialEmbedding, why: string): StoredUnmet {
  const { ids } = machine.fabric
  const shared = new Set(partial.overlappedQubits)
  const variables = labels.filter((_, i) => chainOf(partial.chains, i).some((q) => shared.has(q)))
  const parts = [
    partial.overlap > 0 ? `${shared.size} ${shared.size === 1 ? 'qubit' : 'qubits'} wanted by more than one chain` : '',
    partial.unmet.length > 0 ? `${partial.unmet.length} interactions without a coupler` : '',
    partial.unplaced > 0 ? `${partial.unplaced} variables without a qubit` : '',
  ].filter(Boolean)
  return {
    message: `${why}. The closest state has ${parts.join(', ') || 'no conflicts'}. More tries, a longer limit or a larger machine may help.`,
    overlap: partial.overlap,
    overlappedQubits: partial.overlappedQubits.map((q) => ids[q]!),
    variables,
    unmetInteractions: partial.unmet.length,
    advice: [],
  }
}
