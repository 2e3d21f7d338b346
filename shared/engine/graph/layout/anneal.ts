import type { Random } from '../../random'
import { degreeOf, sizeOf } from '../graph'
import type { Graph } from '../graph'
import { wirelength } from './sites'
import type { Sites } from './sites'

/** Sites and their wirelength. */
export interface Placed {
  readonly sites: Sites
  readonly length: number
}

export const ANNEAL_DEFAULTS = {
  /** Moves at each temperature for n vertices: movesFactor · n^movesExponent · effort. */
  movesFactor: 10,
  movesExponent: 1.15,
  /** The first temperature, and the first radius, as a share of the start's mean edge length. */
  startShare: 0.5,
  /** The annealing ends below this share of the mean edge length. */
  endShare: 0.005,
  /** Share of accepted moves at which the radius stays as it is. */
  aimedAcceptance: 0.44,
} as const

/** What the moves work on. */
interface Board {
  /** Neighbours of v are targets[offsets[v] … offsets[v + 1] − 1]. */
  readonly offsets: Int32Array
  readonly targets: Int32Array
  readonly columns: number
  readonly rows: number
  readonly column: Int32Array
  readonly row: Int32Array
  /** Vertex on site row·columns + column, or −1. */
  readonly occupant: Int32Array
  /** Vertices with neighbours. */
  readonly movable: Int32Array
  /** Largest growth in length that is accepted, by a random number of LEAP_BITS bits. */
  readonly leaps: Int32Array
  /** State of the generator, never 0. */
  seed: number
  length: number
}

const LEAP_BITS = 12

/** Sets the largest accepted growth at a temperature for each equally likely quantile. */
function setTemperature({ leaps }: Board, temperature: number): void {
  const count = leaps.length
  for (let i = 0; i < count; i++) leaps[i] = Math.floor(-temperature * Math.log((i + 0.5) / count))
}

/**
 * Tries `moves` swaps of a random vertex with what stands on a random site at most `radius` columns and rows away.
 * Returns how many were accepted.
 */
function tryMoves(board: Board, moves: number, radius: number): number {
  const { columns, rows, column, row, occupant, movable, leaps, offsets, targets } = board
  const vertexScale = movable.length / 4294967296
  let { seed, length } = board
  let accepted = 0
  for (let move = 0; move < moves; move++) {
    seed ^= seed << 13
    seed ^= seed >>> 17
    seed ^= seed << 5
    const v = movable[((seed >>> 0) * vertexScale) | 0]!
    const fromColumn = column[v]!
    const fromRow = row[v]!
    seed ^= seed << 13
    seed ^= seed >>> 17
    seed ^= seed << 5
    const left = fromColumn > radius ? fromColumn - radius : 0
    const right = fromColumn + radius < columns ? fromColumn + radius : columns - 1
    const top = fromRow > radius ? fromRow - radius : 0
    const bottom = fromRow + radius < rows ? fromRow + radius : rows - 1
    const toColumn = left + (((seed & 0xffff) * (right - left + 1)) >>> 16)
    const toRow = top + (((seed >>> 16) * (bottom - top + 1)) >>> 16)
    const site = toRow * columns + toColumn
    const other = occupant[site]!
    if (other === v) continue
    let change = 0
    for (let p = offsets[v]!, end = offsets[v + 1]!; p < end; p++) {
      const w = targets[p]!
      if (w === other) continue
      const c = column[w]!
      const r = row[w]!
      change += Math.abs(toColumn - c) - Math.abs(fromColumn - c) + Math.abs(toRow - r) - Math.abs(fromRow - r)
    }
    if (other >= 0)
      for (let p = offsets[other]!, end = offsets[other + 1]!; p < end; p++) {
        const w = targets[p]!
        if (w === v) continue
        const c = column[w]!
        const r = row[w]!
        change += Math.abs(fromColumn - c) - Math.abs(toColumn - c) + Math.abs(fromRow - r) - Math.abs(toRow - r)
      }
    if (change > 0) {
      seed ^= seed << 13
      seed ^= seed >>> 17
      seed ^= seed << 5
      if (change > leaps[seed >>> (32 - LEAP_BITS)]!) continue
    }
    accepted++
    length += change
    column[v] = toColumn
    row[v] = toRow
    occupant[site] = v
    occupant[fromRow * columns + fromColumn] = other
    if (other >= 0) {
      column[other] = fromColumn
      row[other] = fromRow
    }
  }
  board.seed = seed
  board.length = length
  return accepted
}

function boardOf(graph: Graph, start: Sites, random: Random): Board {
  const { columns, rows } = start
  const occupant = new Int32Array(columns * rows).fill(-1)
  const movable: number[] = []
  for (let v = 0; v < graph.order; v++) {
    const site = start.row[v]! * columns + start.column[v]!
    if (occupant[site]! >= 0) throw new RangeError(`vertices ${occupant[site]} and ${v} share a site`)
    occupant[site] = v
    if (degreeOf(graph, v) > 0) movable.push(v)
  }
  return {
    offsets: Int32Array.from(graph.offsets),
    targets: Int32Array.from(graph.targets),
    columns,
    rows,
    column: start.column.slice(),
    row: start.row.slice(),
    occupant,
    movable: Int32Array.from(movable),
    leaps: new Int32Array(1 << LEAP_BITS),
    seed: random.uint32() | 1,
    length: wirelength(graph, start),
  }
}
/** Betz & Rose's cooling: fast where nearly all or hardly any moves are accepted. */
function coolingFactor(acceptance: number): number {
  if (acceptance > 0.96) return 0.5
  if (acceptance > 0.8) return 0.9
  return acceptance > 0.15 ? 0.95 : 0.8
}

/**
 * Moves vertices between the sites of a grid so that Σ over edges of the Manhattan distance falls: simulated annealing
 * with adaptive cooling and radius as in placement of circuits (Betz & Rose, VPR: a new packing, placement and routing
 * tool for FPGA research, FPL 1997). Begins as hot as the start is long, so that what is good in it lasts.
 * Vertices without neighbours move only out of the way.
 * @param effort factor on the number of moves; about 1 near the best, 0.1 still good from a good start
 * @param shouldStop asked at each temperature, about every millisecond for hundreds of vertices
 * @throws RangeError when two vertices of the start share a site
 */
export function annealPlacement(
  graph: Graph,
  start: Sites,
  random: Random,
  effort: number,
  shouldStop: () => boolean,
): Placed {
  const board = boardOf(graph, start, random)
  const { movesFactor, movesExponent, endShare, startShare, aimedAcceptance } = ANNEAL_DEFAULTS
  const edges = sizeOf(graph)
  const moves = Math.ceil(movesFactor * board.movable.length ** movesExponent * effort)
  const widest = Math.max(start.columns, start.rows)
  let temperature = (startShare * board.length) / edges
  let radius = temperature
  while (moves > 0 && board.length > edges && temperature > (endShare * board.length) / edges && !shouldStop()) {
    setTemperature(board, temperature)
    const acceptance = tryMoves(board, moves, Math.max(1, Math.round(radius))) / moves
    temperature *= coolingFactor(acceptance)
    radius = Math.min(widest, Math.max(1, radius * (1 - aimedAcceptance + acceptance)))
  }
  const { columns, rows, column, row, length } = board
  return { sites: { columns, rows, column, row }, length }
}
