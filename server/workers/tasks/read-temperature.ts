import type { Control } from '../../../shared/engine/control'
import type { Programmed } from '../../../shared/engine/programming/programme'
import type { EffectiveTemperature } from '../../../shared/engine/readout/temperature'
import { effectiveTemperature } from '../../../shared/engine/readout/temperature'
import { physicalModel } from '../../../shared/engine/sampling/physical-model'
import type { Samples } from '../../../shared/engine/sampling/samples'

export interface ReadTemperatureInput {
  samples: Samples
  programmed: Programmed
  /** Of the lot that leaves rows out. */
  seed: number
}

/** How warm the samples are, as the analysis of the same samples says it. */
export const readTemperature = (
  { samples, programmed, seed }: ReadTemperatureInput,
  _control: Control<never>,
): EffectiveTemperature | null => effectiveTemperature(physicalModel(programmed), samples, { seed })
