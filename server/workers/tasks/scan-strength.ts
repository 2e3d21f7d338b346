import type { Control } from '../../../shared/engine/control'
import type { Problem } from '../../../shared/engine/problem/problem'
import { readsPerGauge } from '../../../shared/engine/programming/machine-time'
import type { Programmed } from '../../../shared/engine/programming/programme'
import { breakStatistics } from '../../../shared/engine/readout/breaks'
import { decode } from '../../../shared/engine/readout/decode'
import { logicalEnergies } from '../../../shared/engine/readout/energies'
import type { Mean } from '../../../shared/engine/readout/mean'
import { meanOf } from '../../../shared/engine/readout/mean'
import type { AnnealProgress } from '../../../shared/engine/sampling/annealing-schedule'
import { fittingArithmetic, roundingsOf } from '../../../shared/engine/sampling/arithmetic'
import { wholeGroups } from '../../../shared/engine/sampling/lanes/lane-model'
import { joinSamples } from '../../../shared/engine/sampling/merge'
import { physicalModel } from '../../../shared/engine/sampling/physical-model'
import { rehearse } from './rehearse'

export interface ScanStrengthInput {
  /** Programmed with the strength to be measured. */
  programmed: Programmed
  ising: Problem
  reads: number
  gauges: number
  /** Of the gauges and of the coins that settle ties. */
  gaugeSeed: number
  error: { sigmaH: number; sigmaJ: number } | null
  sweeps: number
  temperature: number
  seed: number
  /** Energies up to this one count as the reference optimum; null where none is known. */
  reference: number | null
}

export interface StrengthFigures {
  reads: number
  /** Share of the chains that is broken in a read. */
  brokenChains: Mean
  readsWithBreak: number
  /** Majority-decoded energies of the problem as minimised. */
  energy: Mean
  best: number
  /** Reads that reach the reference optimum; null where none is known. */
  successes: number | null
}

/** Rehearses one strength and sums up its samples, which are not kept; null when it was cancelled. */
export function scanStrength(input: ScanStrengthInput, control: Control<AnnealProgress>): StrengthFigures | null {
  const { programmed, ising, reads, gauges, gaugeSeed, error, reference, temperature, ...anneal } = input
  const arithmetic = fittingArithmetic(roundingsOf(physicalModel(programmed)), error, temperature)
  let done = 0
  let first = 0
  const parts = readsPerGauge(reads, gauges).map((count, number) => {
    const before = done
    const firstRead = first
    done += count
    first += wholeGroups(count)
    return rehearse(
      {
        ...anneal,
        programmed,
        gauge: gauges > 1 ? { seed: gaugeSeed, number } : null,
        error: error ? { ...error, seed: anneal.seed + number } : null,
        method: { model: 'simulated annealing', temperature, arithmetic },
        firstRead,
        reads: count,
      },
      { ...control, report: ({ readsDone }) => control.report({ readsDone: before + readsDone, reads }) },
    )
  })
  const samples = joinSamples(parts)
  if (samples.rows < reads) return null
  const breaks = breakStatistics({ samples, programmed })
  const { states } = decode({ samples, programmed, ising, method: 'majority', seed: gaugeSeed })
  const energies = logicalEnergies(ising, states)
  const chains = breaks.chainReads / reads
  const shares = Float64Array.from(breaks.perRead.brokenChains, (count) => (chains > 0 ? count / chains : 0))
  return {
    reads,
    brokenChains: meanOf(shares, samples.counts),
    readsWithBreak: breaks.readsWithBreak,
    energy: meanOf(energies, states.counts),
    best: energies.reduce((least, energy) => Math.min(least, energy), Infinity),
    successes: reference === null ? null : energies.reduce((sum, energy) => sum + (energy <= reference ? 1 : 0), 0),
  }
}
