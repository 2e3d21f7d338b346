import type { ReadingControl } from '../../formats/format'
import type { SampleRows } from '../../sampling/samples'

export type SamplesFormat = 'csv' | 'npy' | 'npz' | 'json'

/** How spins are written; `±1` where only 1 occurs. */
export type ValueSet = '±1' | '0/1'

export interface SamplesIssue {
  /** Line of the text, from 1. */
  readonly line?: number
  readonly message: string
}

/** What a reader is told about the columns. */
export interface Columns {
  /** Published numbers of the run sheet's qubits, in the order of `programmed.qubits`: ascending, as in the bundle. */
  readonly qubitIds: readonly number[]
  /** Published numbers column by column, for files that do not say them; null: as in the bundle. */
  readonly order: readonly number[] | null
}

/** What a format makes of the bytes. */
export interface RowsRead {
  /** In the order of the asked qubits; null when anything was refused. */
  readonly rows: SampleRows | null
  readonly issues: readonly SamplesIssue[]
  /** Rows that were refused; the first ones are listed in `issues`. */
  readonly rejectedCount: number
  readonly valueSet: ValueSet
  /** Where the order of the columns comes from. */
  readonly columnsFrom: 'file' | 'given' | 'bundle'
  /** Whether the file said how often each row was read. */
  readonly hasCounts: boolean
  /** Machine time of all reads, where the file says it. */
  readonly machineTimeSeconds: number | null
}

export interface SamplesReading extends RowsRead {
  readonly format: SamplesFormat
  readonly container: 'gzip' | null
  /** False when the bytes could not be read to their end as that format. */
  readonly isReadToEnd: boolean
}

export interface ReadSamplesOptions extends Columns {
  /** The format, where it is not to be detected. */
  readonly format?: SamplesFormat
  readonly control?: ReadingControl
}

/** Rows and bytes that one file may hold; issues that are listed. */
export const SAMPLES_LIMITS = {
  rows: 2_000_000,
  packedBytes: 256 * 2 ** 20,
  listedIssues: 20,
  greatestCount: 2 ** 32 - 1,
}
