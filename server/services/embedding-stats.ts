import type { embeddingStats } from '../../shared/engine/embedding/stats'
import type { EmbeddingStats } from '../../shared/schemas/embeddings'
import type { EmbeddingRow } from '../database/repositories/embeddings'

type EngineStats = ReturnType<typeof embeddingStats>
type StoredStats = NonNullable<EmbeddingRow['stats']>

/** What is stored with an embedding; the rest follows from its chains and the calibration. */
export const storedStats = ({
  qubitsUsed,
  chainLength,
  chainCouplers,
  interactionCouplers,
}: EngineStats): StoredStats => ({
  qubitsUsed,
  chainLength: { ...chainLength },
  chainCouplers,
  interactionCouplers,
  couplersUsed: chainCouplers + interactionCouplers,
})

/** @param qubits that work on the machine at the embedding's calibration */
export function statsView(stats: StoredStats | null, qubits: number): EmbeddingStats | null {
  if (!stats) return null
  return { ...stats, unusedShare: qubits > 0 ? 1 - stats.qubitsUsed / qubits : 0 }
}
