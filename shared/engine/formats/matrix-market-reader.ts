import { blocksOf, lineEnd } from './blocks'
import { readDirective, type Directives } from './directives'
import { Entries } from './entries'
import { EntryScan } from './entry-scan'
import type { ReadingIssue } from './format'
import { readBanner, readSize, type MatrixMarketKind, type MatrixSize } from './matrix-market-header'
import { NumberedNames } from './numbered-names'
import { numberFault, parseNumber } from './numbers'
import { Rejections } from './rejections'
import { LineDecoder, textOf } from './text'

const DEFAULTS = { maxLineLength: 2000, maxDense: 5000 }
const LINE_FEED = 0x0a
const NONE = -1

/** Reads the lines of a Matrix Market file: first line, comments, size line, entries. */
export class MatrixMarketReader {
  readonly entries = new Entries()
  readonly directives: Directives = {}
  readonly names = new NumberedNames()
  readonly rejections = new Rejections()
  readonly issues: ReadingIssue[] = []
  kind: MatrixMarketKind | null = null
  size: MatrixSize | null = null
  sizeLine = 0
  private readonly entry = new EntryScan()
  private readonly decoder = new LineDecoder()
  private line = 0
  private rejectedEntries = 0
  /** Values of an array read so far. */
  private placed = 0
  private row = 0
  private col = 0

  read(chunks: Iterable<Uint8Array>): void {
    for (const { bytes, start, end } of blocksOf(chunks))
      for (let p = start; p < end;) {
        this.line++
        let feed = this.size && this.kind?.layout === 'coordinate' ? this.readUsual(bytes, p) : NONE
        if (feed < 0) feed = this.readGeneral(bytes, p)
        if (this.issues.length > 0) return
        p = feed + 1
      }
    this.checkEnd()
  }

  /** Reads the entry that begins at p straight from its bytes; answers its line feed, or −1 when something is unusual. */
  private readUsual(bytes: Uint8Array, p: number): number {
    const feed = this.entry.scan(bytes, p)
    const { row, col, value } = this.entry
    return feed >= 0 && value !== undefined && this.faultOf(row, col, value) === null
      ? this.take(row, col, value, feed)
      : NONE
  }

  private take(row: number, col: number, value: number, feed: number): number {
    const isHalf = this.kind!.symmetry === 'symmetric' && row !== col
    this.entries.add(row - 1, col - 1, isHalf ? 2 * value : value)
    return feed
  }

  private readGeneral(bytes: Uint8Array, start: number): number {
    const feed = bytes.indexOf(LINE_FEED, start)
    const end = lineEnd(bytes, start, feed)
    const isLong = end - start > 4 * DEFAULTS.maxLineLength
    const text = isLong
      ? textOf(bytes.subarray(start, start + 4 * DEFAULTS.maxLineLength))
      : this.decoder.decode(bytes, start, end, this.line)
    const reason =
      text.length > DEFAULTS.maxLineLength
        ? `the line is longer than ${DEFAULTS.maxLineLength} characters`
        : this.readLine(text)
    if (reason) this.rejections.add(text, 0, text.length, this.line, reason)
    return feed
  }

  private readLine(text: string): string | null {
    if (!this.kind) return this.readFirst(text)
    if (text.startsWith('%')) return this.readComment(text.slice(1))
    if (text.trim() === '') return null
    if (!this.size) return this.readSizeLine(text)
    const fields = text.trim().split(/\s+/)
    if (this.kind.layout === 'array') return this.readCells(fields)
    const reason = this.readEntry(fields)
    if (reason) this.rejectedEntries++
    return reason
  }

  private readFirst(text: string): null {
    const kind = readBanner(text)
    if (typeof kind === 'string') this.issues.push({ line: this.line, message: kind })
    else this.kind = kind
    return null
  }

  private readComment(comment: string): string | null {
    const named = this.names.read(comment, this.line)
    return named === undefined ? readDirective(comment, this.directives) : named
  }

  private readSizeLine(text: string): null {
    const size = readSize(text, this.kind!, DEFAULTS.maxDense)
    if (typeof size === 'string') this.issues.push({ line: this.line, message: size })
    else {
      this.size = size
      this.sizeLine = this.line
    }
    return null
  }

  private readEntry(fields: readonly string[]): string | null {
    if (fields.length !== 3) return `expected 3 columns (row, column, value), found ${fields.length}`
    const [rowText, colText, valueText] = fields as [string, string, string]
    if (!/^\d{1,15}$/.test(rowText)) return `the row "${rowText.slice(0, 40)}" is not a whole number`
    if (!/^\d{1,15}$/.test(colText)) return `the column "${colText.slice(0, 40)}" is not a whole number`
    const value = parseNumber(valueText)
    if (Number.isNaN(value)) return numberFault(valueText)
    const fault = this.faultOf(Number(rowText), Number(colText), value)
    if (fault === null) this.take(Number(rowText), Number(colText), value, 0)
    return fault
  }

  private faultOf(row: number, col: number, value: number): string | null {
    const { n } = this.size!
    if (row < 1 || row > n || col < 1 || col > n)
      return `row ${row}, column ${col} is outside the ${n} × ${n} that line ${this.sizeLine} states; rows and columns count from 1`
    if (this.kind!.symmetry === 'symmetric' && row < col)
      return `row ${row}, column ${col} is above the diagonal; a symmetric file holds the lower triangle alone`
    return this.valueFault(value)
  }

  private valueFault(value: number): string | null {
    return this.kind!.field === 'integer' && !Number.isInteger(value)
      ? `the value ${value} is not whole, as line 1 states`
      : null
  }

  /** Values of an array stand column by column; of a symmetric one from the diagonal down. */
  private readCells(fields: readonly string[]): string | null {
    for (const field of fields) {
      const value = parseNumber(field)
      const fault = Number.isNaN(value) ? numberFault(field) : this.valueFault(value)
      if (fault) {
        this.issues.push({ line: this.line, message: `the matrix is incomplete: line ${this.line}, ${fault}` })
        return fault
      }
      if (this.placed++ >= this.size!.count) continue
      if (value !== 0) this.take(this.row + 1, this.col + 1, value, 0)
      this.moveOn()
    }
    return null
  }

  private moveOn(): void {
    if (++this.row < this.size!.n) return
    this.col++
    this.row = this.kind!.symmetry === 'symmetric' ? this.col : 0
  }

  private checkEnd(): void {
    if (!this.kind) this.issues.push({ message: 'the file is empty' })
    else if (!this.size) this.issues.push({ message: 'there is no size line: the file ends before it' })
    else {
      const held = this.kind.layout === 'array' ? this.placed : this.entries.count + this.rejectedEntries
      const { count } = this.size
      if (held === count) return
      const where = held < count ? 'is it cut short?' : 'is it put together from several?'
      const promise = `line ${this.sizeLine} promises ${count} ${this.kind.layout === 'array' ? 'values' : 'entries'}`
      this.issues.push({ line: this.sizeLine, message: `${promise}, the file holds ${held}: ${where}` })
    }
  }
}
