import { degreeOf, sizeOf } from '../../graph/graph'
import type { Graph } from '../../graph/graph'

/** What a person checks an uploaded graph by. */
export interface GraphFigures {
  readonly qubits: number
  readonly couplers: number
  readonly leastDegree: number
  readonly mostDegree: number
  /** Connected parts, qubits without couplers included. */
  readonly parts: number
  readonly isolatedQubits: number
  readonly lowestNumber: number
  readonly highestNumber: number
}

/** Connected parts, by joining the ends of every coupler (union–find with halving of paths). */
function countParts({ order, ends }: Graph): number {
  const root = Uint32Array.from({ length: order }, (_, v) => v)
  const find = (v: number): number => {
    let at = v
    while (root[at] !== at) at = root[at] = root[root[at]!]!
    return at
  }
  let parts = order
  for (let k = 0; k < ends.length; k += 2) {
    const [a, b] = [find(ends[k]!), find(ends[k + 1]!)]
    if (a === b) continue
    root[a] = b
    parts--
  }
  return parts
}

/** @param ids qubit numbers, ascending; at least one */
export function graphFigures(graph: Graph, ids: Uint32Array): GraphFigures {
  let [leastDegree, mostDegree, isolatedQubits] = [Infinity, 0, 0]
  for (let v = 0; v < graph.order; v++) {
    const degree = degreeOf(graph, v)
    leastDegree = Math.min(leastDegree, degree)
    mostDegree = Math.max(mostDegree, degree)
    if (degree === 0) isolatedQubits++
  }
  return {
    qubits: graph.order,
    couplers: sizeOf(graph),
    leastDegree,
    mostDegree,
    parts: countParts(graph),
    isolatedQubits,
    lowestNumber: ids[0]!,
    highestNumber: ids.at(-1)!,
  }
}
