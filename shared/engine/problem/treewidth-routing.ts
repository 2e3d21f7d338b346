/**
 * A lower bound on treewidth from routing. A graph of treewidth w has a set S of at most w + 1 vertices, a bag of its
 * tree decomposition, such that no part of the rest holds more than half of k chosen terminals (Robertson & Seymour,
 * Graph minors II, 1986). Route a path for each of the k(k − 1) ordered pairs of terminals: pairs that S leaves in one
 * part are at most (k/2 − 1)(k − |S ∩ terminals|), all other paths meet S. So if vertex x lies on c(x) paths, the sum of
 * c(x) − (k/2 − 1)[x is a terminal] over S is at least k²/2, and S is no smaller than the number of largest terms that
 * reach it. Expanders and grids spread their paths well; there the bound grows far beyond degrees (the other direction
 * of the argument in Leighton & Rao, J. ACM 46, 1999).
 */
import { degreeOf, sizeOf, type Graph } from '../graph/graph'

export interface RoutingLimits {
  /** Vertices and edges that may be looked at; with more, fewer terminals are taken. */
  readonly maxWork: number
  /** Bounds of this size or less are of no use: the answer is 0 where no better one is in reach. */
  readonly useless: number
}

const DEFAULTS = {
  maxWork: 3_000_000,
  useless: 0,
  /** Trees from which it is judged whether the rest can pay. */
  sample: 8,
}

/** A terminal's own paths make its term at least about 3k/2, so no more than about k/3 terms are ever needed. */
const TERMINALS_A_TERM = 3

/** Shortest-path trees over one graph; every tree adds its paths to the loads of the vertices they meet. */
class PathLoads {
  readonly loads: Float64Array
  /** Sum of all loads. */
  total = 0
  private readonly depth: Int32Array
  private readonly parent: Int32Array
  private readonly queue: Int32Array
  /** Terminals at or below a vertex of the present tree. */
  private readonly below: Int32Array

  constructor(
    private readonly graph: Graph,
    private readonly isTerminal: Uint8Array,
    /** Vertices of the part that is routed in. */
    private readonly partSize: number,
  ) {
    this.loads = new Float64Array(graph.order)
    this.depth = new Int32Array(graph.order)
    this.parent = new Int32Array(graph.order)
    this.queue = new Int32Array(graph.order)
    this.below = new Int32Array(graph.order)
  }

  /** Routes paths from `source` to all terminals that it reaches, through parents with little load so far. */
  routeFrom(source: number): void {
    const { queue, parent, below, loads, isTerminal } = this
    const count = this.grow(source)
    for (let i = 0; i < count; i++) below[queue[i]!] = isTerminal[queue[i]!]!
    for (let i = count - 1; i > 0; i--) {
      const v = queue[i]!
      loads[v]! += below[v]!
      this.total += below[v]!
      below[parent[v]!]! += below[v]!
    }
    loads[source]! += below[source]! - 1
    this.total += below[source]! - 1
  }

  /** Grows the tree in breadth; `queue` then holds its vertices, nearest first. Returns their number. */
  private grow(source: number): number {
    const { queue, parent, depth, loads } = this
    const { offsets, targets } = this.graph
    depth.fill(-1)
    depth[source] = 0
    queue[0] = source
    let length = 1
    for (let head = 0; head < length; head++) {
      const v = queue[head]!
      // Once all are reached, the last level has nothing to offer.
      if (length === this.partSize && depth[v] === depth[queue[length - 1]!]) break
      const next = depth[v]! + 1
      for (let p = offsets[v]!; p < offsets[v + 1]!; p++) {
        const w = targets[p]!
        if (depth[w]! < 0) {
          depth[w] = next
          parent[w] = v
          queue[length++] = w
        } else if (depth[w] === next && loads[v]! < loads[parent[w]!]!) parent[w] = v
      }
    }
    return length
  }
}

/** The vertices of the part around `start`. */
function partAround({ order, offsets, targets }: Graph, start: number): number[] {
  const seen = new Uint8Array(order)
  seen[start] = 1
  const part = [start]
  for (let head = 0; head < part.length; head++) {
    const v = part[head]!
    for (let p = offsets[v]!; p < offsets[v + 1]!; p++) {
      if (seen[targets[p]!] !== 0) continue
      seen[targets[p]!] = 1
      part.push(targets[p]!)
    }
  }
  return part
}

/** How many of the largest terms are needed to reach `sum`. */
function termsToReach(terms: Float64Array, sum: number): number {
  terms.sort()
  let reached = 0
  let count = 0
  for (let i = terms.length - 1; i >= 0 && reached < sum; i--) {
    reached += terms[i]!
    count++
  }
  return count
}

/** A step prime to `count`, near its golden section: multiples of it spread evenly. */
function spreadingStride(count: number): number {
  const commonDivisor = (a: number, b: number): number => (b === 0 ? a : commonDivisor(b, a % b))
  let stride = Math.max(1, Math.round(count * 0.618))
  while (commonDivisor(count, stride) !== 1) stride++
  return stride
}

/** Terminals of one connected part, and the loads that routing between them gives. */
interface Terminals {
  /** Spread evenly over the part, from the start on. */
  readonly vertices: readonly number[]
  readonly paths: PathLoads
  readonly isTerminal: Uint8Array
  readonly partSize: number
}

/** As many terminals as the work allows, in the part around a vertex of largest degree. */
function terminalsOf(graph: Graph, maxWork: number): Terminals {
  let hub = 0
  for (let v = 1; v < graph.order; v++) if (degreeOf(graph, v) > degreeOf(graph, hub)) hub = v
  const part = partAround(graph, hub)
  const count = Math.min(part.length, Math.floor(maxWork / (part.length + 2 * sizeOf(graph))))
  const stride = spreadingStride(count)
  const vertices = Array.from(
    { length: count },
    (_, i) => part[Math.floor((((i * stride) % count) * part.length) / count)]!,
  )
  const isTerminal = new Uint8Array(graph.order)
  for (const v of vertices) isTerminal[v] = 1
  return { vertices, isTerminal, paths: new PathLoads(graph, isTerminal, part.length), partSize: part.length }
}

/** Most terminals that the work allows; there may be fewer vertices. */
const affordable = (graph: Graph, maxWork: number): number =>
  sizeOf(graph) === 0 ? 0 : Math.min(graph.order, Math.floor(maxWork / (2 * sizeOf(graph))))

/** The bound that would come of it if all trees were like the first few and loads spread evenly, the best there is. */
function reachOf({ vertices, paths, partSize }: Terminals): number {
  const count = vertices.length
  const sample = vertices.slice(0, DEFAULTS.sample)
  if (count <= 3) return 0
  for (const v of sample) paths.routeFrom(v)
  const meanTerm = (count * (paths.total / sample.length - count / 2 + 1)) / partSize
  return Math.min(count / TERMINALS_A_TERM, count ** 2 / 2 / meanTerm)
}

/** An estimate of what `routingLowerBound` can reach at best, from a few of its trees; 0 where that is of no use. */
export function routingReach(graph: Graph, limits: Partial<RoutingLimits> = {}): number {
  const { maxWork, useless } = { ...DEFAULTS, ...limits }
  if (affordable(graph, maxWork) / TERMINALS_A_TERM <= useless) return 0
  return reachOf(terminalsOf(graph, maxWork))
}

/**
 * A proved lower bound on treewidth from shortest paths between all vertices of the part around a vertex of largest
 * degree, or between as many, evenly chosen, as the work allows. 0 where that is too few to be of use.
 */
export function routingLowerBound(graph: Graph, limits: Partial<RoutingLimits> = {}): number {
  const { maxWork, useless } = { ...DEFAULTS, ...limits }
  if (affordable(graph, maxWork) / TERMINALS_A_TERM <= useless) return 0
  const terminals = terminalsOf(graph, maxWork)
  const { vertices, isTerminal, paths } = terminals
  const count = vertices.length
  if (reachOf(terminals) <= useless) return 0
  for (const v of vertices.slice(DEFAULTS.sample)) paths.routeFrom(v)
  const terms = new Float64Array(graph.order)
  for (let v = 0; v < terms.length; v++) terms[v] = paths.loads[v]! - isTerminal[v]! * (count / 2 - 1)
  return Math.max(0, termsToReach(terms, count ** 2 / 2) - 1)
}
