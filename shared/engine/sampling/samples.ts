/**
 * Samples of `width` spins, bit-packed: row r is bytes[r·stride … (r + 1)·stride − 1] with stride = ⌈width / 8⌉;
 * spin c is bit (c mod 8) of byte ⌊c / 8⌋, 1 for up (+1), 0 for down (−1).
 * counts[r] is how many reads gave row r.
 */
export interface Samples {
  readonly width: number
  readonly rows: number
  readonly bytes: Uint8Array
  readonly counts: Uint32Array
}

/** Samples with what else is known of each row. */
export interface SampleRows extends Samples {
  /** Number of the gauge that each row was read under, from 0; null where nobody said. */
  readonly gauges: Uint32Array | null
  /** Energies that came with the rows, as they came; null where none did. */
  readonly energies: Float64Array | null
}

/** Bytes in one packed row. */
export const strideOf = (width: number): number => (width + 7) >> 3

/** Spin c of row r, +1 or −1. */
export function spinOf(samples: Samples, r: number, c: number): 1 | -1 {
  const byte = samples.bytes[r * strideOf(samples.width) + (c >> 3)]!
  return (byte >> (c & 7)) & 1 ? 1 : -1
}

/** Writes the spins of row r, +1 or −1 each; far faster than asking for one after another. */
export function unpackRow({ width, bytes }: Samples, r: number, spins: Int8Array): void {
  const base = r * strideOf(width)
  for (let k = 0; 8 * k < width; k++) {
    let byte = bytes[base + k]!
    const end = Math.min(width, 8 * k + 8)
    for (let c = 8 * k; c < end; c++) {
      spins[c] = ((byte & 1) << 1) - 1
      byte >>= 1
    }
  }
}
