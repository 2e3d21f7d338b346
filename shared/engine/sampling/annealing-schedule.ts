import type { SamplerModel } from './physical-model'

export interface AnnealOptions {
  /** Sweeps of each read, 1 … 1,000,000; a sweep offers every spin one flip. */
  readonly sweeps: number
  readonly seed: number
  /** First temperature, in units of programmed energy. Default: the largest local field that any spin can feel. */
  readonly startTemperature?: number
  /** Final temperature, in units of programmed energy. Equal to the start: a run at constant temperature. */
  readonly temperature?: number
}

/** Final temperature in programmed units: low against a coupling of size 1, yet not zero. */
export const ANNEAL_DEFAULTS = { temperature: 0.1, sweepsBetweenChecks: 64, mostSweeps: 1_000_000 }

export interface AnnealProgress {
  readonly readsDone: number
  readonly reads: number
}

/** The largest |h_i| + Σ_j|J_ij|: at this temperature nearly every flip is taken. */
export function largestLocalField(model: SamplerModel): number {
  let largest = 0
  for (let i = 0; i < model.n; i++) {
    let field = Math.abs(model.h[i]!)
    for (let p = model.offsets[i]!; p < model.offsets[i + 1]!; p++) field += Math.abs(model.weights[p]!)
    largest = Math.max(largest, field)
  }
  return largest
}

/** @throws RangeError for sweeps outside 1 … 1,000,000 */
export function requireSweeps(sweeps: number): void {
  if (!(Number.isInteger(sweeps) && sweeps >= 1 && sweeps <= ANNEAL_DEFAULTS.mostSweeps))
    throw new RangeError(`sweeps must be a whole number from 1 to ${ANNEAL_DEFAULTS.mostSweeps}, not ${sweeps}`)
}

/**
 * Inverse temperature of each sweep, temperatures falling geometrically from start to final.
 * @throws RangeError for sweeps outside 1 … 1,000,000 or a temperature that is not positive
 */
export function annealSchedule(model: SamplerModel, options: AnnealOptions): Float64Array {
  const { sweeps, temperature: final = ANNEAL_DEFAULTS.temperature } = options
  const start = options.startTemperature ?? Math.max(largestLocalField(model), final)
  requireSweeps(sweeps)
  for (const value of [start, final])
    if (!(Number.isFinite(value) && value > 0)) throw new RangeError(`a temperature must be above 0, not ${value}`)
  return Float64Array.from(
    { length: sweeps },
    (_, k) => (start / final) ** (sweeps === 1 ? 1 : k / (sweeps - 1)) / start,
  )
}
