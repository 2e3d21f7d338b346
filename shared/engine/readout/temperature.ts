import type { SamplerModel } from '../sampling/physical-model'
import { spinOf } from '../sampling/samples'
import type { Samples } from '../sampling/samples'
import { writeLocalFields } from './local-fields'

export interface EffectiveTemperature {
  /** Inverse temperature per unit of the model's energy; Infinity when no spin ever stands against its local field. */
  readonly inverseTemperature: number
  /** Standard error, rows taken as independent; null where it has none. */
  readonly standardError: number | null
  /** 1 / inverseTemperature. */
  readonly temperature: number
}

const DEFAULTS = { iterations: 100, precision: 1e-10 }

/** Derivatives of the log pseudo-likelihood and the sum of squared row scores, at one β. */
interface Slopes {
  readonly first: number
  readonly second: number
  readonly squaredRowScores: number
}

/** alignments[r·n + i] = 2·s_i·f_i: log P(s_i | rest) = −ln(1 + e^{β·alignment}). */
function alignmentsOf(model: SamplerModel, samples: Samples): Float64Array {
  const spins = new Int8Array(model.n)
  const fields = new Float64Array(model.n)
  const alignments = new Float64Array(samples.rows * model.n)
  for (let r = 0; r < samples.rows; r++) {
    for (let i = 0; i < model.n; i++) spins[i] = spinOf(samples, r, i)
    writeLocalFields(model, spins, fields)
    for (let i = 0; i < model.n; i++) alignments[r * model.n + i] = 2 * spins[i]! * fields[i]!
  }
  return alignments
}

function slopesAt(beta: number, alignments: Float64Array, n: number, counts: Uint32Array): Slopes {
  let first = 0
  let second = 0
  let squaredRowScores = 0
  for (let r = 0; r < counts.length; r++) {
    let score = 0
    for (let k = r * n; k < (r + 1) * n; k++) {
      const x = alignments[k]!
      const against = 1 / (1 + Math.exp(-beta * x))
      score -= x * against
      second -= counts[r]! * x * x * against * (1 - against)
    }
    first += counts[r]! * score
    squaredRowScores += counts[r]! * score * score
  }
  return { first, second, squaredRowScores }
}

/** The root of the concave function's slope, by Newton steps kept inside a bracket that bisection shrinks. */
function maximise(slopes: (beta: number) => Slopes): number {
  let high = 1
  let low = -1
  while (slopes(high).first > 0) high *= 2
  while (slopes(low).first < 0) low *= 2
  let beta = (low + high) / 2
  for (let k = 0; k < DEFAULTS.iterations; k++) {
    const { first, second } = slopes(beta)
    if (first > 0) low = beta
    else high = beta
    const newton = beta - first / second
    const next = newton > low && newton < high ? newton : (low + high) / 2
    if (Math.abs(next - beta) <= DEFAULTS.precision * Math.max(1, Math.abs(beta))) return next
    beta = next
  }
  return beta
}

/**
 * Effective inverse temperature of samples by maximum pseudo-likelihood (Besag, Statistical analysis of non-lattice data,
 * The Statistician 24:179, 1975): β that maximises Σ ln P(s_i | all other spins) under a Boltzmann distribution of the
 * model. The standard error is the sandwich estimate over reads. One parameter cannot tell whether the samples are
 * thermal at all: it is a summary, not a thermometer.
 * @returns null when there is nothing to learn from: no reads, or no field and no coupling anywhere
 * @throws RangeError for samples of another width
 */
export function effectiveTemperature(model: SamplerModel, samples: Samples): EffectiveTemperature | null {
  if (samples.width !== model.n) throw new RangeError(`samples of ${samples.width} spins for a model of ${model.n}`)
  const alignments = alignmentsOf(model, samples)
  const against = alignments.some((x) => x > 0)
  const along = alignments.some((x) => x < 0)
  if (!against && !along) return null
  if (!against) return { inverseTemperature: Infinity, standardError: null, temperature: 0 }
  if (!along) return { inverseTemperature: -Infinity, standardError: null, temperature: 0 }
  const slopes = (beta: number): Slopes => slopesAt(beta, alignments, model.n, samples.counts)
  const inverseTemperature = maximise(slopes)
  const { second, squaredRowScores } = slopes(inverseTemperature)
  return {
    inverseTemperature,
    standardError: Math.sqrt(squaredRowScores) / Math.abs(second),
    temperature: 1 / inverseTemperature,
  }
}
