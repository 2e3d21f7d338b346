import { ReadingFault } from '../../formats/format'
import { strideOf } from '../../sampling/samples'
import type { SampleRows } from '../../sampling/samples'
import { SAMPLES_LIMITS } from './reading'
import type { SamplesIssue, ValueSet } from './reading'

const FIRST_ROWS = 1024

function grown<T extends Uint8Array | Uint32Array | Float64Array>(array: T, length: number): T {
  const larger = new (array.constructor as new (length: number) => T)(length)
  larger.set(array)
  return larger
}

/** Rows as they are read, bit-packed, in memory that grows with them. */
export class RowSink {
  readonly stride: number
  bytes: Uint8Array
  counts: Uint32Array
  energies: Float64Array
  gauges: Uint32Array
  rows = 0
  rejectedCount = 0
  readonly issues: SamplesIssue[] = []
  private capacity = 0
  private firstZero: string | null = null
  private firstMinus: string | null = null

  /** @param rows as many as are expected, where it is known */
  constructor(
    readonly width: number,
    rows = FIRST_ROWS,
  ) {
    this.stride = strideOf(width)
    this.bytes = new Uint8Array(0)
    this.counts = new Uint32Array(0)
    this.energies = new Float64Array(0)
    this.gauges = new Uint32Array(0)
    this.grow(rows)
  }

  /** Makes room for the next row and answers where its bytes begin, all spins down. @throws ReadingFault beyond the limits */
  begin(): number {
    if (this.rows === this.capacity) this.grow(2 * this.capacity)
    const base = this.rows * this.stride
    this.bytes.fill(0, base, base + this.stride)
    return base
  }

  private grow(rows: number): void {
    const most = Math.min(SAMPLES_LIMITS.rows, Math.floor(SAMPLES_LIMITS.packedBytes / Math.max(1, this.stride)))
    if (rows > most && this.rows >= most)
      throw new ReadingFault(`more than ${most} rows of ${this.width} qubits are not taken: send them in several files`)
    this.capacity = Math.min(rows, most)
    this.bytes = grown(this.bytes, this.capacity * this.stride)
    this.counts = grown(this.counts, this.capacity)
    this.energies = grown(this.energies, this.capacity)
    this.gauges = grown(this.gauges, this.capacity)
  }

  /** Ends the row that was begun. `where` names it: a line, or a row of an array. */
  end(extras: { count: number; energy: number; gauge: number }, zero: boolean, minus: boolean, where: string): void {
    this.counts[this.rows] = extras.count
    this.energies[this.rows] = extras.energy
    this.gauges[this.rows] = extras.gauge
    this.note(zero, minus, where)
    this.rows++
  }

  /** Notes which of the values 0 and −1 a row has. */
  note(zero: boolean, minus: boolean, where: string): void {
    if (zero) this.firstZero ??= where
    if (minus) this.firstMinus ??= where
  }

  reject(message: string, line?: number): void {
    this.rejectedCount++
    if (this.issues.length < SAMPLES_LIMITS.listedIssues) this.issues.push({ ...(line ? { line } : {}), message })
  }

  get valueSet(): ValueSet {
    return this.firstZero ? '0/1' : '±1'
  }

  /** The rows, or null with the reasons in `issues`. */
  finish(has: { energies: boolean; gauges: boolean }): SampleRows | null {
    if (this.firstZero && this.firstMinus)
      this.issues.unshift({
        message: `0 in ${this.firstZero} and -1 in ${this.firstMinus}: write all spins as ±1 or all as 0/1`,
      })
    if (this.rows === 0 && this.rejectedCount === 0) this.issues.push({ message: 'there is no row of samples' })
    if (this.issues.length > 0) return null
    const { width, rows } = this
    return {
      width,
      rows,
      bytes: this.bytes.slice(0, rows * this.stride),
      counts: this.counts.slice(0, rows),
      energies: has.energies ? this.energies.slice(0, rows) : null,
      gauges: has.gauges ? this.gauges.slice(0, rows) : null,
    }
  }
}
