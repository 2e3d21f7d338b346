import type { Graph } from '../../graph/graph'

/** The two sides of the connected parts of a graph: 0 or 1 by vertex, and how many there are of each. */
export interface Bipartition {
  readonly side: Uint8Array
  readonly sizes: readonly [number, number]
}

/** Colours one connected part from a vertex with −1 → 0, 1, …; returns its vertices, or null when it has an odd cycle. */
function colourPart(graph: Graph, start: number, colour: Int8Array): number[] | null {
  const part = [start]
  colour[start] = 0
  for (const v of part)
    for (let p = graph.offsets[v]!; p < graph.offsets[v + 1]!; p++) {
      const w = graph.targets[p]!
      if (colour[w] === colour[v]) return null
      if (colour[w]! >= 0) continue
      colour[w] = 1 - colour[v]!
      part.push(w)
    }
  return part
}

/**
 * Splits the vertices so that every edge joins the two sides, as evenly as turning whole connected parts allows: the
 * largest part first, each on the side that evens out.
 * @returns null when the graph has an odd cycle
 */
export function bipartition(graph: Graph): Bipartition | null {
  const colour = new Int8Array(graph.order).fill(-1)
  const parts: number[][] = []
  for (let v = 0; v < graph.order; v++) {
    if (colour[v]! >= 0) continue
    const part = colourPart(graph, v, colour)
    if (!part) return null
    parts.push(part)
  }
  parts.sort((a, b) => b.length - a.length || a[0]! - b[0]!)
  const side = new Uint8Array(graph.order)
  const sizes: [number, number] = [0, 0]
  for (const part of parts) {
    const ones = part.filter((v) => colour[v] === 1).length
    const zeros = part.length - ones
    const turn = Math.abs(sizes[0] + ones - sizes[1] - zeros) < Math.abs(sizes[0] + zeros - sizes[1] - ones)
    for (const v of part) side[v] = (colour[v] === 1) !== turn ? 1 : 0
    sizes[0] += turn ? ones : zeros
    sizes[1] += turn ? zeros : ones
  }
  return { side, sizes }
}
