import type { Graph } from '../graph/graph'
import type { PublishedFamily } from '../machine/fabric'
import type { Embedding } from './embedding'

/** An embedding to begin from, in the indices of the task; variables that are new have an empty chain. */
export interface Start {
  readonly chains: Embedding
  /** 1 for each variable whose chain must stay as it is; length problem.order. */
  readonly frozen: Uint8Array
}

/** What is to be embedded, and onto what. */
export interface EmbeddingTask {
  readonly problem: Graph
  /** The working machine: broken couplers, and all couplers of broken qubits, are gone. */
  readonly machine: Graph
  /** 1 for each machine qubit that may be used; length machine.order. */
  readonly usable: Uint8Array
  /** Where the qubits lie in the plane, four numbers each (`Fabric.segments`); null where nobody said. */
  readonly segments: Float32Array | null
  /** The family that the machine was made of; null for custom graphs. Bounds that need one are left out then. */
  readonly family: PublishedFamily | null
  /** What `repair` and `shorten` begin from; null for the other methods. */
  readonly start: Start | null
}
