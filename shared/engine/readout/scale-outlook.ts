/** What another scale would do to samples of a Boltzmann distribution. */
export interface ScaleOutlook {
  /** Fall of the mean energy, in units of the problem, at a scale one tenth greater. */
  readonly fallByTenth: number
  /** The same at the greatest scale that the ranges allow; 0 where the scale is that already. */
  readonly fallAtGreatest: number
  /** Standard error of the mean energy, in units of the problem: falls under twice this cannot be seen. */
  readonly standardError: number
}

export interface ScaleInput {
  /** β of the programmed problem, finite and positive. */
  readonly inverseTemperature: number
  /** Energies of the programmed problem, one a row, and reads of each row. */
  readonly energies: Float64Array
  readonly counts: Uint32Array
  readonly scale: number
  /** The greatest scale that fits the ranges. */
  readonly greatest: number
}

/**
 * With weights e^{−βαX} of the unscaled energy X, `d⟨X⟩/d ln α = −βα·Var X`: to first order, for the temperature stays
 * what it is when the scale rises. True of thermal samples; of others it is a guess.
 * @returns null with fewer than two reads, or a β that is not positive and finite
 */
export function scaleOutlook(input: ScaleInput): ScaleOutlook | null {
  const { inverseTemperature: beta, energies, counts, scale, greatest } = input
  let [n, sum] = [0, 0]
  energies.forEach((energy, r) => {
    n += counts[r]!
    sum += counts[r]! * energy
  })
  if (n < 2 || !(beta > 0 && beta < Infinity)) return null
  const squares = energies.reduce((total, energy, r) => total + counts[r]! * (energy - sum / n) ** 2, 0)
  const variance = squares / (n - 1)
  const slope = (beta * variance) / scale
  return {
    fallByTenth: slope * Math.log(1.1),
    fallAtGreatest: slope * Math.max(0, Math.log(greatest / scale)),
    standardError: Math.sqrt(variance / n) / scale,
  }
}
