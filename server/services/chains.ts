import { createHash } from 'node:crypto'
import type { Embedding } from '../../shared/engine/embedding/embedding'
import { chainCount, chainOf } from '../../shared/engine/embedding/embedding'
import { packArrays, unpackArrays } from '../../shared/packed-arrays'

/** The stored bytes of an embedding and their SHA-256. */
export function packEmbedding({ offsets, qubits }: Embedding): { bytes: Uint8Array; fingerprint: string } {
  const bytes = packArrays({ offsets, qubits })
  return { bytes, fingerprint: createHash('sha256').update(bytes).digest('hex') }
}

export function unpackChains(bytes: Uint8Array): Embedding {
  const { arrays } = unpackArrays(bytes)
  return { offsets: arrays.offsets as Uint32Array, qubits: arrays.qubits as Uint32Array }
}

/** Chains by variable label, qubits by published number. */
export function namedChains(
  embedding: Embedding,
  labels: readonly string[],
  ids: Uint32Array,
): Record<string, number[]> {
  return Object.fromEntries(labels.map((label, i) => [label, Array.from(chainOf(embedding, i), (q) => ids[q]!)]))
}

/** How many chains differ between two embeddings of the same variables. */
export function changedChains(before: Embedding, after: Embedding): number {
  let changed = 0
  for (let i = 0; i < chainCount(after); i++) {
    const [was, is] = [chainOf(before, i), chainOf(after, i)]
    if (was.length !== is.length || was.some((q, k) => q !== is[k])) changed++
  }
  return changed
}
