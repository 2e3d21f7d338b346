import { createRandom, STREAMS } from '../random'
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
  /** Rows it was worked out from: all that were given, or as many as were drawn of them. */
  readonly rows: number
}

export interface TemperatureOptions {
  /** Numbers of the rows to look at; all where left out. */
  readonly rows?: Uint32Array
  /** Spins that are looked at, at most: rows beyond that are left out by lot. At least one row is kept. */
  readonly mostSpins?: number
  /** Of the lot. */
  readonly seed?: number
}

/** `mostSpins`: 16 MB of local fields; the standard error is far under a percent long before. */
export const TEMPERATURE_DEFAULTS = { iterations: 100, precision: 1e-10, mostSpins: 2_000_000, seed: 1 }

/** Derivatives of the log pseudo-likelihood and the sum of squared row scores, at one β. */
interface Slopes {
  readonly first: number
  readonly second: number
  readonly squaredRowScores: number
}

/** The rows to look at, ascending; without replacement where they are too many (Fisher & Yates, in part). */
function drawnRows(width: number, all: Uint32Array, most: number, seed: number): Uint32Array {
  const room = Math.max(1, Math.floor(most / Math.max(1, width)))
  if (all.length <= room) return all
  const random = createRandom(seed, STREAMS.rows)
  const order = all.slice()
  for (let k = 0; k < room; k++) {
    const other = k + random.below(order.length - k)
    const row = order[other]!
    order[other] = order[k]!
    order[k] = row
  }
  return order.slice(0, room).sort()
}

/** alignments[k·n + i] = 2·s_i·f_i in row rows[k]: log P(s_i | rest) = −ln(1 + e^{β·alignment}). */
function alignmentsOf(model: SamplerModel, samples: Samples, rows: Uint32Array): Float64Array {
  const spins = new Int8Array(model.n)
  const fields = new Float64Array(model.n)
  const alignments = new Float64Array(rows.length * model.n)
  rows.forEach((row, k) => {
    for (let i = 0; i < model.n; i++) spins[i] = spinOf(samples, row, i)
    writeLocalFields(model, spins, fields)
    for (let i = 0; i < model.n; i++) alignments[k * model.n + i] = 2 * spins[i]! * fields[i]!
  })
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
  for (let k = 0; k < TEMPERATURE_DEFAULTS.iterations; k++) {
    const { first, second } = slopes(beta)
    if (first > 0) low = beta
    else high = beta
    const newton = beta - first / second
    const next = newton > low && newton < high ? newton : (low + high) / 2
    if (Math.abs(next - beta) <= TEMPERATURE_DEFAULTS.precision * Math.max(1, Math.abs(beta))) return next
    beta = next
  }
  return beta
}

/**
 * Effective inverse temperature of samples by maximum pseudo-likelihood (Besag, Statistical analysis of non-lattice data,
 * The Statistician 24:179, 1975): β that maximises Σ ln P(s_i | all other spins) under a Boltzmann distribution of the
 * model. The standard error is the sandwich estimate over reads. One parameter cannot tell whether the samples are
 * thermal at all: it is a summary, not a thermometer. Memory and time are bounded by `mostSpins`, whatever the samples.
 * @returns null when there is nothing to learn from: no reads, or no field and no coupling anywhere
 * @throws RangeError for samples of another width
 */
export function effectiveTemperature(
  model: SamplerModel,
  samples: Samples,
  options: TemperatureOptions = {},
): EffectiveTemperature | null {
  if (samples.width !== model.n) throw new RangeError(`samples of ${samples.width} spins for a model of ${model.n}`)
  const { mostSpins, seed } = { ...TEMPERATURE_DEFAULTS, ...options }
  const all = options.rows ?? Uint32Array.from({ length: samples.rows }, (_, r) => r)
  const drawn = drawnRows(model.n, all, mostSpins, seed)
  const rows = drawn.length
  const alignments = alignmentsOf(model, samples, drawn)
  const against = alignments.some((x) => x > 0)
  const along = alignments.some((x) => x < 0)
  if (!against && !along) return null
  if (!against) return { inverseTemperature: Infinity, standardError: null, temperature: 0, rows }
  if (!along) return { inverseTemperature: -Infinity, standardError: null, temperature: 0, rows }
  const counts = Uint32Array.from(drawn, (row) => samples.counts[row]!)
  const slopes = (beta: number): Slopes => slopesAt(beta, alignments, model.n, counts)
  const inverseTemperature = maximise(slopes)
  const { second, squaredRowScores } = slopes(inverseTemperature)
  return {
    inverseTemperature,
    standardError: Math.sqrt(squaredRowScores) / Math.abs(second),
    temperature: 1 / inverseTemperature,
    rows,
  }
}
