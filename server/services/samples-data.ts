import type { Samples } from '../../shared/engine/sampling/samples'
import { packArrays, unpackArrays } from '../../shared/packed-arrays'

export const packSamples = ({ width, rows, bytes, counts }: Samples): Uint8Array =>
  packArrays({ bytes, counts }, { width, rows })

export function unpackSamples(packed: Uint8Array): Samples {
  const { meta, arrays } = unpackArrays(packed)
  return {
    width: meta.width as number,
    rows: meta.rows as number,
    bytes: arrays.bytes as Uint8Array,
    counts: arrays.counts as Uint32Array,
  }
}

/** Reads that the rows stand for. */
export const readsIn = ({ counts }: Pick<Samples, 'counts'>): number => counts.reduce((sum, count) => sum + count, 0)
