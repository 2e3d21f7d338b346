import { largestLocalField } from './annealing-schedule'
import { fitsLanes, stepOf } from './lanes/rounding'
import type { SamplerModel } from './physical-model'

/** 16-bit and 32-bit lanes of the fast kernels, or the plain loop in double precision as reference. */
export type Arithmetic = '16-bit' | '32-bit' | '64-bit'

/** 16 bits are taken by themselves where their rounding is at most these shares of control error and of final temperature. */
export const MARGIN = { ofControlError: 0.1, ofTemperature: 0.01 } as const

/** What each arithmetic does to a model: the most that any field or coupling is off, in programmed units. */
export interface Roundings {
  /** Largest |h_i| + Σ_j|J_ij|, which the steps of both are scaled to. */
  readonly largestField: number
  /** Null where a spin has too many couplings for fields of 16 bits. */
  readonly bits16: number | null
  readonly bits32: number
}

/** Half a step of either arithmetic on a model. */
export const roundingsOf = (model: SamplerModel): Roundings => ({
  largestField: largestLocalField(model),
  bits16: fitsLanes(model, '16-bit') ? stepOf(model, '16-bit') / 2 : null,
  bits32: stepOf(model, '32-bit') / 2,
})

/** The rounding of one arithmetic; double precision holds the values as they were programmed. */
export function roundingIn(roundings: Roundings, arithmetic: Arithmetic): number {
  if (arithmetic === '64-bit') return 0
  return arithmetic === '16-bit' ? (roundings.bits16 ?? Infinity) : roundings.bits32
}

/**
 * The fastest arithmetic that changes nothing one could see: 16 bits where control error is drawn and their rounding is
 * at most a tenth of the smaller σ and a hundredth of the final temperature; else 32 bits.
 */
export function fittingArithmetic(
  { bits16 }: Pick<Roundings, 'bits16'>,
  error: { readonly sigmaH: number; readonly sigmaJ: number } | null,
  temperature: number,
): Arithmetic {
  if (!error || bits16 === null) return '32-bit'
  const sigma = Math.min(error.sigmaH, error.sigmaJ)
  const hidden = bits16 <= MARGIN.ofControlError * sigma && bits16 <= MARGIN.ofTemperature * temperature
  return hidden ? '16-bit' : '32-bit'
}
