import type { Control } from '../../../shared/engine/control'
import type { Problem } from '../../../shared/engine/problem/problem'
import type { Programmed } from '../../../shared/engine/programming/programme'
import type { BreakStatistics } from '../../../shared/engine/readout/breaks'
import { breakStatistics } from '../../../shared/engine/readout/breaks'
import type { DecodeMethod } from '../../../shared/engine/readout/decode'
import { decode } from '../../../shared/engine/readout/decode'
import { logicalEnergies, physicalEnergies } from '../../../shared/engine/readout/energies'
import type { Samples } from '../../../shared/engine/sampling/samples'

export const DECODE_METHODS: readonly DecodeMethod[] = ['majority', 'discard', 'descent']

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

export interface Summary {
  breaks: BreakStatistics
  /** Of each row of the samples, in programmed units. */
  physical: Float64Array
  decoded: DecodedRows[]
}

/** What a set of samples holds: breaks, energies, and the rows decoded in every way. */
export function summarise({ samples, programmed, ising, seed }: SummariseInput, _control: Control<never>): Summary {
  return {
    breaks: breakStatistics({ samples, programmed }),
    physical: physicalEnergies(programmed, samples),
    decoded: DECODE_METHODS.map((method) => {
      const decoded = decode({ samples, programmed, method, seed, ising })
      return { method, ...decoded, energies: logicalEnergies(ising, decoded.states) }
    }),
  }
}
