import type { Control } from '../../../shared/engine/control'
import { applyGauge, drawGauge, undoGauge } from '../../../shared/engine/programming/gauges'
import type { Programmed } from '../../../shared/engine/programming/programme'
import type { AnnealProgress } from '../../../shared/engine/sampling/anneal'
import { anneal } from '../../../shared/engine/sampling/anneal'
import { physicalModel } from '../../../shared/engine/sampling/physical-model'
import type { Samples } from '../../../shared/engine/sampling/samples'

export interface RehearseInput {
  programmed: Programmed
  /** Number of the gauge within the run, and the seed all gauges are drawn from; null for the problem as it stands. */
  gauge: { seed: number; number: number } | null
  error: { sigmaH: number; sigmaJ: number; seed: number } | null
  sweeps: number
  temperature: number
  /** Number of the first of these reads within the run: each read has a random stream of its own. */
  firstRead: number
  reads: number
  seed: number
}

/**
 * Anneals one share of a rehearsal's reads, with its gauge applied before and undone after. One sign a chain: chain
 * couplings keep theirs, so strong chains stay within an asymmetric range; the run sheet's checks look at the others.
 */
export function rehearse(input: RehearseInput, control: Control<AnnealProgress>): Samples {
  const { programmed, gauge, error, sweeps, temperature, firstRead, reads, seed } = input
  const signs = gauge ? drawGauge(programmed, gauge.seed, gauge.number, 'chain') : null
  const model = physicalModel(signs ? applyGauge(programmed, signs) : programmed, error)
  const samples = anneal(model, { firstRead, reads, sweeps, temperature, seed }, control)
  return signs ? undoGauge(samples, signs) : samples
}
