import type { Terms } from '../problem/build'
import { ReadingFault } from './format'

const DEFAULTS = { capacity: 16_384 }

function grown<T extends Uint32Array | Float64Array>(from: T, to: T): T {
  to.set(from)
  return to
}

/** 512 MiB of entries, enough for every cell of the largest dense matrix; putting them in order takes as much again, twice. */
const MOST_ENTRIES = 2 ** 25

/** Entries gathered one by one, in typed arrays that grow fourfold when they are full. */
export class Entries {
  count = 0
  private rows = new Uint32Array(DEFAULTS.capacity)
  private cols = new Uint32Array(DEFAULTS.capacity)
  private weights = new Float64Array(DEFAULTS.capacity)

  /** @throws ReadingFault when there are too many to be held */
  add(row: number, col: number, value: number): void {
    if (this.count === this.weights.length) this.grow()
    this.rows[this.count] = row
    this.cols[this.count] = col
    this.weights[this.count++] = value
  }

  /** The entries so far, not copied. */
  terms(): Terms & { readonly rows: Uint32Array; readonly cols: Uint32Array; readonly values: Float64Array } {
    return {
      rows: this.rows.subarray(0, this.count),
      cols: this.cols.subarray(0, this.count),
      values: this.weights.subarray(0, this.count),
    }
  }

  private grow(): void {
    if (this.count >= MOST_ENTRIES)
      throw new ReadingFault(`the file has more than the ${MOST_ENTRIES} entries that are taken here`)
    const capacity = Math.min(4 * this.count, MOST_ENTRIES)
    this.rows = grown(this.rows, new Uint32Array(capacity))
    this.cols = grown(this.cols, new Uint32Array(capacity))
    this.weights = grown(this.weights, new Float64Array(capacity))
  }
}
