import type { Graph } from '../graph/graph'
import { chainCouplers, interactionCouplers } from './couplers'
import type { Embedding } from './embedding'
import { chainCount } from './embedding'

/** The figures an embedding is judged by. */
export interface EmbeddingStats {
  readonly qubitsUsed: number
  /** Qubits a chain; all 0 when there are no chains. */
  readonly chainLength: { readonly max: number; readonly mean: number; readonly min: number }
  /** Machine couplers inside chains. */
  readonly chainCouplers: number
  /** Machine couplers between chains of interacting variables. */
  readonly interactionCouplers: number
  /** lengthHistogram[l] is the number of chains of l qubits; length max + 1. */
  readonly lengthHistogram: Uint32Array
}

/** Counts qubits, chain lengths and couplers of a valid embedding. */
export function embeddingStats(embedding: Embedding, problem: Graph, machine: Graph): EmbeddingStats {
  const chains = chainCount(embedding)
  const { offsets, qubits } = embedding
  let max = 0
  let min = chains > 0 ? Infinity : 0
  for (let i = 0; i < chains; i++) {
    const length = offsets[i + 1]! - offsets[i]!
    max = Math.max(max, length)
    min = Math.min(min, length)
  }
  const lengthHistogram = new Uint32Array(max + 1)
  for (let i = 0; i < chains; i++) lengthHistogram[offsets[i + 1]! - offsets[i]!]!++
  return {
    qubitsUsed: qubits.length,
    chainLength: { max, mean: chains > 0 ? qubits.length / chains : 0, min },
    chainCouplers: chainCouplers(embedding, machine).edges.length,
    interactionCouplers: interactionCouplers(embedding, problem, machine).edges.length,
    lengthHistogram,
  }
}
