import { graphFromSortedEdges } from '#shared/engine/graph/build'
import type { Graph } from '#shared/engine/graph/graph'
import type { LatticeData } from './types'

/** The machine's working couplers as a graph of its qubits. */
export const machineGraphOf = ({ ids, ends }: Pick<LatticeData, 'ids' | 'ends'>): Graph =>
  graphFromSortedEdges(ids.length, ends)

/** Qubits that share a working coupler with q, ascending, without copying. */
export const coupledTo = ({ offsets, targets }: Graph, q: number): Uint32Array =>
  targets.subarray(offsets[q], offsets[q + 1])
