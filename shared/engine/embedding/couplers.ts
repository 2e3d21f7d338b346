import { edgeBetween } from '../graph/build'
import type { Graph } from '../graph/graph'
import { sizeOf } from '../graph/graph'
import type { Embedding } from './embedding'
import { chainCount } from './embedding'

/** Machine edge ids by group: those of group i are edges[offsets[i] … offsets[i + 1] − 1], ascending. */
export interface CouplerGroups {
  readonly offsets: Uint32Array
  readonly edges: Uint32Array
}

/** The chain of each qubit, −1 for free ones. */
function chainByQubit(embedding: Embedding, machine: Graph): Int32Array {
  const chain = new Int32Array(machine.order).fill(-1)
  for (let i = 0; i < chainCount(embedding); i++)
    for (let p = embedding.offsets[i]!; p < embedding.offsets[i + 1]!; p++) chain[embedding.qubits[p]!] = i
  return chain
}

/** Groups the machine's edges by `groupOf(chain of one end, chain of the other)`, leaving out those with −1. */
function groupEdges(
  embedding: Embedding,
  machine: Graph,
  groups: number,
  groupOf: (a: number, b: number) => number,
): CouplerGroups {
  const chain = chainByQubit(embedding, machine)
  const groupByEdge = new Int32Array(sizeOf(machine)).fill(-1)
  const offsets = new Uint32Array(groups + 1)
  for (let k = 0; k < groupByEdge.length; k++) {
    const a = chain[machine.ends[2 * k]!]!
    const b = chain[machine.ends[2 * k + 1]!]!
    if (a < 0 || b < 0) continue
    const group = groupOf(a, b)
    groupByEdge[k] = group
    if (group >= 0) offsets[group + 1]!++
  }
  for (let i = 0; i < groups; i++) offsets[i + 1]! += offsets[i]!
  const edges = new Uint32Array(offsets[groups]!)
  const next = offsets.slice(0, groups)
  groupByEdge.forEach((group, k) => {
    if (group >= 0) edges[next[group]!++] = k
  })
  return { offsets, edges }
}

/** The couplers inside each chain, by variable: machine edges with both ends in the chain. */
export function chainCouplers(embedding: Embedding, machine: Graph): CouplerGroups {
  return groupEdges(embedding, machine, chainCount(embedding), (a, b) => (a === b ? a : -1))
}

/**
 * The couplers that can carry each interaction, in the order of the problem graph's edges: machine edges between the
 * two chains. Couplers between chains that do not interact are in no group.
 */
export function interactionCouplers(embedding: Embedding, problem: Graph, machine: Graph): CouplerGroups {
  return groupEdges(embedding, machine, sizeOf(problem), (a, b) => edgeBetween(problem, a, b))
}
