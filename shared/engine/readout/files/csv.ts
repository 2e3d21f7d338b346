import { ReadingFault } from '../../formats/format'
import { readHeader, tokensOf } from './csv-header'
import type { Header } from './csv-header'
import { byteLines } from './lines'
import type { ByteLine } from './lines'
import { SAMPLES_LIMITS } from './reading'
import type { Columns, RowsRead } from './reading'
import { RowSink } from './row-sink'

const SPACE = 32
const HASH = 35
const MINUS = 45
const ZERO = 48
const ONE = 49
/** A longer number beside the spins is left to the careful reader. */
const LONGEST_PLAIN = 40
const BYTE_ORDER_MARK = [0xef, 0xbb, 0xbf]

const utf8 = new TextDecoder('utf-8', { fatal: true })

function textOf({ bytes, start, end, number }: ByteLine): string {
  try {
    return utf8.decode(bytes.subarray(start, end)).trim()
  } catch {
    throw new ReadingFault('the file is not UTF-8 text: save it as UTF-8', number)
  }
}

/** A spin written in full, such as "1.0" or "-1e0": 1, 0, −1, or NaN for anything else. */
function spelledOut(token: string): number {
  const value = token === '' ? Number.NaN : Number(token)
  return value === 1 || value === 0 || value === -1 ? value + 0 : Number.NaN
}

/** Columns beside the spins, or why one is not a number of its kind. */
function extrasOf(
  tokens: readonly string[],
  { countAt, energyAt, gaugeAt }: Header,
): { count: number; energy: number; gauge: number } | string {
  const count = countAt < 0 ? 1 : Number(tokens[countAt] || Number.NaN)
  if (!(Number.isInteger(count) && count >= 1 && count <= SAMPLES_LIMITS.greatestCount))
    return `count must be a whole number from 1, not "${tokens[countAt]}"`
  const energy = energyAt < 0 ? 0 : Number(tokens[energyAt] || Number.NaN)
  if (!Number.isFinite(energy)) return `energy must be a number, not "${tokens[energyAt]}"`
  const gauge = gaugeAt < 0 ? 0 : Number(tokens[gaugeAt] || Number.NaN)
  if (!(Number.isInteger(gauge) && gauge >= 0 && gauge <= SAMPLES_LIMITS.greatestCount))
    return `gauge must be a whole number from 0, as in the bundle, not "${tokens[gaugeAt]}"`
  return { count, energy, gauge }
}

/**
 * The plain row: spins in one or two characters, one separator character between columns. Returns false for anything
 * else, and the careful reader then takes the row.
 */
function readPlainRow(line: ByteLine, header: Header, separator: number, sink: RowSink): boolean {
  const { bytes, start, end } = line
  const { target } = header
  const base = sink.begin()
  const packed = sink.bytes
  const extras: string[] = []
  const last = target.length - 1
  let at = start
  let zero = false
  let minus = false
  for (let column = 0; column <= last; column++) {
    const place = target[column]!
    if (header.separator === '') while (at < end && bytes[at] === SPACE) at++
    const code = at < end ? bytes[at] : SPACE
    if (place < 0) {
      const from = at
      while (at < end && bytes[at] !== separator) at++
      if (at - from > LONGEST_PLAIN) return false
      extras[column] = String.fromCharCode(...bytes.subarray(from, at))
    } else if (code === ONE) {
      packed[base + (place >> 3)]! |= 1 << (place & 7)
      at++
    } else if (code === ZERO) {
      zero = true
      at++
    } else if (code === MINUS && bytes[at + 1] === ONE && at + 1 < end) {
      minus = true
      at += 2
    } else return false
    if (column < last && (at >= end || bytes[at++] !== separator)) return false
  }
  const beside = at === end ? extrasOf(extras, header) : ''
  if (typeof beside === 'string') return false
  sink.end(beside, zero, minus, `line ${line.number}`)
  return true
}

function readCarefully(row: string, line: number, header: Header, sink: RowSink): void {
  const tokens = tokensOf(row, header.separator)
  const { target } = header
  if (tokens.length !== target.length)
    return sink.reject(`the row has ${tokens.length} of ${target.length} values`, line)
  const extras = extrasOf(tokens, header)
  if (typeof extras === 'string') return sink.reject(extras, line)
  const base = sink.begin()
  let zero = false
  let minus = false
  for (let column = 0; column < tokens.length; column++) {
    const place = target[column]!
    if (place < 0) continue
    const value = spelledOut(tokens[column]!)
    if (Number.isNaN(value))
      return sink.reject(
        `"${tokens[column]!.slice(0, 40)}" for qubit ${header.names[column]} is neither ±1 nor 0/1`,
        line,
      )
    if (value === 1) sink.bytes[base + (place >> 3)]! |= 1 << (place & 7)
    else if (value === 0) zero = true
    else minus = true
  }
  sink.end(extras, zero, minus, `line ${line}`)
}

const isMarked = (bytes: Uint8Array): boolean => BYTE_ORDER_MARK.every((code, k) => bytes[k] === code)

/**
 * Reads a table of samples: a header of qubit numbers in any order, with optional columns `count`, `energy` and `gauge`
 * (from 0, as in the bundle); then one row per read, or per distinct row with its count. Where an order of qubits is given
 * the header may be left out. Separators: comma, semicolon, tab or blanks, as in the first row; CRLF and a byte-order mark
 * are taken; empty lines and lines from `#` are skipped. Spins are all ±1 or all 0/1. Nothing is repaired: any unknown,
 * missing or repeated qubit, any row of another length, any value outside the set, or a mixture of both sets refuses the
 * text, with the lines named.
 * @throws ReadingFault when the bytes are no text
 */
export function readCsv(chunks: Iterable<Uint8Array>, columns: Columns): RowsRead {
  const sink = new RowSink(columns.qubitIds.length)
  let header: Header | null = null
  let separator = SPACE
  for (const whole of byteLines(chunks)) {
    const line = whole.number === 1 && isMarked(whole.bytes) ? { ...whole, start: BYTE_ORDER_MARK.length } : whole
    if (header && readPlainRow(line, header, separator, sink)) continue
    const row = line.end === line.start || line.bytes[line.start] === HASH ? '' : textOf(line)
    if (row === '' || row.startsWith('#')) continue
    if (header) {
      readCarefully(row, line.number, header, sink)
      continue
    }
    const result = readHeader(row, columns)
    if (!result.header) return refused(result.faults.map((message) => ({ line: line.number, message })))
    header = result.header
    separator = header.separator === '' ? SPACE : header.separator.charCodeAt(0)
    if (!header.isInFile) readCarefully(row, line.number, header, sink)
  }
  if (!header) return refused([{ message: 'the text is empty' }])
  return {
    rows: sink.finish({ energies: header.energyAt >= 0, gauges: header.gaugeAt >= 0 }),
    issues: sink.issues,
    rejectedCount: sink.rejectedCount,
    valueSet: sink.valueSet,
    columnsFrom: header.from,
    hasCounts: header.countAt >= 0,
    machineTimeSeconds: null,
  }
}

const refused = (issues: RowsRead['issues']): RowsRead => ({
  rows: null,
  issues,
  rejectedCount: 0,
  valueSet: '±1',
  columnsFrom: 'file',
  hasCounts: false,
  machineTimeSeconds: null,
})
