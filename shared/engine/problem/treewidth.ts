/**
 * An upper bound on treewidth by greedy elimination with least fill: eliminate the vertex whose neighbourhood lacks
 * the fewest edges, join its neighbours, repeat; the widest neighbourhood met is the bound (Bodlaender & Koster,
 * Treewidth computations I: upper bounds, Information and Computation 208, 2010).
 * Neighbourhoods are bit rows, so counting missing edges is a matter of masks and bit counts.
 */
import { degreeOf, sizeOf, type Graph } from '../graph/graph'

const DEFAULTS = {
  /** Above this many vertices no bound is computed. */
  maxOrder: 2048,
  /** Words of bit rows that may be read before giving up: a few tenths of a second. */
  maxWork: 30_000_000,
}

function bitCount(word: number): number {
  let x = word - ((word >>> 1) & 0x55555555)
  x = (x & 0x33333333) + ((x >>> 2) & 0x33333333)
  return Math.imul((x + (x >>> 4)) & 0x0f0f0f0f, 0x01010101) >>> 24
}

class Elimination {
  readonly width: number
  readonly rows: Int32Array
  readonly degree: Int32Array
  /** Edges missing among the neighbours of a vertex; −1 once it is eliminated. */
  readonly fill: Int32Array
  work = 0

  constructor(readonly graph: Graph) {
    const { order, offsets, targets } = graph
    this.width = (order + 31) >>> 5
    this.rows = new Int32Array(order * this.width)
    this.degree = Int32Array.from({ length: order }, (_, v) => degreeOf(graph, v))
    for (let v = 0; v < order; v++) for (let p = offsets[v]!; p < offsets[v + 1]!; p++) this.setBit(v, targets[p]!)
    this.fill = new Int32Array(order)
    for (let v = 0; v < order; v++) this.fill[v] = this.missingAround(v, this.neighbours(v))
  }

  setBit(v: number, u: number): void {
    this.rows[v * this.width + (u >>> 5)]! |= 1 << (u & 31)
  }

  clearBit(v: number, u: number): void {
    this.rows[v * this.width + (u >>> 5)]! &= ~(1 << (u & 31))
  }

  /** Members of the intersection of two rows; of one row when both are the same. */
  commonNeighbours(v: number, u: number): number[] {
    const members: number[] = []
    for (let w = 0; w < this.width; w++) {
      let word = this.rows[v * this.width + w]! & this.rows[u * this.width + w]!
      for (; word !== 0; word &= word - 1) members.push(32 * w + 31 - Math.clz32(word & -word))
    }
    this.work += this.width
    return members
  }

  neighbours(v: number): number[] {
    return this.commonNeighbours(v, v)
  }

  missingAround(v: number, neighbours: number[]): number {
    const { width, rows } = this
    let missing = neighbours.length * (neighbours.length - 1)
    for (const u of neighbours)
      for (let w = 0; w < width; w++) missing -= bitCount(rows[v * width + w]! & rows[u * width + w]!)
    this.work += neighbours.length * width
    return missing / 2
  }

  leastFill(): number {
    let best = -1
    for (let v = 0; v < this.fill.length; v++) {
      if (this.fill[v]! < 0) continue
      const gain = best < 0 ? -1 : this.fill[v]! - this.fill[best]! || this.degree[v]! - this.degree[best]!
      if (gain < 0) best = v
    }
    return best
  }

  /** Joins the neighbours of v and removes it; counts outside the neighbourhood are adjusted, inside recomputed. */
  eliminate(v: number): void {
    const neighbours = this.neighbours(v)
    for (const u of neighbours) {
      this.clearBit(u, v)
      this.degree[u]!--
    }
    this.fill[v] = -1
    this.work += neighbours.length ** 2
    for (let i = 0; i < neighbours.length; i++)
      for (let j = i + 1; j < neighbours.length; j++) this.join(neighbours[i]!, neighbours[j]!)
    for (const u of neighbours) this.fill[u] = this.missingAround(u, this.neighbours(u))
  }

  join(a: number, b: number): void {
    if ((this.rows[a * this.width + (b >>> 5)]! >>> (b & 31)) & 1) return
    for (const common of this.commonNeighbours(a, b)) this.fill[common]!--
    this.setBit(a, b)
    this.setBit(b, a)
    this.degree[a]!++
    this.degree[b]!++
  }
}

/**
 * A treewidth upper bound of the graph (−1 for no vertices at all is given as 0), or null when the graph has more than
 * 2048 vertices or the elimination would take more than a few tenths of a second. The same graph always gives the
 * same answer: the effort is counted, not timed.
 */
export function treewidthUpperBound(graph: Graph, limits = DEFAULTS): number | null {
  const firstCount = 2 * sizeOf(graph) * Math.ceil(graph.order / 32)
  if (graph.order > limits.maxOrder || firstCount > limits.maxWork) return null
  const elimination = new Elimination(graph)
  let bound = 0
  // Once no more than bound + 1 vertices remain, nothing wider can come.
  for (let remaining = graph.order; remaining > bound + 1; remaining--) {
    if (elimination.work > limits.maxWork) return null
    const v = elimination.leastFill()
    bound = Math.max(bound, elimination.degree[v]!)
    elimination.eliminate(v)
  }
  return bound
}

/** An order in which vertices are eliminated, and the most neighbours that any has when its turn comes. */
interface EliminationOrder {
  readonly order: Uint32Array
  readonly width: number
}

/** The order of greedy elimination with least fill; null where `treewidthUpperBound` gives no bound either. */
export function leastFillOrder(graph: Graph, limits = DEFAULTS): EliminationOrder | null {
  const firstCount = 2 * sizeOf(graph) * Math.ceil(graph.order / 32)
  if (graph.order > limits.maxOrder || firstCount > limits.maxWork) return null
  const elimination = new Elimination(graph)
  const order = new Uint32Array(graph.order)
  let width = 0
  for (let k = 0; k < graph.order; k++) {
    if (elimination.work > limits.maxWork) return null
    const v = elimination.leastFill()
    width = Math.max(width, elimination.degree[v]!)
    elimination.eliminate(v)
    order[k] = v
  }
  return { order, width }
}
