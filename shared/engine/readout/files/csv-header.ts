import { columnFaults, listed, orderedColumns, placesOf } from './columns'
import type { Columns } from './reading'

/** The columns of a table of samples, understood. */
export interface Header {
  /** ',' ';' tab, or '' for runs of blanks. */
  readonly separator: string
  /** Names as written, or the qubit numbers of the order that was given, one per column. */
  readonly names: readonly string[]
  /** Place of each column's qubit among the asked ones; −1 for a column that is no qubit. */
  readonly target: Int32Array
  /** Number of asked qubits. */
  readonly width: number
  /** Columns beside the qubits, −1 where there is none. */
  readonly countAt: number
  readonly energyAt: number
  readonly gaugeAt: number
  /** False where the first row holds spins already. */
  readonly isInFile: boolean
  readonly from: 'file' | 'given' | 'bundle'
}

export type HeaderResult =
  { readonly header: Header; readonly faults: null } | { readonly header: null; readonly faults: string[] }

const EXTRA_COLUMNS: readonly string[] = ['count', 'energy', 'gauge']
const isNumber = (name: string): boolean => /^\d{1,15}$/.test(name)

/** Values of a trimmed row, without blanks and double quotes around them. */
export function tokensOf(row: string, separator: string): string[] {
  const tokens = separator === '' ? row.split(/\s+/) : row.split(separator)
  return tokens.map((token) =>
    token
      .trim()
      .replace(/^"(.*)"$/, '$1')
      .trim(),
  )
}

const separatorOf = (row: string): string => [',', ';', '\t'].find((separator) => row.includes(separator)) ?? ''

function namesFaults(names: readonly string[], columns: Columns): string[] {
  const faults: string[] = []
  const unreadable = names.filter((name) => !isNumber(name) && !EXTRA_COLUMNS.includes(name.toLowerCase()))
  if (unreadable.length > 0)
    faults.push(
      `columns that are neither a qubit number nor count, energy or gauge: ${listed(unreadable.map((n) => `"${n}"`))}`,
    )
  const extras = names.filter((name) => !isNumber(name)).map((name) => name.toLowerCase())
  const repeated = extras.filter((name, k) => extras.indexOf(name) < k)
  if (repeated.length > 0) faults.push(`columns that occur twice: ${listed([...new Set(repeated)])}`)
  return [...faults, ...columnFaults(names.filter(isNumber).map(Number), columns)]
}

/** A first row of spins alone, which an order of qubits was given for. */
function headless(names: readonly string[], separator: string, columns: Columns): Header | null {
  const isSpins = names.every((name) => [1, 0, -1].includes(name === '' ? Number.NaN : Number(name)))
  if (!columns.order || !isSpins) return null
  const { target, from } = orderedColumns(columns)
  const common = { separator, target, from, width: columns.qubitIds.length, isInFile: false }
  return { ...common, names: columns.order.map(String), countAt: -1, energyAt: -1, gaugeAt: -1 }
}

/**
 * Reads the first row of a table.
 * @param row trimmed
 * @throws ReadingFault for an order of qubits that does not fit the run sheet
 */
export function readHeader(row: string, columns: Columns): HeaderResult {
  const separator = separatorOf(row)
  const names = tokensOf(row, separator)
  const without = headless(names, separator, columns)
  if (without) return { header: without, faults: null }
  const faults = namesFaults(names, columns)
  if (faults.length > 0) return { header: null, faults }
  const numbers = names.map((name) => (isNumber(name) ? Number(name) : -1))
  const [countAt, energyAt, gaugeAt] = EXTRA_COLUMNS.map((extra) =>
    names.findIndex((name) => name.toLowerCase() === extra),
  )
  const header: Header = {
    separator,
    names,
    target: placesOf(numbers, columns),
    width: columns.qubitIds.length,
    countAt: countAt!,
    energyAt: energyAt!,
    gaugeAt: gaugeAt!,
    isInFile: true,
    from: 'file',
  }
  return { header, faults: null }
}
