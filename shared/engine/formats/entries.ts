import type { Terms } from '../problem/build'

const DEFAULTS = { capacity: 16_384 }

function grown<T extends Uint32Array | Float64Array>(from: T, to: T): T {
  to.set(from)
  return to
}

/** Entries gathered one by one, in typed arrays that grow fourfold when they are full. */
export class Entries {
  count = 0
  private rows = new Uint32Array(DEFAULTS.capacity)
  private cols = new Uint32Array(DEFAULTS.capacity)
  private weights = new Float64Array(DEFAULTS.capacity)

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
    const capacity = 4 * this.count
    this.rows = grown(this.rows, new Uint32Array(capacity))
    this.cols = grown(this.cols, new Uint32Array(capacity))
    this.weights = grown(this.weights, new Float64Array(capacity))
  }
}
