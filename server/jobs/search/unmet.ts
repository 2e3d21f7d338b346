import { groupDigits } from '../../../shared/engine/digits'
import type { EmbeddingAdvice } from '../../../shared/engine/embedding/advice'
import { chainOf } from '../../../shared/engine/embedding/embedding'
import type { PartialEmbedding } from '../../../shared/engine/embedding/method'
import type { AdviceView } from '../../../shared/schemas/embeddings'
import type { EmbeddingRow } from '../../database/repositories/embeddings'
import type { Subject } from '../../services/embedding-subject'

type StoredUnmet = NonNullable<EmbeddingRow['unmet']>

/** Why a search ended without an embedding: in a few words, and whether that is proved for every search. */
export interface Ending {
  words: string
  proved: boolean
}

const countOf = (count: number, one: string, many: string): string =>
  count > 0 ? `${groupDigits(count)} ${count === 1 ? one : many}` : ''

/** What the closest state still lacks, in words. */
function lacksOf({ overlappedQubits, unmet, unplaced }: PartialEmbedding): string {
  const parts = [
    countOf(overlappedQubits.length, 'qubit wanted by more than one chain', 'qubits wanted by more than one chain'),
    countOf(unmet.length, 'interaction without a coupler', 'interactions without a coupler'),
    countOf(unplaced, 'variable without a qubit', 'variables without a qubit'),
  ]
  return parts.filter(Boolean).join(', ') || 'no conflicts'
}

/** What may help, by label; what no search can do is left out where that is proved. */
function adviceView({ items }: EmbeddingAdvice, { labels, graph }: Subject, { proved }: Ending): AdviceView[] {
  return items
    .filter(({ kind }) => !proved || kind !== 'another try')
    .map(({ kind, message, variables, interactions }) => ({
      kind,
      message,
      variables: variables.map((v) => labels[v]!),
      interactions: interactions.map((k) => [labels[graph.ends[2 * k]!]!, labels[graph.ends[2 * k + 1]!]!]),
    }))
}

/** What stood in the way: the shared qubits of the closest state, whose chains share them, and what may help. */
export function unmetOf(
  subject: Subject,
  partial: PartialEmbedding,
  advice: EmbeddingAdvice,
  ending: Ending,
): StoredUnmet {
  const { labels, machine } = subject
  const shared = new Set(partial.overlappedQubits)
  return {
    message: `${ending.words}. The closest state has ${lacksOf(partial)}.`,
    proved: ending.proved,
    overlap: partial.overlap,
    overlappedQubits: partial.overlappedQubits.map((q) => machine.fabric.ids[q]!),
    variables: labels.filter((_, i) => chainOf(partial.chains, i).some((q) => shared.has(q))),
    unmetInteractions: partial.unmet.length,
    neededQubits: advice.room.needed,
    advice: adviceView(advice, subject, ending),
  }
}

/** A proof where no try left a state behind: nothing is known of what stood in the way but the proof. */
export const provedOnly = ({ words }: Ending): StoredUnmet => ({
  message: `${words}.`,
  proved: true,
  overlap: 0,
  overlappedQubits: [],
  variables: [],
  unmetInteractions: 0,
  neededQubits: null,
  advice: [],
})
