import { graphFromSortedEdges } from './build'
import type { Graph } from './graph'
import { sizeOf } from './graph'

/**
 * The graph on the same vertices with only the edges k where `keep[k]` is not 0, in time linear in the graph.
 * Edges are numbered anew, in the same order.
 * @throws RangeError when `keep` does not have one entry an edge
 */
export function keepEdges(graph: Graph, keep: Uint8Array): Graph {
  const size = sizeOf(graph)
  if (keep.length !== size) throw new RangeError(`keep has ${keep.length} entries for ${size} edges`)
  const ends = new Uint32Array(graph.ends.length)
  let length = 0
  for (let k = 0; k < size; k++) {
    if (keep[k] === 0) continue
    ends[length++] = graph.ends[2 * k]!
    ends[length++] = graph.ends[2 * k + 1]!
  }
  return graphFromSortedEdges(graph.order, ends.slice(0, length))
}
