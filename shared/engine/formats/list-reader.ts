/**
 * Reads the lines of a coefficient list. The usual line, two labels and a number of ASCII characters with one kind of
 * separator and no quotes, is read straight from the bytes; every other line is decoded and read by the general rules,
 * which read the usual ones alike.
 */
import { blocksOf, lineEnd } from './blocks'
import { DecimalScan } from './decimal-scan'
import { readDirective, type Directives } from './directives'
import { Entries } from './entries'
import { splitFields, surveyLine, type LineSurvey } from './fields'
import type { ProblemReading } from './format'
import { labelFault } from './labels'
import { addToHash, HASH_BASIS, LabelTable, MOST_NUMBER, NUMBER_DIGITS } from './label-table'
import { numberFault, parseNumber } from './numbers'
import { Rejections } from './rejections'
import { LineDecoder, textOf } from './text'

const DEFAULTS = { maxLineLength: 2000, maxLabelBytes: 200 }
/** A character takes at most this many bytes. */
const BYTES_PER_CHARACTER = 4
const COLUMNS = 3

const TAB = 0x09
const LINE_FEED = 0x0a
const CARRIAGE_RETURN = 0x0d
const SPACE = 0x20
const QUOTE = 0x22
const HASH = 0x23
const COMMA = 0x2c
const ZERO = 0x30
const SEMICOLON = 0x3b
const DELETE = 0x7f
const NONE = -1

/** 1 for characters that a label may hold without being quoted or decoded. */
const PLAIN = Uint8Array.from({ length: 256 }, (_, code) =>
  Number(code > SPACE && code < DELETE && code !== QUOTE && code !== COMMA && code !== SEMICOLON),
)

/** The position after the separator that begins at p: one tab, or one comma or semicolon or none and any spaces. */
function afterSeparator(bytes: Uint8Array, p: number): number {
  const code = bytes[p]
  if (code === TAB) return p + 1
  let next = code === COMMA || code === SEMICOLON ? p + 1 : p
  while (bytes[next] === SPACE) next++
  return next
}

/** The position of the line feed when nothing but spaces stands before it, or −1. */
function lineFeedAt(bytes: Uint8Array, from: number): number {
  let p = from
  while (bytes[p] === SPACE) p++
  if (bytes[p] === CARRIAGE_RETURN) p++
  return bytes[p] === LINE_FEED ? p : NONE
}

export class ListReader {
  readonly table = new LabelTable()
  readonly entries = new Entries()
  readonly directives: Directives = {}
  readonly rejections = new Rejections()
  header: ProblemReading['header'] = null
  private readonly number = new DecimalScan()
  private readonly decoder = new LineDecoder()
  private line = 0
  private dataLines = 0

  read(chunks: Iterable<Uint8Array>): void {
    for (const { bytes, start, end } of blocksOf(chunks))
      for (let p = start; p < end;) {
        this.line++
        let feed = this.readNumbered(bytes, p)
        if (feed < 0) feed = this.readNamed(bytes, p)
        if (feed < 0) feed = this.readGeneral(bytes, p)
        p = feed + 1
      }
  }

  /** Reads the line that begins at p when both labels are small whole numbers; answers its line feed, or −1. */
  private readNumbered(bytes: Uint8Array, from: number): number {
    let p = from
    let row = 0
    for (let code = bytes[p]!; code >= ZERO && code <= ZERO + 9; code = bytes[++p]!) row = (row * 10 + code - ZERO) | 0
    const separator = bytes[p]!
    if (p === from || p - from > NUMBER_DIGITS || (bytes[from] === ZERO && p - from > 1)) return NONE
    if (separator !== SPACE && separator !== COMMA && separator !== TAB && separator !== SEMICOLON) return NONE
    p = afterSeparator(bytes, p)
    const second = p
    let col = 0
    for (let code = bytes[p]!; code >= ZERO && code <= ZERO + 9; code = bytes[++p]!) col = (col * 10 + code - ZERO) | 0
    if (p === second || p - second > NUMBER_DIGITS || (bytes[second] === ZERO && p - second > 1)) return NONE
    if (bytes[p] !== separator || row >= MOST_NUMBER || col >= MOST_NUMBER) return NONE
    p = this.number.scan(bytes, afterSeparator(bytes, p))
    if (p < 0) return NONE
    const feed = lineFeedAt(bytes, p)
    if (feed < 0) return NONE
    this.dataLines++
    const a = this.table.number(row, this.line)
    this.entries.add(a, this.table.number(col, this.line), this.number.value)
    return feed
  }

  /** The same for labels of plain characters. */
  private readNamed(bytes: Uint8Array, from: number): number {
    let p = from
    let rowHash = HASH_BASIS
    for (let code = bytes[p]!; PLAIN[code] === 1; code = bytes[++p]!) rowHash = addToHash(rowHash, code)
    const rowEnd = p
    const separator = bytes[p]!
    if (p === from || bytes[from] === HASH || p - from > DEFAULTS.maxLabelBytes) return NONE
    if (separator !== SPACE && separator !== COMMA && separator !== TAB && separator !== SEMICOLON) return NONE
    const second = afterSeparator(bytes, p)
    p = second
    let colHash = HASH_BASIS
    for (let code = bytes[p]!; PLAIN[code] === 1; code = bytes[++p]!) colHash = addToHash(colHash, code)
    const colEnd = p
    if (p === second || bytes[second] === HASH || p - second > DEFAULTS.maxLabelBytes || bytes[p] !== separator)
      return NONE
    p = this.number.scan(bytes, afterSeparator(bytes, p))
    if (p < 0) return NONE
    const feed = lineFeedAt(bytes, p)
    if (feed < 0) return NONE
    this.dataLines++
    const a = this.indexAt(bytes, from, rowEnd, rowHash)
    this.entries.add(a, this.indexAt(bytes, second, colEnd, colHash), this.number.value)
    return feed
  }

  private indexAt(bytes: Uint8Array, start: number, end: number, hash: number): number {
    const first = bytes[start]! - ZERO
    if (first < 0 || first > 9 || end - start > NUMBER_DIGITS)
      return this.table.name(bytes, start, end, hash, this.line)
    return this.indexOf(textOf(bytes.subarray(start, end)))
  }

  private indexOf(label: string): number {
    return this.table.indexOf(label) ?? this.table.add(label, this.line)
  }

  /** Reads any line, and answers its line feed. */
  private readGeneral(bytes: Uint8Array, start: number): number {
    const feed = bytes.indexOf(LINE_FEED, start)
    const end = lineEnd(bytes, start, feed)
    const isLong = end - start > BYTES_PER_CHARACTER * DEFAULTS.maxLineLength
    const text = isLong
      ? textOf(bytes.subarray(start, start + BYTES_PER_CHARACTER * DEFAULTS.maxLineLength))
      : this.decoder.decode(bytes, start, end, this.line)
    const survey = surveyLine(text, 0, text.length)
    const reason = survey.start === survey.end ? this.readComment(text, survey) : this.readEntry(text, survey)
    if (reason) this.rejections.add(text, 0, text.length, this.line, reason)
    return feed
  }

  private readComment(text: string, { comment }: LineSurvey): string | null {
    return comment < 0 ? null : readDirective(text.slice(comment), this.directives)
  }

  /** Takes in one entry or the line of column names; returns why it cannot. */
  private readEntry(text: string, survey: LineSurvey): string | null {
    this.dataLines++
    if (survey.end - survey.start > DEFAULTS.maxLineLength)
      return `the line is longer than ${DEFAULTS.maxLineLength} characters`
    const fields = threeFields(text, survey)
    if (typeof fields === 'string') return fields
    const [row, col, valueText] = fields
    if (this.dataLines === 1 && isColumnName(valueText)) {
      this.header = { line: this.line, text: text.slice(survey.start, survey.end) }
      return null
    }
    const value = parseNumber(valueText)
    if (Number.isNaN(value)) return numberFault(valueText)
    const fault = this.faultOf(row) ?? this.faultOf(col)
    if (fault) return fault
    const a = this.indexOf(row)
    this.entries.add(a, this.indexOf(col), value)
    return null
  }

  private faultOf(label: string): string | null {
    return this.table.indexOf(label) === undefined ? labelFault(label) : null
  }
}

/** Tabs may separate labels with spaces in them, or just be white space: three fields decide. */
export function threeFields(text: string, { start, end, delimiter }: LineSurvey): [string, string, string] | string {
  let fields = splitFields(text, start, end, delimiter)
  if (delimiter === '\t' && fields.length !== COLUMNS) fields = splitFields(text, start, end, ' ')
  if (typeof fields === 'string') return fields
  const [row, col, value] = fields
  if (fields.length === COLUMNS) return [row!, col!, value!]
  return `expected ${COLUMNS} columns (i, j, value), found ${fields.length}`
}

/** A word without digits that is not one of the names of non-numbers. */
export const isColumnName = (field: string): boolean =>
  field !== '' && !/\d/.test(field) && !/^[+-]?(?:nan|inf|infinity)$/i.test(field)
