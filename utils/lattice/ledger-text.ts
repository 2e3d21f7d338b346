import type { LedgerRow } from './types'

/** Heading and value of every column of a file, with the unit in the heading. */
const FIELDS: readonly (readonly [heading: string, read: (row: LedgerRow) => string | number | null | undefined])[] = [
  ['variable', (row) => row.label],
  ['chain length (qubits)', (row) => row.qubits],
  ['couplers to other chains (count)', (row) => row.couplers],
  ['chain strength k (units of the problem)', (row) => row.strength],
  ['cut bound (units of the problem)', (row) => row.bound],
  [
    'cut bound is exact (1 yes; 0 upper estimate)',
    (row) => (row.bound == null ? null : Number(row.boundExact ?? true)),
  ],
  ['break rate (share of reads)', (row) => row.breaks?.rate],
  ['break rate low (95 % interval)', (row) => row.breaks?.low],
  ['break rate high (95 % interval)', (row) => row.breaks?.high],
  ['broken reads (count)', (row) => row.breaks?.count],
  ['reads (count)', (row) => row.breaks?.reads],
  ['largest h (programmed)', (row) => row.load?.field],
  ['largest J (programmed)', (row) => row.load?.coupling],
  ['fullest coupling sum (share of range)', (row) => row.load?.sum],
]

/** All columns of all lenses as comma-separated values; columns without a single value are left out. */
export const rowsToCsv = (rows: readonly LedgerRow[]): string => written(rows, ',')

/** The same set apart by tabs, as a spreadsheet takes it from the clipboard. */
export const rowsToTabs = (rows: readonly LedgerRow[]): string => written(rows, '\t')

function written(rows: readonly LedgerRow[], separator: string): string {
  const fields = FIELDS.filter(([, read]) => rows.some((row) => read(row) != null))
  const lines = [
    fields.map(([heading]) => heading),
    ...rows.map((row) => fields.map(([, read]) => String(read(row) ?? ''))),
  ]
  return lines.map((line) => `${line.map((text) => quoted(text, separator)).join(separator)}\n`).join('')
}

const quoted = (text: string, separator: string): string =>
  text.includes(separator) || /["\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text
