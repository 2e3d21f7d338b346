import type { Graph } from '../graph/graph'

/** The published machine-graph families with their sizes (docs/formulas.md, Machine graphs). */
export type PublishedFamily =
  | { readonly kind: 'chimera'; readonly m: number; readonly n: number; readonly t: number }
  | { readonly kind: 'pegasus'; readonly m: number; readonly trimmed: boolean }
  | { readonly kind: 'zephyr'; readonly m: number; readonly t: number }
  | { readonly kind: 'king'; readonly width: number; readonly height: number }
  | { readonly kind: 'square'; readonly width: number; readonly height: number }
  | { readonly kind: 'cubic'; readonly width: number; readonly height: number; readonly depth: number }
  | { readonly kind: 'heavy-hex'; readonly rows: number; readonly columns: number }

/** A graph of no family, read from a file; the graph itself is kept beside the machine. */
export interface CustomGraph {
  readonly kind: 'custom'
  /** Name of the file that it came in. */
  readonly file: string
  readonly qubits: number
  readonly couplers: number
  /** Equal for equal numbers, couplers and positions (`graphFingerprint`). */
  readonly fingerprint: string
  /** Whether the file said where the qubits lie; otherwise a drawing was worked out once. */
  readonly positions: 'given' | 'drawn'
}

export type Family = PublishedFamily | CustomGraph

/**
 * A family graph as manufactured, before defects. Qubits are dense indices 0 … order − 1, ascending by published
 * number; `ids[q]` is that published number, the one people type and read.
 */
export interface Fabric {
  readonly family: Family
  readonly graph: Graph
  readonly ids: Uint32Array
  /**
   * Where each qubit lies in the plane, for drawing: segment q runs from (segments[4q], segments[4q + 1]) to
   * (segments[4q + 2], segments[4q + 3]); y grows downwards. A qubit of a lattice of points has both ends equal.
   * Unit: one line spacing (parallel neighbouring qubits are at least 1 apart).
   */
  readonly segments: Float32Array
}

/** Parts of a fabric that do not work, by published number. */
export interface Defects {
  readonly qubits: readonly number[]
  readonly couplers: readonly (readonly [number, number])[]
}

/** The working machine: same vertex indices as the fabric; broken couplers and all couplers of broken qubits are gone. */
export interface WorkingGraph {
  readonly graph: Graph
  /** 1 where the qubit works. */
  readonly usable: Uint8Array
}
