import type { Graph } from '../graph/graph'

/** Connected parts of a graph: `partOf[v]` (−1 for vertices left out) and the number of vertices of each part. */
export interface Parts {
  readonly partOf: Int32Array
  readonly sizes: readonly number[]
}

/** Finds the connected parts of a graph, or of the subgraph of the vertices that `kept` marks with 1. */
export function connectedParts(graph: Graph, kept?: Uint8Array): Parts {
  const partOf = new Int32Array(graph.order).fill(-1)
  const queue = new Int32Array(graph.order)
  const sizes: number[] = []
  for (let start = 0; start < graph.order; start++) {
    if (partOf[start]! >= 0 || (kept && kept[start] === 0)) continue
    let count = 1
    queue[0] = start
    partOf[start] = sizes.length
    for (let i = 0; i < count; i++) {
      const v = queue[i]!
      for (let p = graph.offsets[v]!; p < graph.offsets[v + 1]!; p++) {
        const w = graph.targets[p]!
        if (partOf[w]! >= 0 || (kept && kept[w] === 0)) continue
        partOf[w] = sizes.length
        queue[count++] = w
      }
    }
    sizes.push(count)
  }
  return { partOf, sizes }
}
