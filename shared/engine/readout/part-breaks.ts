import type { Programmed } from '../programming/programme'
import { chainLengths } from './breaks'
import type { BreakStatistics } from './breaks'
import { chainPulls } from './pulls'

/** Parts of one kind as one set of samples shows them; the arrays are of the same length. */
export interface PartCounts {
  /** Variable whose chain the part belongs to. */
  readonly chain: Uint32Array
  /** Reads in which the part broke. */
  readonly breaks: Uint32Array
  /** How hard it is pulled: see `chainPulls`. */
  readonly pull: Float32Array
}

export interface PartBreaks {
  readonly reads: number
  /**
   * Qubits of chains of three and more, by dense index in the machine graph: reads in which they disagree with the
   * majority of their chain. A chain that is split evenly counts against none of its qubits.
   */
  readonly qubits: PartCounts & { readonly qubit: Uint32Array }
  /** Couplers inside chains, as pairs of dense indices, lower first: reads in which the two ends disagree. */
  readonly couplers: PartCounts & { readonly ends: Uint32Array }
}

/**
 * Where chains broke, by part of the machine (docs/formulas.md, Breaks by part).
 * @param breaks of the samples, as `breakStatistics` counts them
 * @throws RangeError for statistics of another programme
 */
export function partBreaks(
  breaks: Pick<BreakStatistics, 'reads' | 'perQubit' | 'perCoupler'>,
  programmed: Programmed,
): PartBreaks {
  const { qubits, chainOf, ends, isChainCoupler } = programmed
  if (breaks.perQubit.length !== chainOf.length)
    throw new RangeError(`breaks of ${breaks.perQubit.length} qubits for a programme of ${chainOf.length}`)
  const pulls = chainPulls(programmed)
  const lengths = chainLengths(programmed)
  const positions = Uint32Array.from(chainOf.keys()).filter((p) => lengths[chainOf[p]!]! > 2)
  const couplers = Uint32Array.from(isChainCoupler.keys()).filter((c) => isChainCoupler[c])
  return {
    reads: breaks.reads,
    qubits: {
      qubit: positions.map((p) => qubits[p]!),
      chain: positions.map((p) => chainOf[p]!),
      breaks: positions.map((p) => breaks.perQubit[p]!),
      pull: Float32Array.from(positions, (p) => pulls.qubits[p]!),
    },
    couplers: {
      ends: Uint32Array.from(
        { length: 2 * couplers.length },
        (_, k) => qubits[ends[2 * couplers[k >> 1]! + (k & 1)]!]!,
      ),
      chain: couplers.map((c) => chainOf[ends[2 * c]!]!),
      breaks: couplers.map((c) => breaks.perCoupler[c]!),
      pull: Float32Array.from(couplers, (c) => pulls.couplers[c]!),
    },
  }
}
