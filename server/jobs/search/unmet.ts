import { chainOf } from '../../../shared/engine/embedding/embedding'
import type { PartialEmbedding } from '../../../shared/engine/embedding/method'
import type { EmbeddingRow } from '../../database/repositories/embeddings'
import type { Subject } from '../../services/embedding-subject'

type StoredUnmet = NonNullable<EmbeddingRow['unmet']>

/** Why a search ended without an embedding: in a few words, and whether that is proved for every search. */
export interface Ending {
  words: string
  proved: boolean
}

const countOf = (count: number, one: string, many: string): string =>
  count > 0 ? `${count} ${count === 1 ? one : many}` : ''

/** What the closest state still lacks, in words. */
function lacksOf({ overlappedQubits, unmet, unplaced }: PartialEmbedding): string {
  const parts = [
    countOf(overlappedQubits.length, 'qubit wanted by more than one chain', 'qubits wanted by more than one chain'),
    countOf(unmet.length, 'interaction without a coupler', 'interactions without a coupler'),
    countOf(unplaced, 'variable without a qubit', 'variables without a qubit'),
  ]
  return parts.filter(Boolean).join(', ') || 'no conflicts'
}

/** What stood in the way: the shared qubits of the closest state, and whose chains share them. */
export function unmetOf({ labels, machine }: Subject, partial: PartialEmbedding, ending: Ending): StoredUnmet {
  const { ids } = machine.fabric
  const shared = new Set(partial.overlappedQubits)
  const hope = ending.proved ? '' : ' More tries, a longer limit or a larger machine may help.'
  return {
    message: `${ending.words}. The closest state has ${lacksOf(partial)}.${hope}`,
    proved: ending.proved,
    overlap: partial.overlap,
    overlappedQubits: partial.overlappedQubits.map((q) => ids[q]!),
    variables: labels.filter((_, i) => chainOf(partial.chains, i).some((q) => shared.has(q))),
    unmetInteractions: partial.unmet.length,
    advice: [],
  }
}
