import { readSamplesCsv } from '#shared/engine/readout/samples-csv'
import { spinOf } from '#shared/engine/sampling/samples'
import type { Samples } from '#shared/engine/sampling/samples'
import type { ChainLayer, LatticeData, ReadLayer } from '../lattice/types'

/** Samples to be looked at row by row. */
export interface ReadRows {
  readonly samples: Samples
  /** Dense index of the qubit in each column. */
  readonly columns: Uint32Array
}

/**
 * Reads the CSV of returned samples for the lattice.
 * @param qubits published numbers of the programmed qubits, in any order
 * @returns null when the text does not hold exactly these qubits
 */
export function readRows(text: string, qubits: readonly number[], lattice: Pick<LatticeData, 'ids'>): ReadRows | null {
  const { samples } = readSamplesCsv(text, { qubitIds: qubits })
  if (!samples) return null
  const index = new Map(Array.from(lattice.ids, (id, q) => [id, q]))
  return { samples, columns: Uint32Array.from(qubits, (id) => index.get(id)!) }
}

/** The spins of one row by qubit, 0 where the qubit is not used. */
export function readLayer({ samples, columns }: ReadRows, row: number, lattice: Pick<LatticeData, 'ids'>): ReadLayer {
  const spins = new Int8Array(lattice.ids.length)
  columns.forEach((q, c) => (spins[q] = spinOf(samples, row, c)))
  return { spins }
}

/** Variables whose qubits disagree. */
export function brokenChains(chains: Pick<ChainLayer, 'offsets' | 'qubits'>, { spins }: ReadLayer): number[] {
  const broken: number[] = []
  for (let i = 0; i + 1 < chains.offsets.length; i++) {
    const own = chains.qubits.subarray(chains.offsets[i], chains.offsets[i + 1])
    if (own.some((q) => spins[q] !== spins[own[0]!])) broken.push(i)
  }
  return broken
}
