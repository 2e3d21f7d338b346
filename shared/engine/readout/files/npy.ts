import { ByteSource } from '../../formats/byte-source'
import { ReadingFault } from '../../formats/format'
import { readNpyHeader } from '../../formats/npy-header'
import { elementReader, elementType } from '../../formats/npy-types'
import type { ElementType } from '../../formats/npy-types'
import { orderedColumns } from './columns'
import type { OrderedColumns } from './columns'
import type { Columns, RowsRead } from './reading'
import { RowSink } from './row-sink'

/** Writes a line of elements, which are spins: a row of the array, or a column where those run first. */
type SpinOf = (bytes: Uint8Array, view: DataView, k: number) => number

/** Booleans and integers of one byte need no view; the others are numbers like any. */
function spinReader(type: ElementType): SpinOf {
  if (type.size === 1) return (bytes, _view, k) => (bytes[k]! << 24) >> 24
  const read = elementReader(type)
  return (_bytes, view, k) => read(view, k * type.size)
}

function rowsOf(shape: readonly number[], width: number): number {
  const [rows, columns] = shape.length === 1 ? [1, shape[0]] : shape
  const stated = shape.length === 1 ? `${shape[0]},` : shape.slice(0, 8).join(', ')
  if (shape.length < 1 || shape.length > 2)
    throw new ReadingFault(`the array has the shape (${stated}); a row per read and a column per qubit are needed`)
  if (columns === width) return rows!
  const hint = rows === width ? '; transpose it, rows are reads' : ''
  throw new ReadingFault(`the array has the shape (${stated}); the run sheet uses ${width} qubits${hint}`)
}

const fault = (value: number, row: number, column: number): ReadingFault =>
  new ReadingFault(`element [${row}, ${column}] is ${value}, neither ±1 nor 0/1`)

interface Grid {
  source: ByteSource
  type: ElementType
  rows: number
  columns: OrderedColumns
}

/** C order: the spins of one read after another. */
function readByRows({ source, type, rows, columns: { target } }: Grid, sink: RowSink): void {
  const spinOf = spinReader(type)
  for (let r = 0; r < rows; r++) {
    const bytes = source.take(target.length * type.size)
    const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
    const base = sink.begin()
    const packed = sink.bytes
    let zero = false
    let minus = false
    for (let c = 0; c < target.length; c++) {
      const value = spinOf(bytes, view, c)
      const place = target[c]!
      if (value === 1) packed[base + (place >> 3)]! |= 1 << (place & 7)
      else if (value === 0) zero = true
      else if (value === -1) minus = true
      else throw fault(value, r, c)
    }
    sink.end({ count: 1, energy: 0, gauge: 0 }, zero, minus, `row ${r}`)
  }
}

/** Fortran order: all reads of one qubit after another. */
function readByColumns({ source, type, rows, columns: { target } }: Grid, sink: RowSink): void {
  const spinOf = spinReader(type)
  for (let r = 0; r < rows; r++) {
    sink.begin()
    sink.end({ count: 1, energy: 0, gauge: 0 }, false, false, '')
  }
  for (let c = 0; c < target.length; c++) {
    const bytes = source.take(rows * type.size)
    const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
    const place = target[c]!
    for (let r = 0; r < rows; r++) {
      const value = spinOf(bytes, view, r)
      if (value === 1) sink.bytes[r * sink.stride + (place >> 3)]! |= 1 << (place & 7)
      else if (value === 0 || value === -1) sink.note(value === 0, value === -1, `element [${r}, ${c}]`)
      else throw fault(value, r, c)
    }
  }
}

/** The spins of an array file, in a sink. @throws ReadingFault naming the first element that is no spin */
export function readSpins(chunks: Iterable<Uint8Array>, columns: Columns): { sink: RowSink; columns: OrderedColumns } {
  const source = new ByteSource(chunks)
  const { descr, fortranOrder, shape } = readNpyHeader(source)
  const type = elementType(descr)
  const width = columns.qubitIds.length
  const rows = rowsOf(shape, width)
  const sink = new RowSink(width)
  const ordered = orderedColumns(columns)
  const grid = { source, type, rows, columns: ordered }
  if (fortranOrder && shape.length === 2) readByColumns(grid, sink)
  else readByRows(grid, sink)
  if (source.hasMore()) throw new ReadingFault('more bytes follow the array: save one array alone')
  return { sink, columns: ordered }
}

/**
 * Reads a NumPy array of spins, a row per read and a column per qubit, in the order that is given or else in the order of
 * the bundle: ascending qubit numbers. Booleans, integers and floats, either order of bytes, C and Fortran order.
 * @throws ReadingFault when the bytes are no such array
 */
export function readNpy(chunks: Iterable<Uint8Array>, columns: Columns): RowsRead {
  const { sink, columns: ordered } = readSpins(chunks, columns)
  return {
    rows: sink.finish({ energies: false, gauges: false }),
    issues: sink.issues,
    rejectedCount: 0,
    valueSet: sink.valueSet,
    columnsFrom: ordered.from,
    hasCounts: false,
    machineTimeSeconds: null,
  }
}
