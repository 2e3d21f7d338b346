/**
 * Lower bounds on treewidth. Two vertices of any graph that is not complete have no more neighbours than its treewidth
 * says (a tree decomposition without superfluous bags has two leaves, each with a vertex of its own), and treewidth
 * never grows by deleting or contracting. So the second smallest degree of every subgraph and of every minor is a
 * bound (Bodlaender, Koster & Wolle, Contraction and treewidth lower bounds, ESA 2004; Gogate & Dechter, A complete
 * anytime algorithm for treewidth, UAI 2004).
 */
import { degreeOf, sizeOf, type Graph } from '../graph/graph'
import { Contraction } from './contraction'
import { DegreeBuckets } from './degree-buckets'
import { routingLowerBound, routingReach } from './treewidth-routing'

export interface LowerBoundLimits {
  /** The search for a better bound ends as soon as one is above this; one that cannot get above is not begun. */
  readonly enough: number
  /** List entries that contraction may read, shared out over its steps. */
  readonly contractionWork: number
  /** Vertices and edges that routing may look at. */
  readonly routingWork: number
}

/** A tenth of a second at most for a few thousand vertices. */
const DEFAULTS: LowerBoundLimits = { enough: Infinity, contractionWork: 1_500_000, routingWork: 3_000_000 }

/** Entries that contraction reads for each edge in any case; with less it would be cut short before it pays. */
const LEAST_READS = 16

/** A minor whose second smallest degree is d has at least d + 1 vertices, and d(d + 1)/2 edges. */
const mostByDegrees = (graph: Graph): number =>
  Math.max(0, Math.min(graph.order - 1, Math.floor((Math.sqrt(8 * sizeOf(graph) + 1) - 1) / 2)))

/** The largest d for which at least d + 1 vertices have d neighbours or more; no subgraph has a larger least degree. */
function mostByDeleting(graph: Graph): number {
  const withDegree = new Uint32Array(graph.order + 1)
  for (let v = 0; v < graph.order; v++) withDegree[degreeOf(graph, v)]!++
  let degree = graph.order
  for (let count = 0; degree > 0; degree--) {
    count += withDegree[degree]!
    if (count > degree) break
  }
  return degree
}

const mayContract = (graph: Graph, contractionWork: number): boolean => LEAST_READS * sizeOf(graph) <= contractionWork

/** An estimate of what `treewidthLowerBound` can reach at best; takes a few milliseconds. Not a bound on treewidth. */
export function treewidthReach(graph: Graph, limits: Partial<LowerBoundLimits> = {}): number {
  const { contractionWork, routingWork } = { ...DEFAULTS, ...limits }
  const byDegrees = mayContract(graph, contractionWork) ? mostByDegrees(graph) : mostByDeleting(graph)
  return Math.max(byDegrees, routingReach(graph, { maxWork: routingWork, useless: byDegrees }))
}

/** The largest second smallest degree while vertices of least degree are deleted one by one; linear time. */
function byDeleting(graph: Graph): number {
  const { order, offsets, targets } = graph
  const buckets = new DegreeBuckets(Int32Array.from({ length: order }, (_, v) => degreeOf(graph, v)))
  const deleted = new Uint8Array(order)
  let bound = 0
  while (buckets.count > bound + 1) {
    bound = Math.max(bound, buckets.secondDegree())
    const v = buckets.leastVertex()
    buckets.remove(v)
    deleted[v] = 1
    for (let p = offsets[v]!; p < offsets[v + 1]!; p++) if (deleted[targets[p]!] === 0) buckets.change(targets[p]!, -1)
  }
  return bound
}

/** The largest second smallest degree while edges are contracted; the best until the work is spent, `bound` at least. */
function byContracting(graph: Graph, bound: number, { enough, contractionWork }: LowerBoundLimits): number {
  if (!mayContract(graph, contractionWork)) return bound
  const contraction = new Contraction(graph)
  let best = bound
  while (contraction.vertices > best + 1 && contraction.work < contractionWork && best <= enough) {
    best = Math.max(best, contraction.buckets.secondDegree())
    contraction.contractLeast((contractionWork - contraction.work) / contraction.vertices)
  }
  return best
}

/**
 * A proved lower bound on the treewidth of the graph, 0 for graphs without edges: the best met while vertices of least
 * degree are deleted, while they are contracted into a neighbour with fewest common neighbours, and by routing (see
 * `routingLowerBound`). The effort is counted, not timed: the same graph and limits always give the same answer.
 */
export function treewidthLowerBound(graph: Graph, limits: Partial<LowerBoundLimits> = {}): number {
  const all = { ...DEFAULTS, ...limits }
  const { enough, routingWork } = all
  const needed = enough === Infinity ? 0 : enough
  let bound = byDeleting(graph)
  if (bound <= enough && mostByDegrees(graph) > Math.max(bound, needed)) bound = byContracting(graph, bound, all)
  if (bound > enough) return bound
  return Math.max(bound, routingLowerBound(graph, { maxWork: routingWork, useless: Math.max(bound, needed) }))
}
