/**
 * Matrix Market coordinate files (Boisvert, Pozo & Remington 1996) as adjacency matrices: every entry off the diagonal
 * is a coupler, and every row a qubit. Rows count from 1, qubits from 0, so row i is qubit i − 1. In a general matrix a
 * coupler may stand in both triangles; in a symmetric one each stands once.
 */
import { eachLine } from '../../formats/blocks'
import { chunksOf, watched } from '../../formats/chunks'
import { isBanner, readSize } from '../../formats/matrix-market-header'
import { LineDecoder } from '../../formats/text'
import { GraphCollector } from './collector'
import type { GraphControl } from './graph-file'
import { shown } from './graph-file'

const MAX_LINE_BYTES = 2000
const FIELDS = ['pattern', 'real', 'integer']
const SYMMETRIES = ['general', 'symmetric']

interface Kind {
  readonly field: string
  readonly symmetry: 'general' | 'symmetric'
}

/** Reads the first line; a text says why it is no graph. */
function readKind(text: string): Kind | string {
  const [, object, layout = '', field = '', symmetry = '', ...rest] = text.trim().toLowerCase().split(/\s+/)
  if (!isBanner(text) || object !== 'matrix' || layout !== 'coordinate' || rest.length > 0)
    return 'the first line must be "%%MatrixMarket matrix coordinate", a kind of values and a symmetry'
  if (!FIELDS.includes(field)) return `the values must be pattern, real or integer, not ${shown(field)}`
  if (!SYMMETRIES.includes(symmetry)) return `the symmetry must be general or symmetric, not ${shown(symmetry)}`
  return { field, symmetry: symmetry as Kind['symmetry'] }
}

class AdjacencyReader {
  readonly collector = new GraphCollector(true, (what, at) => ({ line: what === 'qubit' ? this.sizeLine : at }))
  private kind: Kind | null = null
  private order = 0
  private stated = -1
  private sizeLine = 0
  private entries = 0
  isLost = false

  readLine(text: string, line: number): void {
    if (!this.kind) {
      const kind = readKind(text)
      if (typeof kind === 'string') return this.lose(kind, line)
      this.kind = kind
      this.collector.isDirected = kind.symmetry === 'general'
    } else if (text.startsWith('%') || text.trim() === '') return
    else if (this.stated < 0) this.readSize(text, line)
    else this.readEntry(text, line)
  }

  private lose(message: string, line: number): void {
    this.isLost = true
    this.collector.fail(message, line)
  }

  private readSize(text: string, line: number): void {
    const size = readSize(text, { layout: 'coordinate', field: 'integer', symmetry: this.kind!.symmetry }, 0)
    if (typeof size === 'string') return this.lose(size, line)
    this.sizeLine = line
    this.stated = size.count
    this.order = size.n
    for (let number = 0; number < size.n; number++) this.collector.addQubit(number, number)
  }

  private readEntry(text: string, line: number): void {
    this.entries++
    const fields = text.trim().split(/\s+/)
    const expected = this.kind!.field === 'pattern' ? 2 : 3
    if (fields.length !== expected)
      return this.collector.reject('coupler', line, `an entry has ${expected} numbers, not ${fields.length}`)
    const [row, col] = fields.map((field) => (/^\d{1,9}$/.test(field) ? Number(field) : -1)) as [number, number]
    if (row < 1 || col < 1 || row > this.order || col > this.order)
      return this.collector.reject('coupler', line, `row and column must be whole numbers from 1 to ${this.order}`)
    const value = fields[2] === undefined ? 1 : Number(fields[2])
    if (!Number.isFinite(value)) return this.collector.reject('coupler', line, `${shown(fields[2])} is not a number`)
    if (value === 0) return this.collector.reject('coupler', line, 'the value is 0, which is no coupler: leave it out')
    this.collector.addCoupler(row - 1, col - 1, line)
  }

  end(): void {
    if (this.isLost) return
    if (this.stated < 0) this.collector.fail('the file ends before its size line')
    else if (this.entries !== this.stated)
      this.collector.fail(`the size line promises ${this.stated} entries; there are ${this.entries}`, this.sizeLine)
  }
}

export function readMatrixMarket(bytes: Uint8Array, control?: GraphControl): GraphCollector {
  const reader = new AdjacencyReader()
  const decoder = new LineDecoder()
  eachLine(watched(chunksOf(bytes), control), (chunk, start, end, line) => {
    if (reader.isLost) return
    if (end - start > MAX_LINE_BYTES)
      return reader.collector.reject('coupler', line, `the line is longer than ${MAX_LINE_BYTES} bytes`)
    reader.readLine(decoder.decode(chunk, start, end, line), line)
  })
  reader.end()
  return reader.collector
}
