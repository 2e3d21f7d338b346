import type { LedgerRow } from './types'

/** What several chains come to together; null where none of them has the figure. */
export interface LedgerSums {
  readonly chains: number
  readonly qubits: number
  readonly meanLength: number | null
  readonly longest: number
  /** Couplers to other chains; one between two of these chains counts for both. */
  readonly couplers: number
  /** Broken chain reads over all reads of chains of two or more qubits: a single one cannot break. */
  readonly breakRate: number | null
  /** Fullest coupling sum, as a share of the range. */
  readonly fullest: number | null
}

export function sumsOf(rows: readonly LedgerRow[]): LedgerSums {
  const total = (valueOf: (row: LedgerRow) => number) => rows.reduce((sum, row) => sum + valueOf(row), 0)
  const greatest = (valueOf: (row: LedgerRow) => number) => rows.reduce((most, row) => Math.max(most, valueOf(row)), 0)
  const qubits = total((row) => row.qubits)
  const reads = total((row) => (row.qubits > 1 ? (row.breaks?.reads ?? 0) : 0))
  return {
    chains: rows.length,
    qubits,
    meanLength: rows.length ? qubits / rows.length : null,
    longest: greatest((row) => row.qubits),
    couplers: total((row) => row.couplers),
    breakRate: reads ? total((row) => row.breaks?.count ?? 0) / reads : null,
    fullest: rows.some((row) => row.load) ? greatest((row) => row.load?.sum ?? 0) : null,
  }
}
