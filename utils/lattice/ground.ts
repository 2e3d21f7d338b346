import type { LatticeKind } from './kinds'
import type { Tails } from './tails'
import type { Tokens } from './tokens'
import type { LatticeData, MarkLayer } from './types'

/** What lies beneath the chains: free and missing qubits, couplers, marks. */
export interface Ground {
  readonly data: LatticeData
  readonly tokens: Tokens
  /** 1 where a chain uses the qubit: its segment and dot are left to the chain. */
  readonly used: Uint8Array
  readonly tails: readonly Tails[]
  readonly marks?: MarkLayer | null
  readonly hiddenKinds?: ReadonlySet<LatticeKind>
}

export const GROUND_DEFAULTS = {
  /** Line spacing in pixels from which couplers along lines, and at crossings, are worth drawing. */
  couplersFrom: 7,
  crossingsFrom: 18,
  dotsFrom: 2.2,
}

/** Without chains the machine itself is the figure and is drawn more firmly. */
export const isBare = (used: Uint8Array): boolean => !used.includes(1)
