import type { Control } from '../control'
import { createRandom, shuffle, STREAMS } from '../random'
import { createWalker, startWalker, sweep } from './metropolis'
import type { Walker } from './metropolis'
import { renumbered } from './physical-model'
import type { SamplerModel } from './physical-model'
import { strideOf } from './samples'
import type { Samples } from './samples'

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
function largestLocalField(model: SamplerModel): number {
  let largest = 0
  for (let i = 0; i < model.n; i++) {
    let field = Math.abs(model.h[i]!)
    for (let p = model.offsets[i]!; p < model.offsets[i + 1]!; p++) field += Math.abs(model.weights[p]!)
    largest = Math.max(largest, field)
  }
  return largest
}

/**
 * Inverse temperature of each sweep, temperatures falling geometrically from start to final.
 * @throws RangeError for sweeps outside 1 … 1,000,000 or a temperature that is not positive
 */
export function annealSchedule(model: SamplerModel, options: AnnealOptions): Float64Array {
  const { sweeps, temperature: final = ANNEAL_DEFAULTS.temperature } = options
  const start = options.startTemperature ?? Math.max(largestLocalField(model), final)
  if (!(Number.isInteger(sweeps) && sweeps >= 1 && sweeps <= ANNEAL_DEFAULTS.mostSweeps))
    throw new RangeError(`sweeps must be a whole number from 1 to ${ANNEAL_DEFAULTS.mostSweeps}, not ${sweeps}`)
  for (const value of [start, final])
    if (!(Number.isFinite(value) && value > 0)) throw new RangeError(`a temperature must be above 0, not ${value}`)
  return Float64Array.from(
    { length: sweeps },
    (_, k) => (start / final) ** (sweeps === 1 ? 1 : k / (sweeps - 1)) / start,
  )
}

/**
 * A shuffled order in which the spins are visited, one per seed (Fisher & Yates 1938). Metropolis sweeps that follow a chain
 * from end to end push its domain walls along instead of letting them wander, since flips that cost nothing are always
 * taken: a chain in the order of its qubits forgets its start some thirty times slower than in a shuffled order (measured at T = 2|J|).
 */
function shuffledOrder(n: number, seed: number): Uint32Array {
  const random = createRandom(seed, STREAMS.order)
  const order = Uint32Array.from({ length: n }, (_, i) => i)
  shuffle(order, random)
  return order
}

/** One read; false when it was given up. */
function walk(walker: Walker, model: SamplerModel, schedule: Float64Array, cancelled: () => boolean): boolean {
  for (let k = 0; k < schedule.length; k++) {
    if (k % ANNEAL_DEFAULTS.sweepsBetweenChecks === 0 && cancelled()) return false
    sweep(walker, model, schedule[k]!)
  }
  return true
}

function annealRange(
  model: SamplerModel,
  options: AnnealOptions,
  firstRead: number,
  count: number,
  control: Pick<Control<AnnealProgress>, 'cancelled' | 'report'>,
): Samples {
  const schedule = annealSchedule(model, options)
  const order = shuffledOrder(model.n, options.seed)
  const shuffled = renumbered(model, order)
  const walker = createWalker(model.n)
  const stride = strideOf(model.n)
  const bytes = new Uint8Array(count * stride)
  let done = 0
  while (done < count) {
    startWalker(walker, shuffled, options.seed, firstRead + done)
    if (!walk(walker, shuffled, schedule, control.cancelled)) break
    const row = done * stride
    order.forEach((i, k) => {
      if (walker.spins[k]! > 0) bytes[row + (i >> 3)]! |= 1 << (i & 7)
    })
    done++
    control.report({ readsDone: done, reads: count })
  }
  return { width: model.n, rows: done, bytes: bytes.slice(0, done * stride), counts: new Uint32Array(done).fill(1) }
}

/**
 * Reads firstRead … firstRead + count − 1 of a run. Each read has its own random stream, so however a run is cut into
 * ranges, over threads or not, the rows are the same.
 */
export function annealReads(model: SamplerModel, options: AnnealOptions, firstRead: number, count: number): Samples {
  return annealRange(model, options, firstRead, count, { cancelled: () => false, report: () => undefined })
}

/**
 * Simulated annealing (Kirkpatrick, Gelatt & Vecchi, Science 220:671, 1983) by Metropolis updates (1953), one row per read
 * in order of reads. A classical stand-in for checking settings, not a forecast of the machine.
 * Progress is reported after each read; a cancelled run returns the reads that are complete.
 * @throws RangeError for reads < 0, sweeps outside 1 … 1,000,000 or a temperature that is not positive
 */
export function anneal(
  model: SamplerModel,
  options: AnnealOptions & { readonly reads: number; readonly firstRead?: number },
  control: Pick<Control<AnnealProgress>, 'cancelled' | 'report'>,
): Samples {
  if (!(Number.isInteger(options.reads) && options.reads >= 0))
    throw new RangeError(`reads must be a whole number from 0, not ${options.reads}`)
  return annealRange(model, options, options.firstRead ?? 0, options.reads, control)
}
