import { strideOf } from './samples'
import type { Samples } from './samples'

/**
 * Packs spins given row after row (rows × width values, > 0 for up) in the order given, one read a row unless counts say
 * otherwise.
 * @throws RangeError for lengths that do not fit
 */
export function packRows(width: number, spins: ArrayLike<number>, counts?: ArrayLike<number>): Samples {
  const rows = width > 0 ? spins.length / width : 0
  if (!Number.isInteger(rows)) throw new RangeError(`${spins.length} spins do not fill rows of ${width}`)
  if (counts && counts.length !== rows) throw new RangeError(`${counts.length} counts for ${rows} rows`)
  const stride = strideOf(width)
  const bytes = new Uint8Array(rows * stride)
  for (let r = 0; r < rows; r++)
    for (let c = 0; c < width; c++) if (spins[r * width + c]! > 0) bytes[r * stride + (c >> 3)]! |= 1 << (c & 7)
  return { width, rows, bytes, counts: counts ? Uint32Array.from(counts) : new Uint32Array(rows).fill(1) }
}

/**
 * Puts ranges of reads one after the other.
 * @throws RangeError for samples of different widths
 */
export function joinSamples(parts: readonly Samples[]): Samples {
  const width = parts[0]?.width ?? 0
  const rows = parts.reduce((sum, part) => sum + part.rows, 0)
  const bytes = new Uint8Array(rows * strideOf(width))
  const counts = new Uint32Array(rows)
  let row = 0
  for (const part of parts) {
    if (part.width !== width) throw new RangeError(`samples of width ${part.width} after samples of width ${width}`)
    bytes.set(part.bytes, row * strideOf(width))
    counts.set(part.counts, row)
    row += part.rows
  }
  return { width, rows, bytes, counts }
}

/** Number of the first row equal to each row. Hash: FNV-1a (Fowler, Noll & Vo), open addressing. */
export function firstEqualRows({ width, rows, bytes }: Samples): Uint32Array {
  const stride = strideOf(width)
  const mask = 2 ** (32 - Math.clz32(2 * rows)) - 1
  const table = new Int32Array(mask + 1).fill(-1)
  const equal = (r: number, other: number): boolean => {
    for (let k = 0; k < stride; k++) if (bytes[r * stride + k] !== bytes[other * stride + k]) return false
    return true
  }
  return Uint32Array.from({ length: rows }, (_, r) => {
    let hash = 0x811c9dc5
    for (let k = r * stride; k < (r + 1) * stride; k++) hash = Math.imul(hash ^ bytes[k]!, 0x01000193)
    let slot = (hash ^ (hash >>> 15)) & mask
    while (table[slot] !== -1 && !equal(r, table[slot]!)) slot = (slot + 1) & mask
    if (table[slot] === -1) table[slot] = r
    return table[slot]!
  })
}

/** Equal rows merged, their counts added, in order of first appearance. */
export function mergeRows(samples: Samples): Samples {
  const { width, rows, bytes, counts } = samples
  const stride = strideOf(width)
  const first = firstEqualRows(samples)
  const kept = first.filter((f, r) => f === r)
  const placeOf = new Uint32Array(rows)
  const mergedBytes = new Uint8Array(kept.length * stride)
  const mergedCounts = new Uint32Array(kept.length)
  kept.forEach((r, place) => {
    placeOf[r] = place
    mergedBytes.set(bytes.subarray(r * stride, (r + 1) * stride), place * stride)
  })
  first.forEach((f, r) => (mergedCounts[placeOf[f]!]! += counts[r]!))
  return { width, rows: kept.length, bytes: mergedBytes, counts: mergedCounts }
}
