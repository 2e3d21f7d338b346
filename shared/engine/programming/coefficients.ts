import type { Problem } from '../problem/problem'
import type { Programmed } from './programme'

/** Standard deviations of the machine's control error on programmed fields and couplings, in programmed units. */
export interface ControlError {
  readonly sigmaH: number
  readonly sigmaJ: number
}

/** One coefficient of the logical problem beside the control error of its kind. */
export interface ScaledCoefficient {
  readonly kind: 'field' | 'coupling'
  /** Variable of a field, number of the interaction of a coupling. */
  readonly at: number
  /** In logical units. */
  readonly value: number
  /** α·|value|, in programmed units. */
  readonly size: number
  /** size / σ of its kind. */
  readonly perSigma: number
}

/** A coefficient is taken to drown in control error below so many standard deviations. */
export const DROWNS_BELOW = 2

/** @throws RangeError for a negative σ */
export function requireControlError({ sigmaH, sigmaJ }: ControlError): void {
  if (!(sigmaH >= 0 && sigmaJ >= 0)) throw new RangeError(`control error must not be negative: ${sigmaH}, ${sigmaJ}`)
}

/** Calls `visit` for every nonzero coefficient whose kind has a control error, fields first. */
function eachCoefficient(
  ising: Problem,
  { sigmaH, sigmaJ }: ControlError,
  visit: (kind: ScaledCoefficient['kind'], at: number, value: number, sigma: number) => void,
): void {
  if (sigmaH > 0) ising.linear.forEach((value, at) => value !== 0 && visit('field', at, value, sigmaH))
  if (sigmaJ > 0) ising.values.forEach((value, at) => value !== 0 && visit('coupling', at, value, sigmaJ))
}

const scaledOf = (
  kind: ScaledCoefficient['kind'],
  at: number,
  value: number,
  scale: number,
  sigma: number,
): ScaledCoefficient => {
  const size = scale * Math.abs(value)
  return { kind, at, value, size, perSigma: size / sigma }
}

/**
 * The nonzero coefficient that is smallest beside its control error, the first of several; null where the problem has
 * none, or the machine states no control error for those that it has.
 * @throws RangeError for a negative σ
 */
export function smallestCoefficient(ising: Problem, scale: number, error: ControlError): ScaledCoefficient | null {
  requireControlError(error)
  let smallest: ScaledCoefficient | null = null
  eachCoefficient(ising, error, (kind, at, value, sigma) => {
    if (smallest && (scale * Math.abs(value)) / sigma >= smallest.perSigma) return
    smallest = scaledOf(kind, at, value, scale, sigma)
  })
  return smallest
}

/** How many nonzero coefficients have a size α·|c| below 2σ, of how many whose kind has a control error. */
export function countDrowned(ising: Problem, scale: number, error: ControlError): { under: number; of: number } {
  requireControlError(error)
  let under = 0
  let of = 0
  eachCoefficient(ising, error, (_kind, _at, value, sigma) => {
    of++
    if (scale * Math.abs(value) < DROWNS_BELOW * sigma) under++
  })
  return { under, of }
}

/**
 * The coefficients with a size α·|c| below 2σ (King & McGeoch, arXiv:1410.2628, 2014), the most drowned first, fields
 * before couplings and in order of the problem where they are equal.
 * @throws RangeError for a negative σ
 */
export function drownedCoefficients(ising: Problem, scale: number, error: ControlError): ScaledCoefficient[] {
  requireControlError(error)
  const drowned: ScaledCoefficient[] = []
  eachCoefficient(ising, error, (kind, at, value, sigma) => {
    const coefficient = scaledOf(kind, at, value, scale, sigma)
    if (coefficient.size < DROWNS_BELOW * sigma) drowned.push(coefficient)
  })
  return drowned.sort((a, b) => a.perSigma - b.perSigma)
}

/** On how many qubits each field and on how many couplers each interaction is programmed with a value other than 0. */
export interface Shares {
  readonly ofField: Uint32Array
  readonly ofInteraction: Uint32Array
}

/** Counts the parts that each coefficient was shared out to. */
export function sharesOf({ h, J, ends, chainOf, isChainCoupler }: Programmed, ising: Problem): Shares {
  const ofField = new Uint32Array(ising.n)
  h.forEach((field, p) => field !== 0 && ofField[chainOf[p]!]!++)
  const numberOf = new Map<number, number>()
  ising.values.forEach((_, k) => numberOf.set(ising.rows[k]! * ising.n + ising.cols[k]!, k))
  const ofInteraction = new Uint32Array(ising.values.length)
  J.forEach((value, c) => {
    if (isChainCoupler[c] || value === 0) return
    const [a, b] = [chainOf[ends[2 * c]!]!, chainOf[ends[2 * c + 1]!]!]
    ofInteraction[numberOf.get(Math.min(a, b) * ising.n + Math.max(a, b))!]!++
  })
  return { ofField, ofInteraction }
}
