/**
 * What the lattice drawing is given. Qubits and couplers are dense indices of the machine graph, variables dense indices
 * of the problem; lengths are in line spacings, and y grows downwards.
 */
export interface LatticeData {
  /** Published number of each qubit, the one people type and read. */
  readonly ids: Uint32Array
  /** Where qubit q lies: from (segments[4q], segments[4q + 1]) to (segments[4q + 2], segments[4q + 3]). */
  readonly segments: Float32Array
  /** 1 where the qubit works. */
  readonly usable: Uint8Array
  /** The two qubits of each working coupler, the lower first, in ascending order as in `Graph`. */
  readonly ends: Uint32Array
  /** The two points at which each coupler meets its qubits; both the same where the qubits cross. */
  readonly places: Float32Array
  /** Qubit pairs whose coupler does not work although both qubits do. */
  readonly missingCouplers?: Uint32Array
}

export interface ChainLayer {
  readonly labels: readonly string[]
  /** The chain of variable i is qubits[offsets[i] … offsets[i + 1] − 1]. */
  readonly offsets: Uint32Array
  readonly qubits: Uint32Array
  /** Interactions as pairs of variables. */
  readonly neighbours: Uint32Array
}

export interface BreakLayer {
  /** Share of reads in which each chain broke, 0 … 1. */
  readonly chainRate: Float64Array
  /** Share of reads in which the two qubits of a coupler inside a chain disagreed, by coupler index. */
  readonly couplerRate: ReadonlyMap<number, number> | Float64Array
  readonly reads: number
}

export interface LoadLayer {
  /** Coupling sum of each qubit over the machine's range, 0 … 1. */
  readonly qubitLoad: Float32Array
}

export interface ReadLayer {
  /** −1 or +1 for each qubit, 0 where the qubit is not used. */
  readonly spins: Int8Array
}

/** Rates at which parts of the machine broke, 0 … 1: dense qubits, and couplers by index, each beside its rate. */
export interface HeatLayer {
  readonly qubits: Uint32Array
  readonly qubitRates: Float64Array
  readonly couplers: Uint32Array
  readonly couplerRates: Float64Array
}

/** Parts to point out, for instance those missing since the last calibration, with the words for the legend. */
export interface MarkLayer {
  readonly qubits: Uint32Array
  readonly words: string
  /** Couplers likewise, as pairs of qubits. */
  readonly couplers?: Uint32Array
  /** Parts that work again. */
  readonly regained?: { readonly qubits: Uint32Array; readonly couplers: Uint32Array; readonly words: string }
}

/** Qubits and couplers (pairs of qubits) to be outlined, for instance a found path or what was picked. */
export interface OverlayLayer {
  readonly qubits: readonly number[]
  readonly couplers: readonly (readonly [number, number])[]
}

/** What was clicked or tapped; `additive` when Shift, Ctrl or Cmd was held. */
export interface LatticePick {
  readonly qubit: number | null
  readonly variable: number | null
  readonly additive: boolean
}

export type Lens = 'occupancy' | 'load' | 'breaks'

export const LENSES: readonly Lens[] = ['occupancy', 'load', 'breaks']

/** One line of the chain ledger. */
export interface LedgerRow {
  readonly variable: number
  readonly label: string
  /** Length of the chain. */
  readonly qubits: number
  /** Couplers that carry an interaction to another chain. */
  readonly couplers: number
  readonly strength?: number | null
  readonly bound?: number | null
  /** Whether the bound is exact; otherwise it is an upper estimate. */
  readonly boundExact?: boolean
  readonly breaks?: {
    readonly rate: number
    readonly low: number
    readonly high: number
    readonly count: number
    readonly reads: number
  } | null
  /** Why the chain cannot stay as it is, in words, such as a qubit that two chains want. */
  readonly conflict?: string | null
  /** Largest programmed sizes on the chain, and its fullest coupling sum as a share of the range, 0 … 1. */
  readonly load?: { readonly field: number; readonly coupling: number; readonly sum: number } | null
}

/** Axis-aligned box in line spacings or pixels. */
export interface Box {
  readonly x1: number
  readonly y1: number
  readonly x2: number
  readonly y2: number
}

/** Lattice to viewport: pixel = origin + scale · lattice. */
export interface View {
  readonly scale: number
  readonly x: number
  readonly y: number
}
