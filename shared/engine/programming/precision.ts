import type { Problem } from '../problem/problem'
import type { Programmed } from './programme'

/** Standard deviations of the machine's control error on programmed fields and couplings, in programmed units. */
export interface ControlError {
  readonly sigmaH: number
  readonly sigmaJ: number
}

export interface Precision {
  /** Smallest nonzero programmed size, chain couplers left out; null when there is none. */
  readonly smallestField: number | null
  readonly smallestCoupling: number | null
  /** The same divided by σ; Infinity where σ = 0. */
  readonly smallestFieldPerSigma: number | null
  readonly smallestCouplingPerSigma: number | null
  /** Scaled size α|h_i| of each logical field and α|J_ij| of each interaction, in programmed units. */
  readonly fieldSizes: Float64Array
  readonly couplingSizes: Float64Array
  /** Share of the nonzero logical coefficients with a scaled size under 2σ; 0 when there is none. */
  readonly shareUnderTwoSigma: number
  /** Standard deviation of the energy error of any unbroken state, in logical units. */
  readonly energyNoise: number
  /** The same without the chain couplers, whose error is common to all unbroken states: what blurs their order. */
  readonly orderingNoise: number
}

const smallestNonzero = (sizes: Iterable<number>): number | null => {
  let smallest = Infinity
  for (const size of sizes) if (size > 0 && size < smallest) smallest = size
  return smallest < Infinity ? smallest : null
}

const perSigma = (size: number | null, sigma: number): number | null => (size === null ? null : size / sigma)

/**
 * Programmed values against the control error, taken as independent Gaussian errors δh_q, δJ_e on every programmed value
 * (King & McGeoch, Algorithm engineering for a quantum annealing platform, arXiv:1410.2628, 2014).
 *
 * The energy error of a state s is Σ δh_q s_q + Σ δJ_e s_a s_b. Signs do not change a centred Gaussian, so with U qubits
 * and C couplers in use its variance is U·σ_h² + C·σ_J² for every state; divided by the scale it is in logical units.
 * On unbroken states s_a s_b = 1 on chain couplers: their part is the same for all of them and leaves the order alone.
 * @throws RangeError for a negative σ
 */
export function precisionReport(programmed: Programmed, ising: Problem, error: ControlError): Precision {
  const { sigmaH, sigmaJ } = error
  if (!(sigmaH >= 0 && sigmaJ >= 0)) throw new RangeError(`control error must not be negative: ${sigmaH}, ${sigmaJ}`)
  const { scale } = programmed
  const external = programmed.J.filter((_, c) => !programmed.isChainCoupler[c])
  const smallestField = smallestNonzero(programmed.h.map(Math.abs))
  const smallestCoupling = smallestNonzero(external.map(Math.abs))
  const fieldSizes = ising.linear.map((h) => scale * Math.abs(h))
  const couplingSizes = ising.values.map((J) => scale * Math.abs(J))
  const fields = fieldSizes.filter((size) => size > 0)
  const under =
    fields.filter((size) => size < 2 * sigmaH).length + couplingSizes.filter((size) => size < 2 * sigmaJ).length
  const coefficients = fields.length + couplingSizes.length
  const noise = (couplers: number): number =>
    Math.sqrt(programmed.qubits.length * sigmaH * sigmaH + couplers * sigmaJ * sigmaJ) / scale
  return {
    smallestField,
    smallestCoupling,
    smallestFieldPerSigma: perSigma(smallestField, sigmaH),
    smallestCouplingPerSigma: perSigma(smallestCoupling, sigmaJ),
    fieldSizes,
    couplingSizes,
    shareUnderTwoSigma: coefficients > 0 ? under / coefficients : 0,
    energyNoise: noise(programmed.J.length),
    orderingNoise: noise(external.length),
  }
}
