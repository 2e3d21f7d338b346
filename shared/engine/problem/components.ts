import { degreeOf, type Graph } from '../graph/graph'

/** Which connected component each vertex belongs to; components are numbered by their lowest vertex. */
export interface Components {
  readonly count: number
  /** componentOf[v] is in 0 … count − 1. */
  readonly componentOf: Uint32Array
  /** Vertices with no neighbour; each is a component of its own. */
  readonly isolated: number
}

const UNSEEN = 0xffffffff

/** Connected components by breadth-first search, O(vertices + edges). */
export function connectedComponents(graph: Graph): Components {
  const { order, offsets, targets } = graph
  const componentOf = new Uint32Array(order).fill(UNSEEN)
  const queue = new Uint32Array(order)
  let count = 0
  let isolated = 0
  for (let start = 0; start < order; start++) {
    if (componentOf[start] !== UNSEEN) continue
    if (degreeOf(graph, start) === 0) isolated++
    componentOf[start] = count
    queue[0] = start
    let length = 1
    for (let head = 0; head < length; head++) {
      const v = queue[head]!
      for (let p = offsets[v]!; p < offsets[v + 1]!; p++) {
        const u = targets[p]!
        if (componentOf[u] !== UNSEEN) continue
        componentOf[u] = count
        queue[length++] = u
      }
    }
    count++
  }
  return { count, componentOf, isolated }
}
