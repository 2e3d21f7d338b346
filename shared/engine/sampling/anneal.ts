import type { Control } from '../control'
import { ANNEAL_DEFAULTS, annealSchedule } from './annealing-schedule'
import type { AnnealOptions, AnnealProgress } from './annealing-schedule'
import { createWalker, startWalker, sweep } from './metropolis'
import type { Walker } from './metropolis'
import { renumbered } from './physical-model'
import type { SamplerModel } from './physical-model'
import { strideOf } from './samples'
import type { Samples } from './samples'
import { shuffledOrder } from './visiting-order'

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
