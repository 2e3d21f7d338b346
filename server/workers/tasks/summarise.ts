import type { Control } from '../../../shared/engine/control'
import type { Problem } from '../../../shared/engine/problem/problem'
import type { Programmed } from '../../../shared/engine/programming/programme'
import type { BreakStatistics } from '../../../shared/engine/readout/breaks'
import { breakStatistics } from '../../../shared/engine/readout/breaks'
import type { DecodeMethod } from '../../../shared/engine/readout/decode'
import { decode } from '../../../shared/engine/readout/decode'
import { logicalEnergies, physicalEnergies } from '../../../shared/engine/readout/energies'
import type { Samples } from '../../../shared/engine/sampling/samples'

export interface SummariseInput {
  samples: Samples
  programmed: Programmed
  ising: Problem
  /** Of the coins that settle ties. */
  seed: number
}

export interface DecodedRows {
  method: DecodeMethod
  ties: number
  /** A row for each row of the samples that is kept. */
  states: Samples
  /** Row of the samples behind each. */
  kept: Uint32Array
  /** Logical energy of the minimised problem, offset included. */
  energies: Float64Array
}

/** What a set of samples holds. */
export interface Summary {
  breaks: BreakStatistics
  /** Of each row of the samples, in programmed units. */
  physical: Float64Array
  decoded: DecodedRows[]
}

/** Where chains broke, and the energies of the rows as they are. */
export const countBreaks = (
  { samples, programmed }: Pick<SummariseInput, 'samples' | 'programmed'>,
  _control: Control<never>,
): Pick<Summary, 'breaks' | 'physical'> => ({
  breaks: breakStatistics({ samples, programmed }),
  physical: physicalEnergies(programmed, samples),
})

/** The rows decoded in one way. */
export function decodeRows(
  { samples, programmed, ising, seed, method }: SummariseInput & { method: DecodeMethod },
  _control: Control<never>,
): DecodedRows {
  const decoded = decode({ samples, programmed, method, seed, ising })
  return { method, ...decoded, energies: logicalEnergies(ising, decoded.states) }
}
