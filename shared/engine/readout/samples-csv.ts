import { strideOf } from '../sampling/samples'
import type { Samples } from '../sampling/samples'
import { readHeader, tokensOf } from './samples-csv-header'
import type { Header } from './samples-csv-header'

export type ValueSet = '±1' | '0/1'

export interface CsvIssue {
  /** Line of the text, from 1. */
  readonly line?: number
  readonly message: string
}

export interface SamplesCsv {
  /** In the order of the asked qubits; null when anything was refused. */
  readonly samples: Samples | null
  readonly issues: readonly CsvIssue[]
  /** Rows that were refused; the first ones are listed in `issues`. */
  readonly rejectedCount: number
  /** How spins are written; '±1' where only 1 occurs. */
  readonly valueSet: ValueSet
  /** Whether there is a column `count`; without it every row is one read. */
  readonly countColumn: boolean
  /** Column `energy`, per row. */
  readonly energyColumn: Float64Array | null
  /** Column `gauge`, per row. */
  readonly gaugeColumn: Uint32Array | null
}

const DEFAULTS = { listedIssues: 20, greatestCount: 2 ** 32 - 1 }
const LINE_FEED = 10
const CARRIAGE_RETURN = 13
const SPACE = 32
const MINUS = 45
const ZERO = 48
const ONE = 49

/** One row as a range of the text. */
interface Row {
  readonly text: string
  readonly start: number
  readonly end: number
  /** Character code between columns. */
  readonly separator: number
  readonly line: number
}

/** What the rows are written to while they are read. */
interface Sink {
  readonly bytes: Uint8Array
  readonly counts: Uint32Array
  readonly energies: Float64Array
  readonly gauges: Uint32Array
  rows: number
  rejectedCount: number
  readonly issues: CsvIssue[]
  firstZeroLine: number
  firstMinusLine: number
}

function reject(sink: Sink, line: number, message: string): void {
  sink.rejectedCount++
  if (sink.issues.length < DEFAULTS.listedIssues) sink.issues.push({ line, message })
}

/** A spin written in full, such as "1.0" or "\"-1\"": 1, 0, −1, or NaN for anything else. */
function spelledOut(token: string): number {
  const value = token === '' ? NaN : Number(token)
  return value === 1 || value === 0 || value === -1 ? value + 0 : NaN
}

/**
 * The plain row: spins in one or two characters, one separator character between columns. Returns false for anything
 * else, and the careful reader then takes the row.
 */
function readPlainRow(row: Row, header: Header, sink: Sink): boolean {
  const { text, start, end, separator, line } = row
  const { target } = header
  const base = sink.rows * strideOf(header.width)
  const extras: string[] = []
  let at = start
  let zero = false
  let minus = false
  sink.bytes.fill(0, base, base + strideOf(header.width))
  for (let column = 0; column < target.length; column++) {
    const place = target[column]!
    if (header.separator === '') while (text.charCodeAt(at) === SPACE) at++
    const code = text.charCodeAt(at)
    if (place < 0) {
      const from = at
      while (at < end && text.charCodeAt(at) !== separator) at++
      extras[column] = text.slice(from, at)
    } else if (code === ONE || code === ZERO) {
      if (code === ONE) sink.bytes[base + (place >> 3)]! |= 1 << (place & 7)
      else zero = true
      at++
    } else if (code === MINUS && text.charCodeAt(at + 1) === ONE) {
      minus = true
      at += 2
    } else return false
    if (column + 1 < target.length && text.charCodeAt(at++) !== separator) return false
  }
  if (at !== end || readExtras(extras, header, sink)) return false
  noteValues(sink, zero, minus, line)
  sink.rows++
  return true
}

function noteValues(sink: Sink, zero: boolean, minus: boolean, line: number): void {
  if (zero && sink.firstZeroLine === 0) sink.firstZeroLine = line
  if (minus && sink.firstMinusLine === 0) sink.firstMinusLine = line
}

/** Reads the columns beside the spins; a message when one is not a number of its kind. */
function readExtras(tokens: readonly string[], header: Header, sink: Sink): string | null {
  const { countAt, energyAt, gaugeAt } = header
  const count = countAt < 0 ? 1 : Number(tokens[countAt] || NaN)
  if (!(Number.isInteger(count) && count >= 1 && count <= DEFAULTS.greatestCount))
    return `count must be a whole number from 1, not "${tokens[countAt]}"`
  const energy = energyAt < 0 ? 0 : Number(tokens[energyAt] || NaN)
  if (!Number.isFinite(energy)) return `energy must be a number, not "${tokens[energyAt]}"`
  const gauge = gaugeAt < 0 ? 0 : Number(tokens[gaugeAt] || NaN)
  if (!(Number.isInteger(gauge) && gauge >= 0 && gauge <= DEFAULTS.greatestCount))
    return `gauge must be a whole number from 0, not "${tokens[gaugeAt]}"`
  sink.counts[sink.rows] = count
  sink.energies[sink.rows] = energy
  sink.gauges[sink.rows] = gauge
  return null
}

function readCarefully(row: string, header: Header, sink: Sink, line: number): void {
  const tokens = tokensOf(row, header.separator)
  const { target } = header
  if (tokens.length !== target.length)
    return reject(sink, line, `the row has ${tokens.length} of ${target.length} values`)
  const problem = readExtras(tokens, header, sink)
  if (problem) return reject(sink, line, problem)
  const base = sink.rows * strideOf(header.width)
  sink.bytes.fill(0, base, base + strideOf(header.width))
  let zero = false
  let minus = false
  for (let column = 0; column < tokens.length; column++) {
    const place = target[column]!
    if (place < 0) continue
    const value = spelledOut(tokens[column]!)
    if (Number.isNaN(value))
      return reject(sink, line, `"${tokens[column]}" for qubit ${header.names[column]} is neither ±1 nor 0/1`)
    if (value === 1) sink.bytes[base + (place >> 3)]! |= 1 << (place & 7)
    else if (value === 0) zero = true
    else minus = true
  }
  noteValues(sink, zero, minus, line)
  sink.rows++
}

/** All rows after the header. */
function readRows(text: string, from: number, header: Header, sink: Sink): void {
  const separator = header.separator.length === 1 ? header.separator.charCodeAt(0) : SPACE
  let line = header.line
  for (let start = from; start < text.length;) {
    line++
    const feed = text.indexOf('\n', start)
    const next = feed < 0 ? text.length : feed + 1
    let end = feed < 0 ? text.length : feed
    if (end > start && text.charCodeAt(end - 1) === CARRIAGE_RETURN) end--
    if (!readPlainRow({ text, start, end, separator, line }, header, sink)) {
      const row = text.slice(start, end).trim()
      if (row !== '' && !row.startsWith('#')) readCarefully(row, header, sink, line)
    }
    start = next
  }
}

function countLines(text: string, from: number): number {
  let lines = 1
  for (let at = from; at < text.length; at++) if (text.charCodeAt(at) === LINE_FEED) lines++
  return lines
}

const refusal = (issues: readonly CsvIssue[]): SamplesCsv => ({
  samples: null,
  issues,
  rejectedCount: 0,
  valueSet: '±1',
  countColumn: false,
  energyColumn: null,
  gaugeColumn: null,
})

/**
 * Reads returned samples: a header of qubit numbers in any order, with optional columns `count`, `energy` and `gauge`;
 * then one row per read (or per distinct row with its count). Separators: comma, semicolon, tab or blanks, as in the
 * header; CRLF and a byte-order mark are taken; empty lines and lines from `#` are skipped. Spins are all ±1 or all 0/1.
 * Nothing is repaired: any unknown, missing or repeated qubit, any row of another length, any value outside the set, or a
 * mixture of both sets refuses the text, with the lines named.
 * @param options.qubitIds published numbers of the run sheet's qubits, in the order of `programmed.qubits`
 */
export function readSamplesCsv(text: string, options: { readonly qubitIds: readonly number[] }): SamplesCsv {
  const { header, bodyStart, issues } = readHeader(text, options.qubitIds)
  if (!header) return refusal(issues)
  const width = options.qubitIds.length
  const capacity = countLines(text, bodyStart)
  const sink: Sink = {
    bytes: new Uint8Array(capacity * strideOf(width)),
    counts: new Uint32Array(capacity),
    energies: new Float64Array(header.energyAt < 0 ? 0 : capacity),
    gauges: new Uint32Array(header.gaugeAt < 0 ? 0 : capacity),
    rows: 0,
    rejectedCount: 0,
    issues: [],
    firstZeroLine: 0,
    firstMinusLine: 0,
  }
  readRows(text, bodyStart, header, sink)
  const mixed = sink.firstZeroLine > 0 && sink.firstMinusLine > 0
  if (mixed)
    sink.issues.unshift({
      message: `0 in line ${sink.firstZeroLine} and -1 in line ${sink.firstMinusLine}: write all spins as ±1 or all as 0/1`,
    })
  if (sink.rows === 0 && sink.rejectedCount === 0) sink.issues.push({ message: 'there is no row of samples' })
  const accepted = sink.issues.length === 0
  return {
    samples: accepted
      ? {
          width,
          rows: sink.rows,
          bytes: sink.bytes.slice(0, sink.rows * strideOf(width)),
          counts: sink.counts.slice(0, sink.rows),
        }
      : null,
    issues: sink.issues,
    rejectedCount: sink.rejectedCount,
    valueSet: sink.firstZeroLine > 0 ? '0/1' : '±1',
    countColumn: header.countAt >= 0,
    energyColumn: accepted && header.energyAt >= 0 ? sink.energies.slice(0, sink.rows) : null,
    gaugeColumn: accepted && header.gaugeAt >= 0 ? sink.gauges.slice(0, sink.rows) : null,
  }
}

/** The text of every byte of eight spins, lowest bit first. */
const spinTexts = (): string[] =>
  Array.from({ length: 256 }, (_, byte) =>
    Array.from({ length: 8 }, (_unused, bit) => ((byte >> bit) & 1 ? '1,' : '-1,')).join(''),
  )

/**
 * Writes samples as `readSamplesCsv` reads them: comma-separated ±1 with a header of qubit numbers and a last column
 * `count`.
 * @throws RangeError when there are not as many numbers as qubits
 */
export function writeSamplesCsv(samples: Samples, qubitIds: readonly number[]): string {
  const { width, rows, bytes, counts } = samples
  if (qubitIds.length !== width) throw new RangeError(`${qubitIds.length} qubit numbers for samples of width ${width}`)
  const stride = strideOf(width)
  const texts = spinTexts()
  const lines = [[...qubitIds, 'count'].join(',')]
  for (let r = 0; r < rows; r++) {
    let line = ''
    for (let k = 0; k < width >> 3; k++) line += texts[bytes[r * stride + k]!]!
    for (let c = width & ~7; c < width; c++) line += (bytes[r * stride + (c >> 3)]! >> (c & 7)) & 1 ? '1,' : '-1,'
    lines.push(line + counts[r]!)
  }
  return lines.join('\n') + '\n'
}
