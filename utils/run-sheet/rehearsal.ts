import type { Arithmetic } from '#shared/engine/sampling/arithmetic'
import { fittingArithmetic, roundingIn } from '#shared/engine/sampling/arithmetic'
import type { Rehearse, RehearsalChoices } from '#shared/schemas/run-sheets'
import type { HelpRequest } from '../help/registry'
import { formatSignificant } from '../format'

/** How numbers are held, and what that does to the programmed values. */
export interface ArithmeticFacts {
  arithmetic: Arithmetic
  rounding: number
  /** The smaller of σ_h and σ_J where control error is drawn. */
  sigma: number | null
}

/** The arithmetic that a rehearsal with these settings is made in. */
export function arithmeticOf(
  choices: RehearsalChoices,
  asked: Rehearse['arithmetic'],
  error: { sigmaH: number; sigmaJ: number } | null,
  temperature: number,
): ArithmeticFacts {
  const arithmetic = asked === 'automatic' ? fittingArithmetic(choices, error, temperature) : asked
  return {
    arithmetic,
    rounding: roundingIn(choices, arithmetic),
    sigma: error ? Math.min(error.sigmaH, error.sigmaJ) : null,
  }
}

/** `rounding 0.00035 against σ 0.02` */
export function roundingWords({ rounding, sigma }: ArithmeticFacts): string {
  if (rounding === 0) return 'no rounding'
  const words = `rounding ${formatSignificant(rounding, 2)}`
  return sigma === null ? `${words}, no control error` : `${words} against σ ${formatSignificant(sigma, 2)}`
}

export const roundingHelp = (
  { arithmetic, sigma }: ArithmeticFacts,
  largestField: number,
): { help: HelpRequest; name: string } => ({
  help: { id: 'rounding', given: { arithmetic, largestField, sigma } },
  name: 'the rounding of the rehearsal',
})

/** Why path-integral Monte Carlo is not offered. */
export const NO_PATH_INTEGRAL =
  'Path-integral Monte Carlo is offered where the machine sheet has a temperature and an energy table.'
