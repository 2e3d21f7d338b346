import type { Defects } from './fabric'

/** An entry of a typed list that could not be read; `line` counts from 1. */
export interface RejectedEntry {
  readonly line: number
  readonly text: string
  readonly reason: string
}

export interface ParsedDefects {
  readonly qubits: number[]
  readonly couplers: [number, number][]
  readonly rejected: RejectedEntry[]
}

const LARGEST_NUMBER = 0xffffffff
const ENTRIES_PER_LINE = 12

/** Hyphen, en dash, em dash and minus sign between two numbers, with or without blanks around. */
const DASH = /(?<=\d)\s*[-\u2013\u2014\u2212]\s*(?=\d)/g

function readEntry(entry: string, line: number, into: ParsedDefects): void {
  const reject = (reason: string): void => void into.rejected.push({ line, text: entry, reason })
  if (!/^\d+(-\d+)*$/.test(entry)) return reject('neither a qubit number nor a coupler such as 17-42')
  const numbers = entry.split('-').map(Number)
  if (numbers.some((number) => number > LARGEST_NUMBER)) return reject(`qubit numbers end at ${LARGEST_NUMBER}`)
  const [a, b] = numbers
  if (numbers.length > 2) return reject('a coupler joins two qubits; ranges of qubits are not understood')
  if (b === undefined) into.qubits.push(a!)
  else if (a === b) reject('a coupler joins two different qubits')
  else into.couplers.push([a!, b])
}

/**
 * Reads a list of missing qubits and couplers as people type or paste it. Entries stand apart by commas, semicolons,
 * blanks or line ends: `17` is a qubit, `17-42` (any dash) the coupler between two; `#` opens a comment. The order and
 * repeats are kept; whether the numbers exist is for `defectIssues` to say.
 */
export function parseDefectText(text: string): ParsedDefects {
  const parsed: ParsedDefects = { qubits: [], couplers: [], rejected: [] }
  text.split(/\r\n|\r|\n/).forEach((raw, k) => {
    const entries = raw
      .replace(/#.*$/, '')
      .replace(DASH, '-')
      .split(/[\s,;]+/)
    for (const entry of entries) if (entry !== '') readEntry(entry, k + 1, parsed)
  })
  return parsed
}

function inLines(entries: readonly string[]): string[] {
  const lines: string[] = []
  for (let k = 0; k < entries.length; k += ENTRIES_PER_LINE)
    lines.push(entries.slice(k, k + ENTRIES_PER_LINE).join(', '))
  return lines
}

/** Writes a defect list so that `parseDefectText` reads it back: qubits, then couplers, twelve to a line. */
export function formatDefectText(defects: Defects): string {
  return [...inLines(defects.qubits.map(String)), ...inLines(defects.couplers.map(([a, b]) => `${a}-${b}`))].join('\n')
}
