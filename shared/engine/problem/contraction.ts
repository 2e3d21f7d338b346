import { degreeOf, sizeOf, type Graph } from '../graph/graph'
import { DegreeBuckets } from './degree-buckets'

/**
 * A graph that shrinks by contracting edges: after every step it is a minor of the graph it began as. Lists of
 * neighbours are linked, so that two vertices become one by joining their lists; entries that repeat a neighbour, or
 * name the vertex itself, are dropped when a list is next read. Nothing is allocated after the start.
 */
export class Contraction {
  /** Vertices that are left, by number of distinct neighbours. */
  readonly buckets: DegreeBuckets
  edges: number
  /** List entries read so far. */
  work = 0
  private readonly target: Uint32Array
  private readonly head: Int32Array
  private readonly tail: Int32Array
  private readonly next: Int32Array
  /** The vertex that a vertex was merged into, itself when it was not. */
  private readonly mergedInto: Int32Array
  private readonly beside: Int32Array
  private readonly seen: Int32Array
  private readonly found: Int32Array
  private round = 0

  constructor(graph: Graph) {
    const { order, offsets } = graph
    this.buckets = new DegreeBuckets(Int32Array.from({ length: order }, (_, v) => degreeOf(graph, v)))
    this.edges = sizeOf(graph)
    this.target = graph.targets.slice()
    this.next = Int32Array.from(this.target, (_, slot) => slot + 1)
    this.head = new Int32Array(order).fill(-1)
    this.tail = new Int32Array(order).fill(-1)
    for (let v = 0; v < order; v++) {
      if (degreeOf(graph, v) === 0) continue
      this.head[v] = offsets[v]!
      this.tail[v] = offsets[v + 1]! - 1
      this.next[this.tail[v]!] = -1
    }
    this.mergedInto = Int32Array.from({ length: order }, (_, v) => v)
    this.beside = new Int32Array(order)
    this.seen = new Int32Array(order)
    this.found = new Int32Array(order)
  }

  get vertices(): number {
    return this.buckets.count
  }

  /**
   * Takes a vertex of least degree and contracts the edge to the neighbour it has the fewest neighbours in common with,
   * which keeps most edges (the least-common-neighbour rule). Looks at all neighbours as long as no more than
   * `allowance` list entries are read, at the one of least degree in any case. A vertex without neighbours is removed.
   */
  contractLeast(allowance: number): void {
    const { buckets, found } = this
    const v = buckets.leastVertex()
    const count = this.readNeighbours(v)
    buckets.remove(v)
    if (count === 0) return
    const into = this.fewestShared(count, allowance)
    this.markNeighbours(into)
    for (let i = 0; i < count; i++) {
      const w = found[i]!
      if (w === into) continue
      if (this.seen[w] === this.round) {
        buckets.change(w, -1)
        this.edges--
      } else buckets.change(into, 1)
    }
    buckets.change(into, -1)
    this.edges--
    this.merge(v, into)
  }

  /** Writes the distinct neighbours of v to `found`, marks them in `beside`, and returns their number. */
  private readNeighbours(v: number): number {
    const { next, found, beside } = this
    const mark = ++this.round
    let count = 0
    let before = -1
    for (let slot = this.head[v]!; slot >= 0; slot = next[slot]!) {
      const w = this.vertexAt(slot)
      this.work++
      if (w === v || beside[w] === mark) {
        this.drop(v, before, slot)
        continue
      }
      beside[w] = mark
      found[count++] = w
      before = slot
    }
    return count
  }

  private fewestShared(count: number, allowance: number): number {
    const { found, buckets } = this
    const { degree } = buckets
    const besideMark = this.round
    let best = found[0]!
    for (let i = 1; i < count; i++) if (degree[found[i]!]! < degree[best]!) best = found[i]!
    const least = best
    let fewest = this.sharedWith(best, besideMark, Infinity)
    const limit = this.work + allowance
    for (let i = 0; i < count && this.work < limit; i++) {
      const w = found[i]!
      if (w === least) continue
      const shared = this.sharedWith(w, besideMark, fewest)
      if (shared > fewest || (shared === fewest && degree[w]! >= degree[best]!)) continue
      fewest = shared
      best = w
    }
    return best
  }

  /** Neighbours of w marked in `beside`; marks them in `seen`, and stops above `enough`. */
  private sharedWith(w: number, besideMark: number, enough: number): number {
    const { next, beside, seen } = this
    const mark = ++this.round
    let shared = 0
    let before = -1
    let read = 0
    for (let slot = this.head[w]!; slot >= 0 && shared <= enough; slot = next[slot]!) {
      const x = this.vertexAt(slot)
      read++
      if (x === w || seen[x] === mark) {
        this.drop(w, before, slot)
        continue
      }
      seen[x] = mark
      if (beside[x] === besideMark) shared++
      before = slot
    }
    this.work += read
    return shared
  }

  /** Marks the neighbours of w in `seen` with the present round. */
  private markNeighbours(w: number): void {
    this.sharedWith(w, -1, Infinity)
  }

  /** The vertex that an entry names now; the entry is brought up to date. */
  private vertexAt(slot: number): number {
    const { target, mergedInto } = this
    let v = target[slot]!
    if (mergedInto[v] === v) return v
    do v = mergedInto[v]!
    while (mergedInto[v] !== v)
    target[slot] = v
    return v
  }

  private drop(v: number, before: number, slot: number): void {
    const after = this.next[slot]!
    if (before < 0) this.head[v] = after
    else this.next[before] = after
    if (after < 0) this.tail[v] = before
  }

  private merge(v: number, into: number): void {
    this.mergedInto[v] = into
    if (this.head[v]! < 0) return
    if (this.tail[into]! < 0) this.head[into] = this.head[v]!
    else this.next[this.tail[into]!] = this.head[v]!
    this.tail[into] = this.tail[v]!
  }
}
