/**
 * A minor embedding: the chain of variable i is qubits[offsets[i] … offsets[i + 1] − 1],
 * ascending dense indices of the machine graph.
 */
export interface Embedding {
  readonly offsets: Uint32Array
  readonly qubits: Uint32Array
}

/** Number of variables (chains). */
export const chainCount = (embedding: Embedding): number => embedding.offsets.length - 1

/** The chain of variable i as a view, without copying. */
export const chainOf = (embedding: Embedding, i: number): Uint32Array =>
  embedding.qubits.subarray(embedding.offsets[i]!, embedding.offsets[i + 1]!)

/** Packs one array of qubits per variable; each chain is sorted. */
export function packChains(chains: readonly ArrayLike<number>[]): Embedding {
  const offsets = new Uint32Array(chains.length + 1)
  chains.forEach((chain, i) => (offsets[i + 1] = offsets[i]! + chain.length))
  const qubits = new Uint32Array(offsets[chains.length]!)
  chains.forEach((chain, i) => qubits.set(Uint32Array.from(chain).sort(), offsets[i]!))
  return { offsets, qubits }
}
