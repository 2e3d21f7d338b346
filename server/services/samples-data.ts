import type { SampleRows, Samples } from '../../shared/engine/sampling/samples'
import { packArrays, unpackArrays } from '../../shared/packed-arrays'

export const packSamples = ({ width, rows, bytes, counts, gauges, energies }: SampleRows): Uint8Array =>
  packArrays({ bytes, counts, ...(gauges ? { gauges } : {}), ...(energies ? { energies } : {}) }, { width, rows })

export function unpackSamples(packed: Uint8Array): SampleRows {
  const { meta, arrays } = unpackArrays(packed)
  return {
    width: meta.width as number,
    rows: meta.rows as number,
    bytes: arrays.bytes as Uint8Array,
    counts: arrays.counts as Uint32Array,
    gauges: (arrays.gauges as Uint32Array | undefined) ?? null,
    energies: (arrays.energies as Float64Array | undefined) ?? null,
  }
}

/** Reads that the rows stand for. */
export const readsIn = ({ counts }: Pick<Samples, 'counts'>): number => counts.reduce((sum, count) => sum + count, 0)
