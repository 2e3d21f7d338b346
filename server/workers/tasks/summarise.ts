import type { Control } from '../../../shared/engine/control'
import type { Problem } from '../../../shared/engine/problem/problem'
import type { Programmed } from '../../../shared/engine/programming/programme'
import type { BreakStatistics } from '../../../shared/engine/readout/breaks'
import { breakStatistics } from '../../../shared/engine/readout/breaks'
import type { DecodeMethod } from '../../../shared/engine/readout/decode'
import { decode } from '../../../shared/engine/readout/decode'
import { distinctSolutions, logicalEnergies, physicalEnergies } from '../../../shared/engine/readout/energies'
import type { Samples } from '../../../shared/engine/sampling/samples'
import { spinOf } from '../../../shared/engine/sampling/samples'

export interface SummariseInput {
  samples: Samples
  programmed: Programmed
  ising: Problem
  /** Of the coins that settle ties. */
  seed: number
  methods: DecodeMethod[]
  /** How many of the best distinct solutions to answer for each method. */
  solutions: number
}

export interface DecodedSummary {
  method: DecodeMethod
  ties: number
  /** Per row kept: logical energy of the minimised problem, offset included, and reads. */
  energies: Float64Array
  counts: Uint32Array
  solutions: { energy: number; count: number; distance: number; spins: Int8Array }[]
}

export interface Summary {
  breaks: BreakStatistics
  physical: Float64Array
  decoded: DecodedSummary[]
}

/** Break statistics, energies and best solutions of a set of samples. */
export function summarise(input: SummariseInput, _control: Control<never>): Summary {
  const { samples, programmed, ising, seed, methods, solutions } = input
  return {
    breaks: breakStatistics({ samples, programmed }),
    physical: physicalEnergies(programmed, samples),
    decoded: methods.map((method) => {
      const { states, ties } = decode({ samples, programmed, method, seed, ising })
      const energies = logicalEnergies(ising, states)
      const best = distinctSolutions(states, energies).slice(0, solutions)
      return {
        method,
        ties,
        energies,
        counts: states.counts,
        solutions: best.map(({ row, energy, count, distance }) => ({
          energy,
          count,
          distance,
          spins: Int8Array.from({ length: states.width }, (_, c) => spinOf(states, row, c)),
        })),
      }
    }),
  }
}
