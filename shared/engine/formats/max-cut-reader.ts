import { blocksOf, lineEnd } from './blocks'
import { MAX_STATED_VARIABLES } from './counted'
import { Entries } from './entries'
import { EntryScan } from './entry-scan'
import type { ReadingIssue } from './format'
import { numberFault, parseNumber } from './numbers'
import { Rejections } from './rejections'
import { LineDecoder } from './text'

const DEFAULTS = { maxLineBytes: 2000 }
const HASH = '#'
const LINE_FEED = 0x0a
const NONE = -1

/** Numbers of vertices and edges, as the first line states them. */
export interface GraphSize {
  readonly n: number
  readonly m: number
}

/** The two whole numbers of a first line, or null. */
export function readGraphSize(text: string): GraphSize | null {
  const match = /^\s*(\d{1,15})\s+(\d{1,15})\s*$/.exec(text)
  return match ? { n: Number(match[1]), m: Number(match[2]) } : null
}

/** Reads the lines of an edge list: sizes first, then an edge a line, its weight 1 where none is given. */
export class MaxCutReader {
  readonly edges = new Entries()
  readonly rejections = new Rejections()
  readonly issues: ReadingIssue[] = []
  size: GraphSize | null = null
  private sizeLine = 0
  private line = 0
  private rejectedEdges = 0
  private readonly entry = new EntryScan()
  private readonly decoder = new LineDecoder()

  read(chunks: Iterable<Uint8Array>): void {
    for (const { bytes, start, end } of blocksOf(chunks))
      for (let p = start; p < end;) {
        this.line++
        let feed = this.size ? this.readUsual(bytes, p) : NONE
        if (feed < 0) feed = this.readGeneral(bytes, p)
        if (this.issues.length > 0) return
        p = feed + 1
      }
    this.checkEnd()
  }

  private readUsual(bytes: Uint8Array, p: number): number {
    const feed = this.entry.scan(bytes, p)
    const { row, col, value = 1 } = this.entry
    if (feed < 0 || this.faultOf(row, col) !== null) return NONE
    this.edges.add(row - 1, col - 1, value)
    return feed
  }

  private readGeneral(bytes: Uint8Array, start: number): number {
    const feed = bytes.indexOf(LINE_FEED, start)
    const end = Math.min(lineEnd(bytes, start, feed), start + DEFAULTS.maxLineBytes + 1)
    const isLong = end - start > DEFAULTS.maxLineBytes
    const text = isLong ? '' : this.decoder.decode(bytes, start, end, this.line)
    const reason = isLong ? `the line is longer than ${DEFAULTS.maxLineBytes} bytes` : this.readLine(text)
    if (reason) {
      this.rejections.add(text, 0, text.length, this.line, reason)
      this.rejectedEdges++
    }
    return feed
  }

  private readLine(text: string): string | null {
    if (text.trim() === '' || text.trimStart().startsWith(HASH)) return null
    if (!this.size) return this.readSize(text)
    const fields = text.trim().split(/\s+/)
    if (fields.length !== 2 && fields.length !== 3)
      return `expected 2 or 3 columns (i, j, weight), found ${fields.length}`
    const [a, b, weight = '1'] = fields as [string, string, string | undefined]
    for (const vertex of [a, b])
      if (!/^\d{1,15}$/.test(vertex)) return `the vertex "${vertex.slice(0, 40)}" is not a whole number`
    const value = parseNumber(weight)
    if (Number.isNaN(value)) return numberFault(weight)
    const fault = this.faultOf(Number(a), Number(b))
    if (fault === null) this.edges.add(Number(a) - 1, Number(b) - 1, value)
    return fault
  }

  private readSize(text: string): null {
    const size = readGraphSize(text)
    this.sizeLine = this.line
    if (!size)
      this.issues.push({
        line: this.line,
        message: `the first line must hold the numbers of vertices and edges, not "${text.trim().slice(0, 60)}"`,
      })
    else if (size.n > MAX_STATED_VARIABLES)
      this.issues.push({
        line: this.line,
        message: `a graph has at most ${MAX_STATED_VARIABLES} vertices, not ${size.n}`,
      })
    else if (size.n === 0) this.issues.push({ line: this.line, message: 'the graph has no vertices' })
    else this.size = size
    return null
  }

  private faultOf(a: number, b: number): string | null {
    const { n } = this.size!
    if (a < 1 || a > n || b < 1 || b > n)
      return `the edge ${a} ${b} leaves 1 … ${n}, the vertices that line ${this.sizeLine} states; they count from 1`
    return a === b ? `vertex ${a} is joined to itself: no cut goes through that edge` : null
  }

  private checkEnd(): void {
    if (!this.size) {
      this.issues.push({ message: 'the file is empty: expected a line with the numbers of vertices and edges' })
      return
    }
    const held = this.edges.count + this.rejectedEdges
    if (held === this.size.m) return
    const where = held < this.size.m ? 'is it cut short?' : 'is it put together from several?'
    const message = `line ${this.sizeLine} promises ${this.size.m} edges, the file holds ${held}: ${where}`
    this.issues.push({ line: this.sizeLine, message })
  }
}
