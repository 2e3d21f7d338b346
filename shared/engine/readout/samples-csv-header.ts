/** The header of a samples file, understood. */
export interface Header {
  /** ',' ';' tab, or '' for runs of blanks. */
  readonly separator: string
  /** Names as written, one per column. */
  readonly names: readonly string[]
  /** Place of each column's qubit among the asked ones; −1 for a column that is no qubit. */
  readonly target: Int32Array
  /** Number of asked qubits. */
  readonly width: number
  /** Columns beside the qubits, −1 where there is none. */
  readonly countAt: number
  readonly energyAt: number
  readonly gaugeAt: number
  /** Its line, from 1. */
  readonly line: number
}

export interface HeaderResult {
  readonly header: Header | null
  /** Where the text after the header begins. */
  readonly bodyStart: number
  readonly issues: readonly { readonly line?: number; readonly message: string }[]
}

const DEFAULTS = { listedQubits: 8 }
const EXTRA_COLUMNS: readonly string[] = ['count', 'energy', 'gauge']

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

/** "3 of them: 4, 7, 9", at most the first few listed. */
function listed(names: readonly (string | number)[]): string {
  const shown = names.slice(0, DEFAULTS.listedQubits).join(', ')
  return names.length > DEFAULTS.listedQubits ? `${shown}, … (${names.length} in all)` : shown
}

function checkColumns(names: readonly string[], qubitIds: readonly number[], target: Int32Array): string[] {
  const messages: string[] = []
  const unreadable = names.filter((name) => !/^\d+$/.test(name) && !EXTRA_COLUMNS.includes(name.toLowerCase()))
  if (unreadable.length > 0)
    messages.push(
      `columns that are neither a qubit number nor count, energy or gauge: ${listed(unreadable.map((n) => `"${n}"`))}`,
    )
  const unknown = names.filter((name, column) => /^\d+$/.test(name) && target[column]! < 0)
  if (unknown.length > 0) messages.push(`qubits that the run sheet does not use: ${listed(unknown)}`)
  const keys = names.map((name) => (/^\d+$/.test(name) ? String(Number(name)) : name.toLowerCase()))
  const seen = new Set<string>()
  const repeated = keys.filter((key) => seen.size === seen.add(key).size)
  if (repeated.length > 0) messages.push(`columns that occur twice: ${listed([...new Set(repeated)])}`)
  const present = new Set(target)
  const missing = qubitIds.filter((_, place) => !present.has(place))
  if (missing.length > 0) messages.push(`qubits of the run sheet that are missing: ${listed(missing)}`)
  return messages
}

/** Finds and reads the header: the first line that is neither empty nor begins with `#`. */
export function readHeader(text: string, qubitIds: readonly number[]): HeaderResult {
  let start = text.charCodeAt(0) === 0xfeff ? 1 : 0
  for (let line = 1; start < text.length; line++) {
    const feed = text.indexOf('\n', start)
    const bodyStart = feed < 0 ? text.length : feed + 1
    const row = text.slice(start, bodyStart).trim()
    start = bodyStart
    if (row === '' || row.startsWith('#')) continue
    const separator = separatorOf(row)
    const names = tokensOf(row, separator)
    const placeOf = new Map(qubitIds.map((id, place) => [id, place]))
    const target = Int32Array.from(names, (name) => (/^\d+$/.test(name) ? (placeOf.get(Number(name)) ?? -1) : -1))
    const messages = checkColumns(names, qubitIds, target)
    if (messages.length > 0) return { header: null, bodyStart, issues: messages.map((message) => ({ line, message })) }
    const [countAt, energyAt, gaugeAt] = EXTRA_COLUMNS.map((extra) =>
      names.findIndex((name) => name.toLowerCase() === extra),
    )
    const header = {
      separator,
      names,
      target,
      width: qubitIds.length,
      line,
      countAt: countAt!,
      energyAt: energyAt!,
      gaugeAt: gaugeAt!,
    }
    return { header, bodyStart, issues: [] }
  }
  return { header: null, bodyStart: start, issues: [{ message: 'the text is empty' }] }
}
