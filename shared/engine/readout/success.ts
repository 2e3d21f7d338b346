import type { Interval, SuccessProbability } from './intervals'
import { readsForConfidence, readsForConfidenceInterval, successProbability } from './intervals'

export interface SuccessInput {
  /** Decoded energies of the minimised problem, one a row; NaN for a row that the decoding drops. */
  readonly energies: Float64Array
  /** Reads of each row. */
  readonly counts: Uint32Array
  /** Energy that is held against, and how far above it still counts, ≥ 0. */
  readonly reference: number
  readonly gap: number
  /** Energies that differ by less are equal: rounding only. */
  readonly tolerance: number
}

export interface Success extends SuccessProbability {
  /** Reads for one success with 99 % confidence, not rounded; Infinity where p is 0. */
  readonly r99: number
  readonly r99Interval: Interval
}

/** Whether a row reaches the reference, by row; a dropped row does not. */
export function reaches({ energies, reference, gap, tolerance }: Omit<SuccessInput, 'counts'>): Uint8Array {
  if (!(gap >= 0)) throw new RangeError(`a gap is a number from 0 upwards, not ${gap}`)
  return Uint8Array.from(energies, (energy) => (energy <= reference + gap + tolerance ? 1 : 0))
}

/** Success of so many reads out of all, with what follows from it. */
export function successOf(successes: number, trials: number): Success {
  const success = successProbability(successes, trials)
  return { ...success, r99: readsForConfidence(success.p), r99Interval: readsForConfidenceInterval(success) }
}

/**
 * Share of all reads that come within a gap of a reference, with Wilson's interval, and R99 from it. Reads that the
 * decoding drops are no successes: they took their time too.
 * @throws RangeError for a negative gap
 */
export function successWithin(input: SuccessInput): Success {
  const hit = reaches(input)
  let [successes, trials] = [0, 0]
  input.counts.forEach((count, row) => {
    trials += count
    successes += count * hit[row]!
  })
  return successOf(successes, trials)
}
