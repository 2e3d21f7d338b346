import type { Embedding } from '../embedding/embedding'
import type { Graph } from '../graph/graph'
import type { Problem } from '../problem/problem'
import { couplersInChains, couplersOfInteractions, ownersOf } from './couplers'
import type { ChainCouplers, CouplerGroups, InteractionCouplers } from './couplers'

export type FieldSplit = 'even' | 'external coupling'

export interface LayoutInput {
  /** The logical problem in Ising form. */
  readonly ising: Problem
  /** A valid embedding of it in `machine`. */
  readonly embedding: Embedding
  readonly machine: Graph
  readonly fieldSplit: FieldSplit
  readonly chainCouplers: ChainCouplers
  /** Default: all. */
  readonly interactionCouplers?: InteractionCouplers
}

/**
 * A logical problem spread over qubits and couplers in logical units, before chain strengths and scale.
 * A *position* is an index into `qubits`.
 */
export interface Layout {
  readonly n: number
  /** Used machine qubits, ascending. */
  readonly qubits: Uint32Array
  /** Variable of each position. */
  readonly chainOf: Uint32Array
  /** Field of each position. */
  readonly h: Float64Array
  /** Positions joined by each used coupler, two per coupler, lower first, in order of machine edges. */
  readonly ends: Uint32Array
  /** Share of an interaction on each coupler; 0 on chain couplers. */
  readonly J: Float64Array
  readonly isChainCoupler: Uint8Array
  /** Qubits of each chain. */
  readonly chainLength: Uint32Array
  /** Chain couplers used in each chain. */
  readonly chainCouplerCount: Uint32Array
  /** Σ|J| over the interaction couplers of each position. */
  readonly externalCoupling: Float64Array
}

interface UsedCouplers {
  readonly edges: Uint32Array
  readonly J: Float64Array
  readonly isChainCoupler: Uint8Array
}

/** Merges chain couplers and interaction couplers into one list, ascending by machine edge. */
function mergeCouplers(machine: Graph, ising: Problem, inside: CouplerGroups, between: CouplerGroups): UsedCouplers {
  const size = machine.ends.length / 2
  const shareOfEdge = new Float64Array(size)
  const kind = new Uint8Array(size)
  for (const edge of inside.edges) kind[edge] = 2
  for (let k = 0; k < ising.values.length; k++) {
    const count = between.offsets[k + 1]! - between.offsets[k]!
    for (let p = between.offsets[k]!; p < between.offsets[k + 1]!; p++) {
      kind[between.edges[p]!] = 1
      shareOfEdge[between.edges[p]!] = ising.values[k]! / count
    }
  }
  const edges = new Uint32Array(inside.edges.length + between.edges.length)
  let used = 0
  for (let edge = 0; edge < size; edge++) if (kind[edge]) edges[used++] = edge
  return {
    edges,
    J: Float64Array.from(edges, (edge) => shareOfEdge[edge]!),
    isChainCoupler: Uint8Array.from(edges, (edge) => (kind[edge] === 2 ? 1 : 0)),
  }
}

/** Shares each field over its chain, evenly or by external coupling (evenly where a chain has none). */
function splitFields(
  ising: Problem,
  split: FieldSplit,
  chainOf: Uint32Array,
  chainLength: Uint32Array,
  externalCoupling: Float64Array,
): Float64Array {
  const total = new Float64Array(ising.n)
  chainOf.forEach((i, p) => (total[i]! += externalCoupling[p]!))
  return Float64Array.from(chainOf, (i, p) =>
    split === 'external coupling' && total[i]! > 0
      ? (ising.linear[i]! * externalCoupling[p]!) / total[i]!
      : ising.linear[i]! / chainLength[i]!,
  )
}

/**
 * Spreads a problem over the qubits and couplers of its embedding. A pure function: the same input gives the same bytes.
 * @throws RangeError when the embedding does not fit the problem and the machine (counts, overlaps, broken chains,
 *   interactions without a coupler)
 */
export function layOut(input: LayoutInput): Layout {
  const { ising, embedding, machine } = input
  if (embedding.offsets.length - 1 !== ising.n)
    throw new RangeError(`${embedding.offsets.length - 1} chains for ${ising.n} variables`)
  const owners = ownersOf(machine, embedding)
  const inside = couplersInChains(machine, embedding, owners, input.chainCouplers)
  const between = couplersOfInteractions(machine, ising, owners, input.interactionCouplers ?? 'all')
  const couplers = mergeCouplers(machine, ising, inside, between)
  const qubits = embedding.qubits.slice().sort()
  const positionOf = new Uint32Array(machine.order)
  qubits.forEach((q, p) => (positionOf[q] = p))
  const chainOf = Uint32Array.from(qubits, (q) => owners[q]!)
  const ends = new Uint32Array(2 * couplers.edges.length)
  const externalCoupling = new Float64Array(qubits.length)
  couplers.edges.forEach((edge, c) => {
    for (let side = 0; side < 2; side++) {
      const p = positionOf[machine.ends[2 * edge + side]!]!
      ends[2 * c + side] = p
      externalCoupling[p]! += Math.abs(couplers.J[c]!)
    }
  })
  const chainLength = Uint32Array.from({ length: ising.n }, (_, i) => embedding.offsets[i + 1]! - embedding.offsets[i]!)
  return {
    n: ising.n,
    qubits,
    chainOf,
    h: splitFields(ising, input.fieldSplit, chainOf, chainLength, externalCoupling),
    ends,
    J: couplers.J,
    isChainCoupler: couplers.isChainCoupler,
    chainLength,
    chainCouplerCount: Uint32Array.from({ length: ising.n }, (_, i) => inside.offsets[i + 1]! - inside.offsets[i]!),
    externalCoupling,
  }
}
