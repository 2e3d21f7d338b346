import type { ChainLayer, LatticeData } from '../lattice/types'

/** The closest state of a search that found none, by dense index. */
export interface PartialLayer extends ChainLayer {
  /** Qubits that several chains want. */
  readonly wanted: Uint32Array
}

/** @param chains published qubit numbers by variable label; chains may share qubits */
export function partialLayer(
  lattice: Pick<LatticeData, 'ids'>,
  chains: Readonly<Record<string, readonly number[]>>,
): PartialLayer {
  const index = new Map(Array.from(lattice.ids, (id, q) => [id, q]))
  const labels = Object.keys(chains)
  const own = labels.map((label) => chains[label]!.flatMap((id) => index.get(id) ?? []))
  const offsets = new Uint32Array(labels.length + 1)
  own.forEach((chain, i) => (offsets[i + 1] = offsets[i]! + chain.length))
  const qubits = Uint32Array.from(own.flat())
  const uses = new Map<number, number>()
  for (const qubit of qubits) uses.set(qubit, (uses.get(qubit) ?? 0) + 1)
  const wanted = Uint32Array.from([...uses].flatMap(([qubit, count]) => (count > 1 ? qubit : [])))
  return { labels, offsets, qubits, neighbours: new Uint32Array(0), wanted }
}

/**
 * The same chains for drawing, where a qubit shows one chain only: the one in focus is drawn whole, and the others leave
 * its qubits out.
 */
export function withWhole({ labels, offsets, qubits, neighbours }: ChainLayer, focused: number | null): ChainLayer {
  if (focused === null || focused >= labels.length) return { labels, offsets, qubits, neighbours }
  const whole = new Set(qubits.subarray(offsets[focused], offsets[focused + 1]))
  const kept: number[] = []
  const ends = new Uint32Array(offsets.length)
  for (let i = 0; i < labels.length; i++) {
    for (let k = offsets[i]!; k < offsets[i + 1]!; k++)
      if (i === focused || !whole.has(qubits[k]!)) kept.push(qubits[k]!)
    ends[i + 1] = kept.length
  }
  return { labels, offsets: ends, qubits: Uint32Array.from(kept), neighbours }
}

/** Variables whose chains share a qubit with that of `label`. */
export function sharersOf(chains: Readonly<Record<string, readonly number[]>>, label: string): string[] {
  const own = new Set(chains[label])
  return Object.keys(chains).filter((other) => other !== label && chains[other]!.some((qubit) => own.has(qubit)))
}
