import type { Graph } from '../graph'

/** A drawing of a graph in the plane, one point a vertex. */
export interface Layout {
  readonly x: Float64Array
  readonly y: Float64Array
}

/** Vertices on the sites of a grid, at most one a site. */
export interface Sites {
  readonly columns: number
  readonly rows: number
  /** Column of each vertex, 0 … columns − 1. */
  readonly column: Int32Array
  /** Row of each vertex, 0 … rows − 1. */
  readonly row: Int32Array
}

/** Steps into which a coordinate is cut for sorting: with up to 2²² vertices, key and vertex share a 53-bit integer. */
const SORT_STEPS = 2 ** 31 - 1

/** Scratch for repeated ranking of the same number of points. */
export interface Ranking {
  readonly keys: Float64Array
  readonly order: Int32Array
}

export const rankingOf = (order: number): Ranking => ({
  keys: new Float64Array(order),
  order: new Int32Array(order),
})

/** Writes into `keys` sortable numbers that hold the value's step first and the item second. */
function fillKeys(values: ArrayLike<number>, items: Int32Array, keys: Float64Array): void {
  let [least, most] = [Infinity, -Infinity]
  for (let i = 0; i < items.length; i++) {
    const value = values[items[i]!]!
    if (value < least) least = value
    if (value > most) most = value
  }
  const scale = most > least ? SORT_STEPS / (most - least) : 0
  const width = values.length
  for (let i = 0; i < items.length; i++) {
    const item = items[i]!
    keys[i] = Math.floor((values[item]! - least) * scale) * width + item
  }
}

/** Sorts items by value, ties by number. Native sort of packed keys: several times faster than one with a comparator. */
function sortByValue(values: ArrayLike<number>, items: Int32Array, scratch: Float64Array): void {
  const keys = scratch.subarray(0, items.length)
  fillKeys(values, items, keys)
  keys.sort()
  for (let i = 0; i < items.length; i++) items[i] = keys[i]! % values.length
}

/**
 * Maps points to distinct sites: ranked by `first` they are dealt out over the `lines`, equally many on each, and ranked
 * by `second` spread along their line's `places`.
 */
function rankInto(
  first: ArrayLike<number>,
  second: ArrayLike<number>,
  places: number,
  line: Int32Array,
  place: Int32Array,
  lines: number,
  { keys, order }: Ranking,
): void {
  const count = order.length
  for (let v = 0; v < count; v++) order[v] = v
  sortByValue(first, order, keys)
  for (let l = 0; l < lines; l++) {
    const members = order.subarray(Math.floor((l * count) / lines), Math.floor(((l + 1) * count) / lines))
    sortByValue(second, members, keys)
    for (let i = 0; i < members.length; i++) {
      line[members[i]!] = l
      place[members[i]!] = Math.floor(((i + 0.5) * places) / members.length)
    }
  }
}

/**
 * Spreads points evenly over the sites of a grid, keeping their order: ranked by x into columns and within a column by
 * y, or (`rowsFirst`) the other way round. Ties go by vertex number.
 * @throws RangeError when there are more points than sites
 */
export function rankEqualise(
  x: ArrayLike<number>,
  y: ArrayLike<number>,
  columns: number,
  rows: number,
  rowsFirst = false,
  ranking = rankingOf(x.length),
): Sites {
  const count = x.length
  if (count > columns * rows) throw new RangeError(`${count} points do not fit ${columns} × ${rows} sites`)
  const column = new Int32Array(count)
  const row = new Int32Array(count)
  if (rowsFirst) rankInto(y, x, columns, row, column, rows, ranking)
  else rankInto(x, y, rows, column, row, columns, ranking)
  return { columns, rows, column, row }
}

/** Σ over edges of the Manhattan distance between the sites of their ends. */
export function wirelength({ ends }: Pick<Graph, 'ends'>, { column, row }: Pick<Sites, 'column' | 'row'>): number {
  let sum = 0
  for (let k = 0; k < ends.length; k += 2) {
    const a = ends[k]!
    const b = ends[k + 1]!
    sum += Math.abs(column[a]! - column[b]!) + Math.abs(row[a]! - row[b]!)
  }
  return sum
}

/** Rank equalisation in the better of the two orders. */
export function equalisedSites(
  graph: Graph,
  x: ArrayLike<number>,
  y: ArrayLike<number>,
  columns: number,
  rows: number,
  ranking = rankingOf(x.length),
): { sites: Sites; length: number } {
  const byColumn = rankEqualise(x, y, columns, rows, false, ranking)
  const byRow = rankEqualise(x, y, columns, rows, true, ranking)
  const [columnLength, rowLength] = [wirelength(graph, byColumn), wirelength(graph, byRow)]
  return columnLength <= rowLength ? { sites: byColumn, length: columnLength } : { sites: byRow, length: rowLength }
}
