import type { Control } from '../../../shared/engine/control'
import type { VariableGroup } from '../../../shared/engine/problem/groups/group'
import type { Problem } from '../../../shared/engine/problem/problem'
import type { Programmed } from '../../../shared/engine/programming/programme'
import type { BreakStatistics } from '../../../shared/engine/readout/breaks'
import { breakStatistics } from '../../../shared/engine/readout/breaks'
import type { DecodeMethod } from '../../../shared/engine/readout/decode'
import { decode } from '../../../shared/engine/readout/decode'
import { distinctSolutions, logicalEnergies, physicalEnergies } from '../../../shared/engine/readout/energies'
import type { Violations } from '../../../shared/engine/readout/violations'
import { violationsOf } from '../../../shared/engine/readout/violations'
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
  /** Constraint groups whose violations are counted. */
  groups?: VariableGroup[]
}

export interface DecodedSummary {
  method: DecodeMethod
  ties: number
  /** Per row kept: logical energy of the minimised problem, offset included, and reads. */
  energies: Float64Array
  counts: Uint32Array
  solutions: { energy: number; count: number; distance: number; spins: Int8Array }[]
  violations: Violations
}

export interface Summary {
  breaks: BreakStatistics
  physical: Float64Array
  decoded: DecodedSummary[]
}

/** Break statistics, energies and best solutions of a set of samples. */
export function summarise(input: SummariseInput, _control: Control<never>): Summary {
  const { samples, programmed, ising, seed, methods, solutions, groups = [] } = input
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
        violations: violationsOf(states, groups),
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
