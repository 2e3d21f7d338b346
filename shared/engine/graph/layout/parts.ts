import { graphFromEdges } from '../build'
import type { Graph } from '../graph'

/** A connected part of a graph as a graph of its own; vertex i of it is `vertices[i]` of the whole. */
export interface Part {
  readonly graph: Graph
  readonly vertices: Int32Array
}

/**
 * Vertices of each connected part of what `kept` marks, breadth first: neighbours then lie near each other in memory,
 * whatever the numbering of the whole.
 */
function partLists({ order, offsets, targets }: Graph, kept: Uint8Array): Int32Array[] {
  const left = kept.slice()
  const queue = new Int32Array(order)
  const lists: Int32Array[] = []
  for (let start = 0; start < order; start++) {
    if (left[start] === 0) continue
    let count = 1
    queue[0] = start
    left[start] = 0
    for (let i = 0; i < count; i++) {
      const v = queue[i]!
      for (let p = offsets[v]!; p < offsets[v + 1]!; p++) {
        const w = targets[p]!
        if (left[w] === 0) continue
        left[w] = 0
        queue[count++] = w
      }
    }
    lists.push(queue.slice(0, count))
  }
  return lists
}

/** The graph on `vertices`, which are joined to no others but those that `kept` leaves out. */
function partGraph({ offsets, targets }: Graph, vertices: Int32Array, kept: Uint8Array, indexOf: Int32Array): Graph {
  const ends: number[] = []
  vertices.forEach((v, i) => (indexOf[v] = i))
  vertices.forEach((v, i) => {
    for (let p = offsets[v]!; p < offsets[v + 1]!; p++)
      if (targets[p]! > v && kept[targets[p]!] !== 0) ends.push(i, indexOf[targets[p]!]!)
  })
  return graphFromEdges(vertices.length, ends)
}

/**
 * The connected parts of the subgraph of the vertices that `kept` marks with 1 (all without it), largest first, ties
 * by lowest vertex.
 */
export function connectedGraphs(graph: Graph, kept: Uint8Array = new Uint8Array(graph.order).fill(1)): Part[] {
  const indexOf = new Int32Array(graph.order)
  const lists = partLists(graph, kept)
  lists.sort((a, b) => b.length - a.length || a[0]! - b[0]!)
  return lists.map((vertices) => ({ graph: partGraph(graph, vertices, kept, indexOf), vertices }))
}
