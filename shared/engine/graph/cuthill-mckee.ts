/**
 * An order of the vertices that draws neighbours together: breadth first from a vertex far out, each vertex's new
 * neighbours by ascending degree, and all of it backwards (Cuthill & McKee, Reducing the bandwidth of sparse symmetric
 * matrices, ACM 1969; reversed by George, thesis, Stanford 1971). The start is a pseudo-peripheral vertex (George &
 * Liu, An implementation of a pseudoperipheral node finder, ACM TOMS 5, 1979).
 */
import { degreeOf, type Graph } from './graph'

/** Vertices in the order of a breadth-first visit, and where the last level of it begins. */
interface Visit {
  readonly count: number
  readonly levels: number
  readonly lastLevel: number
}

class Visitor {
  readonly queue: Uint32Array
  private readonly seen: Uint32Array
  private round = 0
  private readonly byDegree: Graph['targets']

  constructor(private readonly graph: Graph) {
    const { order, offsets, targets } = graph
    this.queue = new Uint32Array(order)
    this.seen = new Uint32Array(order)
    this.byDegree = targets.slice()
    for (let v = 0; v < order; v++)
      this.byDegree
        .subarray(offsets[v], offsets[v + 1])
        .sort((a, b) => degreeOf(graph, a) - degreeOf(graph, b) || a - b)
  }

  /** Fills the queue from the place `at` with the component of the start. */
  visit(start: number, at: number): Visit {
    const { queue, seen, byDegree } = this
    const { offsets } = this.graph
    const round = ++this.round
    queue[at] = start
    seen[start] = round
    let end = at + 1
    let levels = 0
    let lastLevel = at
    for (let head = at; head < end;) {
      lastLevel = head
      levels++
      for (const levelEnd = end; head < levelEnd; head++) {
        const v = queue[head]!
        for (let p = offsets[v]!; p < offsets[v + 1]!; p++) {
          const u = byDegree[p]!
          if (seen[u] === round) continue
          seen[u] = round
          queue[end++] = u
        }
      }
    }
    return { count: end - at, levels, lastLevel }
  }

  /** Leaves the component's visit from a pseudo-peripheral vertex in the queue. */
  visitFromAfar(start: number, at: number): number {
    let visit = this.visit(start, at)
    for (;;) {
      const last = this.queue.subarray(visit.lastLevel, at + visit.count)
      const root = this.queue[at]!
      const far = last.reduce((best, v) => (degreeOf(this.graph, v) < degreeOf(this.graph, best) ? v : best))
      const next = this.visit(far, at)
      if (next.levels > visit.levels) {
        visit = next
        continue
      }
      this.visit(root, at)
      return visit.count
    }
  }
}

/**
 * The vertices in reverse Cuthill–McKee order, component after component as their lowest vertices come: `order[place]`
 * is a vertex. The same graph always gives the same order. O(edges · log(highest degree)) a visit, a few visits.
 */
export function reverseCuthillMcKee(graph: Graph): Uint32Array {
  const visitor = new Visitor(graph)
  const placed = new Uint8Array(graph.order)
  let at = 0
  for (let v = 0; v < graph.order; v++) {
    if (placed[v] === 1) continue
    const count = visitor.visitFromAfar(v, at)
    const component = visitor.queue.subarray(at, at + count)
    for (const u of component) placed[u] = 1
    component.reverse()
    at += count
  }
  return visitor.queue
}

/** Where each vertex stands: the inverse of an order. */
export function placesOf(order: Uint32Array): Uint32Array {
  const places = new Uint32Array(order.length)
  order.forEach((v, place) => (places[v] = place))
  return places
}

/** The greatest distance between the places of two neighbours; 0 without edges. */
export function bandwidthOf({ ends }: Graph, places: ArrayLike<number>): number {
  let bandwidth = 0
  for (let k = 0; k < ends.length; k += 2)
    bandwidth = Math.max(bandwidth, Math.abs(places[ends[k]!]! - places[ends[k + 1]!]!))
  return bandwidth
}
