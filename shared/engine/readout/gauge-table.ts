import type { Mean } from './mean'
import { meanOf } from './mean'

export interface GaugeInput {
  /** Gauge of each row, as numbered where the samples come from. */
  readonly gauges: Uint32Array
  /** Reads of each row. */
  readonly counts: Uint32Array
  /** Broken chains of each row. */
  readonly brokenChains: ArrayLike<number>
  /** Chains of two or more qubits. */
  readonly chains: number
  /** Decoded energies; NaN for a row that the decoding drops. */
  readonly energies: Float64Array
  /** 1 for each row that reaches the reference; null where there is none. */
  readonly hits: Uint8Array | null
}

export interface GaugeRow {
  readonly gauge: number
  readonly reads: number
  readonly readsWithBreak: number
  /** Chain breaks among `chainReads`. */
  readonly breaks: number
  readonly chainReads: number
  /** Of the reads kept; null where none is. */
  readonly energy: Mean | null
  readonly successes: number | null
  /** The rows of the samples that were read under this gauge, ascending. */
  readonly rows: Uint32Array
}

function rowOf(input: GaugeInput, gauge: number, rows: Uint32Array): GaugeRow {
  const { counts, brokenChains, chains, energies, hits } = input
  const sum = (value: (row: number) => number): number => rows.reduce((total, r) => total + counts[r]! * value(r), 0)
  const kept = rows.filter((r) => !Number.isNaN(energies[r]!) && counts[r]! > 0)
  const reads = sum(() => 1)
  return {
    gauge,
    reads,
    readsWithBreak: sum((r) => (brokenChains[r]! > 0 ? 1 : 0)),
    breaks: sum((r) => brokenChains[r]!),
    chainReads: reads * chains,
    energy:
      kept.length > 0
        ? meanOf(
            Float64Array.from(kept, (r) => energies[r]!),
            Uint32Array.from(kept, (r) => counts[r]!),
          )
        : null,
    successes: hits ? sum((r) => hits[r]!) : null,
    rows,
  }
}

/** What was read under each gauge, in order of their numbers. */
export function gaugeTable(input: GaugeInput): GaugeRow[] {
  const rowsOf = new Map<number, number[]>()
  input.gauges.forEach((gauge, row) => {
    const rows = rowsOf.get(gauge)
    if (rows) rows.push(row)
    else rowsOf.set(gauge, [row])
  })
  return [...rowsOf.keys()]
    .sort((a, b) => a - b)
    .map((gauge) => rowOf(input, gauge, Uint32Array.from(rowsOf.get(gauge)!)))
}
