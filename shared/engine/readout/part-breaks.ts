import type { Programmed } from '../programming/programme'
import { spinOf } from '../sampling/samples'
import type { Samples } from '../sampling/samples'
import { chainLengths, minorities } from './breaks'
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

function couplerBreaks(samples: Samples, { ends }: Programmed, couplers: Uint32Array): Uint32Array {
  const breaks = new Uint32Array(couplers.length)
  for (let r = 0; r < samples.rows; r++)
    couplers.forEach((c, k) => {
      if (spinOf(samples, r, ends[2 * c]!) !== spinOf(samples, r, ends[2 * c + 1]!)) breaks[k]! += samples.counts[r]!
    })
  return breaks
}

/**
 * Where chains broke, by part of the machine (docs/formulas.md, Breaks by part).
 * @param samples physical samples in the order of `programmed.qubits`, with any gauge undone
 * @throws RangeError for samples of another width
 */
export function partBreaks(samples: Samples, programmed: Programmed): PartBreaks {
  const { qubits, chainOf, ends, isChainCoupler } = programmed
  if (samples.width !== chainOf.length)
    throw new RangeError(`samples of ${samples.width} qubits for a programme of ${chainOf.length}`)
  const pulls = chainPulls(programmed)
  const lengths = chainLengths(programmed)
  const positions = Uint32Array.from(chainOf.keys()).filter((p) => lengths[chainOf[p]!]! > 2)
  const couplers = Uint32Array.from(isChainCoupler.keys()).filter((c) => isChainCoupler[c])
  const minority = minorities(samples, programmed)
  return {
    reads: samples.counts.reduce((sum, count) => sum + count, 0),
    qubits: {
      qubit: positions.map((p) => qubits[p]!),
      chain: positions.map((p) => chainOf[p]!),
      breaks: positions.map((p) => minority[p]!),
      pull: Float32Array.from(positions, (p) => pulls.qubits[p]!),
    },
    couplers: {
      ends: Uint32Array.from(
        { length: 2 * couplers.length },
        (_, k) => qubits[ends[2 * couplers[k >> 1]! + (k & 1)]!]!,
      ),
      chain: couplers.map((c) => chainOf[ends[2 * c]!]!),
      breaks: couplerBreaks(samples, programmed, couplers),
      pull: Float32Array.from(couplers, (c) => pulls.couplers[c]!),
    },
  }
}
