import type { KernelChoice } from '../assembly'
import type { Control } from '../control'
import { anneal } from './anneal'
import type { AnnealOptions, AnnealProgress } from './annealing-schedule'
import type { Arithmetic } from './arithmetic'
import { annealLanes } from './lanes/anneal-lanes'
import type { SamplerModel } from './physical-model'
import type { Samples } from './samples'

/**
 * Reads firstRead … firstRead + reads − 1 of a run by simulated annealing in the given arithmetic. Each arithmetic gives
 * the same rows for the same seed, however the run is cut, but not the rows of another one.
 * @throws RangeError for reads < 0, sweeps outside 1 … 1,000,000, a temperature that is not positive, or more couplings
 * at a spin than fields of 16 bits allow
 */
export function annealIn(
  model: SamplerModel,
  options: AnnealOptions & {
    readonly reads: number
    readonly firstRead?: number
    readonly arithmetic: Arithmetic
    /** `plain` leaves out WebAssembly; the rows are the same. */
    readonly choice?: KernelChoice
  },
  control: Pick<Control<AnnealProgress>, 'cancelled' | 'report'>,
): Samples {
  const { arithmetic: kind, choice = 'assembly', firstRead = 0, reads } = options
  if (kind === '64-bit') return anneal(model, options, control)
  if (!(Number.isInteger(reads) && reads >= 0))
    throw new RangeError(`reads must be a whole number from 0, not ${reads}`)
  return annealLanes(model, { ...options, firstRead, kind, choice }, control)
}
