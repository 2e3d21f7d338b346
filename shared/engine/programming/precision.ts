import type { ControlError } from './coefficients'
import { requireControlError } from './coefficients'
import type { Programmed } from './programme'

export interface EnergyNoise {
  /** Standard deviation of the energy error of any unbroken state, in logical units. */
  readonly absolute: number
  /** The same without the chain couplers, whose error is common to all unbroken states: what blurs their order. */
  readonly ofOrder: number
}

/**
 * Energies under the control error, taken as independent Gaussian errors δh_q, δJ_e on every programmed value
 * (King & McGeoch, Algorithm engineering for a quantum annealing platform, arXiv:1410.2628, 2014).
 *
 * The energy error of a state s is Σ δh_q s_q + Σ δJ_e s_a s_b. Signs do not change a centred Gaussian, so with U qubits
 * and C couplers in use its variance is U·σ_h² + C·σ_J² for every state; divided by the scale it is in logical units.
 * On unbroken states s_a s_b = 1 on chain couplers: their part is the same for all of them and leaves the order alone.
 * @throws RangeError for a negative σ
 */
export function energyNoise({ qubits, isChainCoupler, scale }: Programmed, error: ControlError): EnergyNoise {
  requireControlError(error)
  const { sigmaH, sigmaJ } = error
  const inside = isChainCoupler.reduce((count, is) => count + is, 0)
  const noise = (couplers: number): number =>
    Math.sqrt(qubits.length * sigmaH * sigmaH + couplers * sigmaJ * sigmaJ) / scale
  return { absolute: noise(isChainCoupler.length), ofOrder: noise(isChainCoupler.length - inside) }
}
