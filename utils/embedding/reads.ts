import { unpackArrays } from '#shared/packed-arrays'
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
 * Reads packed samples (GET /api/returns/:id/samples?format=packed) for the lattice.
 * @returns null when a qubit is not on it
 */
export function readRows(packed: Uint8Array, lattice: Pick<LatticeData, 'ids'>): ReadRows | null {
  const { meta, arrays } = unpackArrays(packed)
  const index = new Map(Array.from(lattice.ids, (id, q) => [id, q]))
  const columns = Array.from(arrays.qubits!, (id) => index.get(id) ?? -1)
  if (columns.includes(-1)) return null
  const samples: Samples = {
    width: columns.length,
    rows: meta.rows as number,
    bytes: arrays.bytes as Uint8Array,
    counts: arrays.counts as Uint32Array,
  }
  return { samples, columns: Uint32Array.from(columns) }
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
