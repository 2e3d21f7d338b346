import { fittingScale, type Ranges } from '../programming/ranges'
import type { Problem } from './problem'

/** What a machine takes, and the standard deviations of what it makes of it, in programmed units. */
export interface MachineLimits {
  readonly ranges: Ranges
  readonly sigmaH: number
  readonly sigmaJ: number
}

/** How many of a problem's coefficients would drown in a machine's control error if every chain had one qubit. */
export interface UnderControlError {
  /** The factor that brings every coefficient into its range, at most 1. */
  readonly scale: number
  /** Nonzero fields and interactions. */
  readonly coefficients: number
  /** Those whose scaled size is below 2σ_h or 2σ_J. */
  readonly fieldsUnder: number
  readonly interactionsUnder: number
}

const nonzeroBelow = (values: Float64Array, size: number): number => {
  let count = 0
  for (const value of values) if (value !== 0 && Math.abs(value) < size) count++
  return count
}

/**
 * An Ising problem against the control error of a machine, before any embedding: each variable one qubit, each
 * interaction one coupler, so the figures are optimistic. Chains share fields out and need range of their own. Errors
 * are Gaussian (King & McGeoch, arXiv:1410.2628, 2014).
 * @throws RangeError for a negative σ or a range that does not hold 0
 */
export function underControlError(ising: Problem, { ranges, sigmaH, sigmaJ }: MachineLimits): UnderControlError {
  if (!(sigmaH >= 0 && sigmaJ >= 0)) throw new RangeError(`control error must not be negative: ${sigmaH}, ${sigmaJ}`)
  const { linear, values, rows, cols } = ising
  const ends = new Uint32Array(2 * rows.length)
  rows.forEach((row, k) => {
    ends[2 * k] = row
    ends[2 * k + 1] = cols[k]!
  })
  const { scale } = fittingScale({ h: linear, ends, J: values }, { ...ranges, couplingSum: null })
  return {
    scale,
    coefficients: linear.reduce((count, h) => count + Number(h !== 0), 0) + values.length,
    fieldsUnder: scale > 0 ? nonzeroBelow(linear, (2 * sigmaH) / scale) : nonzeroBelow(linear, Infinity),
    interactionsUnder: scale > 0 ? nonzeroBelow(values, (2 * sigmaJ) / scale) : values.length,
  }
}
