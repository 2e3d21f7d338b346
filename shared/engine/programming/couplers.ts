import type { Embedding } from '../embedding/embedding'
import type { Graph } from '../graph/graph'
import type { Problem } from '../problem/problem'

/** Machine edges grouped: group g holds edges[offsets[g] … offsets[g + 1] − 1], ascending machine edge numbers. */
export interface CouplerGroups {
  readonly offsets: Uint32Array
  readonly edges: Uint32Array
}

export type InteractionCouplers = 'all' | 'one'
export type ChainCouplers = 'all' | 'spanning tree'

/**
 * The variable that owns each qubit of the machine, or −1.
 * @throws RangeError for an empty chain, a qubit outside the machine or a qubit in two chains
 */
export function ownersOf(machine: Graph, embedding: Embedding): Int32Array {
  const owners = new Int32Array(machine.order).fill(-1)
  for (let i = 0; i + 1 < embedding.offsets.length; i++) {
    if (embedding.offsets[i] === embedding.offsets[i + 1]) throw new RangeError(`variable ${i} has no qubit`)
    for (let p = embedding.offsets[i]!; p < embedding.offsets[i + 1]!; p++) {
      const q = embedding.qubits[p]!
      if (q >= machine.order) throw new RangeError(`qubit ${q} of variable ${i} is not on the machine`)
      if (owners[q] !== -1) throw new RangeError(`qubit ${q} is used by variables ${owners[q]} and ${i}`)
      owners[q] = i
    }
  }
  return owners
}

/** Counting sort of machine edges by group; edges with group −1 are left out, order within a group is kept. */
function groupEdges(groupOfEdge: Int32Array, groups: number): CouplerGroups {
  const offsets = new Uint32Array(groups + 1)
  for (const g of groupOfEdge) if (g >= 0) offsets[g + 1]!++
  for (let g = 0; g < groups; g++) offsets[g + 1]! += offsets[g]!
  const edges = new Uint32Array(offsets[groups]!)
  const next = offsets.slice(0, groups)
  groupOfEdge.forEach((g, edge) => {
    if (g >= 0) edges[next[g]!++] = edge
  })
  return { offsets, edges }
}

/** Keeps, of the edges inside each chain, those of a spanning tree: ascending edge numbers, union–find (Kruskal 1956). */
function keepSpanningTrees(machine: Graph, groupOfEdge: Int32Array): void {
  const parent = Uint32Array.from({ length: machine.order }, (_, q) => q)
  const rootOf = (q: number): number => {
    while (parent[q] !== q) q = parent[q] = parent[parent[q]!]!
    return q
  }
  for (let edge = 0; edge < groupOfEdge.length; edge++) {
    if (groupOfEdge[edge]! < 0) continue
    const a = rootOf(machine.ends[2 * edge]!)
    const b = rootOf(machine.ends[2 * edge + 1]!)
    if (a === b) groupOfEdge[edge] = -1
    else parent[a] = b
  }
}

/**
 * Couplers inside each chain, one group per variable: all of them, or those of a spanning tree.
 * @throws RangeError for a chain that is not connected
 */
export function couplersInChains(
  machine: Graph,
  embedding: Embedding,
  owners: Int32Array,
  which: ChainCouplers,
): CouplerGroups {
  const inside = new Int32Array(machine.ends.length / 2).fill(-1)
  for (let edge = 0; edge < inside.length; edge++) {
    const a = owners[machine.ends[2 * edge]!]!
    if (a >= 0 && a === owners[machine.ends[2 * edge + 1]!]) inside[edge] = a
  }
  const tree = inside.slice()
  keepSpanningTrees(machine, tree)
  const n = embedding.offsets.length - 1
  const spanning = groupEdges(tree, n)
  for (let i = 0; i < n; i++) {
    const needed = embedding.offsets[i + 1]! - embedding.offsets[i]! - 1
    if (spanning.offsets[i + 1]! - spanning.offsets[i]! !== needed)
      throw new RangeError(`the chain of variable ${i} is not connected`)
  }
  return which === 'all' ? groupEdges(inside, n) : spanning
}

/** Position of the pair (row, col), row < col, among the sorted pairs of the problem, or −1. */
function interactionOf(ising: Problem, starts: Uint32Array, row: number, col: number): number {
  let low = starts[row]!
  let high = starts[row + 1]!
  while (low < high) {
    const middle = (low + high) >> 1
    if (ising.cols[middle]! < col) low = middle + 1
    else high = middle
  }
  return low < starts[row + 1]! && ising.cols[low] === col ? low : -1
}

/**
 * Couplers that carry each interaction, one group per interaction: all between the two chains, or the one with the
 * lowest edge number.
 * @throws RangeError for an interaction without a coupler
 */
export function couplersOfInteractions(
  machine: Graph,
  ising: Problem,
  owners: Int32Array,
  which: InteractionCouplers,
): CouplerGroups {
  const starts = new Uint32Array(ising.n + 1)
  for (const row of ising.rows) starts[row + 1]!++
  for (let i = 0; i < ising.n; i++) starts[i + 1]! += starts[i]!
  const between = new Int32Array(machine.ends.length / 2).fill(-1)
  const served = new Uint8Array(ising.values.length)
  for (let edge = 0; edge < between.length; edge++) {
    const a = owners[machine.ends[2 * edge]!]!
    const b = owners[machine.ends[2 * edge + 1]!]!
    if (a < 0 || b < 0 || a === b) continue
    const k = interactionOf(ising, starts, Math.min(a, b), Math.max(a, b))
    if (k < 0 || (which === 'one' && served[k])) continue
    served[k] = 1
    between[edge] = k
  }
  const missing = served.indexOf(0)
  if (missing >= 0)
    throw new RangeError(`no coupler joins the chains of variables ${ising.rows[missing]} and ${ising.cols[missing]}`)
  return groupEdges(between, ising.values.length)
}
