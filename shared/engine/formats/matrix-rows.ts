/**
 * Takes in the rows of a square table of cells as they come. Which of the first row and the first column are labels shows
 * only at the end, so that what may be either is kept as both: numbers as entries, labels as text.
 */
import { eachLine } from './blocks'
import { DecimalScan } from './decimal-scan'
import { readDirective, type Directives } from './directives'
import { Entries } from './entries'
import { splitFields, surveyLine, type Delimiter, type LineSurvey } from './fields'
import type { ReadingIssue } from './format'
import { numberFault, parseNumber } from './numbers'
import { Rejections } from './rejections'
import { LineDecoder } from './text'

const TAB = 0x09
const LINE_FEED = 0x0a
const CARRIAGE_RETURN = 0x0d
const SPACE = 0x20

/** Why a cell is no number. */
interface CellFault {
  /** From 0. */
  readonly cell: number
  readonly reason: string
}

/** A row of cells; its numbers are in the entries. */
export interface MatrixRow {
  readonly line: number
  readonly width: number
  /** The first cell as it is written. */
  readonly first: string
  readonly firstFault: string | null
  /** The first of the other cells that is no number. */
  readonly fault: CellFault | null
  /** Kept only where something may have to be said about it. */
  readonly text: string
}

interface HeldRow {
  readonly text: string
  readonly survey: LineSurvey
  readonly line: number
}

export class MatrixRows {
  readonly rows: MatrixRow[] = []
  /** Cells that are numbers but not zero, by row and place in it. */
  readonly entries = new Entries()
  readonly directives: Directives = {}
  readonly rejections = new Rejections()
  /** The cells of the first row as they are written. */
  firstRow: string[] = []
  /** What ended the reading early. */
  issue: ReadingIssue | null = null
  private delimiter: Delimiter | null = null
  private held: HeldRow | null = null
  private readonly number = new DecimalScan()
  private readonly decoder = new LineDecoder()

  /** @param most rows and columns of a matrix without labels */
  constructor(private readonly most: number) {}

  read(chunks: Iterable<Uint8Array>): void {
    eachLine(chunks, (bytes, start, end, line) => {
      if (this.issue) return
      if (this.rows.length > 0 && this.readNumbers(bytes, start, line)) return
      this.readText(this.decoder.decode(bytes, start, end, line), line)
    })
    if (this.held && !this.issue) this.begin(this.held.survey.delimiter)
  }

  private readText(text: string, line: number): void {
    const survey = surveyLine(text, 0, text.length)
    if (survey.start === survey.end) {
      const reason = survey.comment < 0 ? null : readDirective(text.slice(survey.comment), this.directives)
      if (reason) this.rejections.add(text, 0, text.length, line, reason)
      return
    }
    if (this.delimiter !== null) return this.addRow(text, survey, line)
    if (this.held === null) {
      this.held = { text, survey, line }
      return
    }
    // Labels may hold what separates numbers: the second row tells the delimiter better than the first.
    this.begin(survey.delimiter)
    if (!this.issue) this.addRow(text, survey, line)
  }

  private begin(delimiter: Delimiter): void {
    this.delimiter = delimiter
    const { text, survey, line } = this.held!
    this.held = null
    this.addRow(text, survey, line)
  }

  private addRow(text: string, { start, end }: LineSurvey, line: number): void {
    // Before a tab even nothing is a cell: the blank corner above a column of labels.
    const cells = splitFields(text, this.delimiter === '\t' ? 0 : start, end, this.delimiter!)
    if (typeof cells === 'string') this.issue = { line, message: `line ${line}: ${cells}` }
    else this.addCells(cells, text, line)
  }

  private addCells(cells: readonly string[], text: string, line: number): void {
    const index = this.rows.length
    let firstFault: string | null = null
    let fault: CellFault | null = null
    cells.forEach((cell, place) => {
      const value = parseNumber(cell)
      if (value !== 0 && !Number.isNaN(value)) this.entries.add(index, place, value)
      if (!Number.isNaN(value)) return
      if (place === 0) firstFault = numberFault(cell)
      else fault ??= { cell: place, reason: numberFault(cell) }
    })
    if (index === 0) this.firstRow = [...cells]
    const isFaulty = firstFault !== null || fault !== null || index === 0
    this.push({ line, width: cells.length, first: cells[0]!, firstFault, fault, text: isFaulty ? text : '' })
  }

  private push(row: MatrixRow): void {
    this.rows.push(row)
    if (this.rows.length > this.most + 1)
      this.issue = { message: `a dense matrix has at most ${this.most} rows: use a coefficient list` }
    else if (row.width > this.most + 1)
      this.issue = {
        line: row.line,
        message: `a dense matrix has at most ${this.most} columns: use a coefficient list`,
      }
  }

  /** Reads a row of nothing but numbers straight from its bytes, up to the line feed; false when it is anything else. */
  private readNumbers(bytes: Uint8Array, start: number, line: number): boolean {
    const index = this.rows.length
    const mark = this.entries.count
    const separator = this.delimiter!.charCodeAt(0)
    let width = 0
    let firstEnd = start
    for (let p = this.afterBlanks(bytes, start); ; width++) {
      p = this.number.scan(bytes, p)
      if (p < 0) return this.undo(mark)
      if (width === 0) firstEnd = p
      if (this.number.value !== 0) this.entries.add(index, width, this.number.value)
      const next = this.afterBlanks(bytes, p)
      const code = bytes[next] === CARRIAGE_RETURN ? bytes[next + 1] : bytes[next]
      if (code === LINE_FEED) break
      if (separator === SPACE ? next === p : bytes[next] !== separator) return this.undo(mark)
      p = separator === SPACE ? next : this.afterBlanks(bytes, next + 1)
    }
    const first = this.decoder.decode(bytes, start, firstEnd, line).trim()
    this.push({ line, width: width + 1, first, firstFault: null, fault: null, text: '' })
    return true
  }

  private undo(mark: number): false {
    this.entries.count = mark
    return false
  }

  /** Past spaces, and past tabs where these separate no cells. */
  private afterBlanks(bytes: Uint8Array, from: number): number {
    let p = from
    while (bytes[p] === SPACE || (bytes[p] === TAB && this.delimiter === ' ')) p++
    return p
  }
}
