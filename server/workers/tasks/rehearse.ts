import type { Control } from '../../../shared/engine/control'
import { applyGauge, drawGauge, undoGauge } from '../../../shared/engine/programming/gauges'
import type { Programmed } from '../../../shared/engine/programming/programme'
import { annealIn } from '../../../shared/engine/sampling/anneal-in'
import type { AnnealProgress } from '../../../shared/engine/sampling/annealing-schedule'
import type { Arithmetic } from '../../../shared/engine/sampling/arithmetic'
import type { PathIntegralOptions } from '../../../shared/engine/sampling/path-integral'
import { pathIntegralReads } from '../../../shared/engine/sampling/path-integral'
import { physicalModel } from '../../../shared/engine/sampling/physical-model'
import type { Samples } from '../../../shared/engine/sampling/samples'

interface AnnealingMethod {
  model: 'simulated annealing'
  temperature: number
  arithmetic: Arithmetic
}

interface PathMethod extends Pick<PathIntegralOptions, 'slices' | 'temperature' | 'table' | 'schedule'> {
  model: 'path-integral'
}

export interface RehearseInput {
  programmed: Programmed
  /** Number of the gauge within the run, and the seed all gauges are drawn from; null for the problem as it stands. */
  gauge: { seed: number; number: number } | null
  error: { sigmaH: number; sigmaJ: number; seed: number } | null
  sweeps: number
  /** Simulated annealing to a final temperature in programmed units, or path-integral Monte Carlo along the machine's A(s) and B(s). */
  method: AnnealingMethod | PathMethod
  /** Number of the first of these reads within the run: each read has a random stream of its own. */
  firstRead: number
  reads: number
  seed: number
}

/**
 * Makes one share of a rehearsal's reads, with its gauge applied before and undone after. One sign a chain: chain
 * couplings keep theirs, so strong chains stay within an asymmetric range; the run sheet's checks look at the others.
 */
export function rehearse(input: RehearseInput, control: Control<AnnealProgress>): Samples {
  const { programmed, gauge, error, sweeps, method, firstRead, reads, seed } = input
  const signs = gauge ? drawGauge(programmed, gauge.seed, gauge.number, 'chain') : null
  const model = physicalModel(signs ? applyGauge(programmed, signs) : programmed, error)
  const share = { firstRead, reads, sweeps, seed }
  const samples =
    method.model === 'path-integral'
      ? pathIntegralReads(model, { ...share, ...method }, control)
      : annealIn(model, { ...share, ...method }, control)
  return signs ? undoGauge(samples, signs) : samples
}
