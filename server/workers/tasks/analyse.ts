import type { Control } from '../../../shared/engine/control'
import type { EnergyTable } from '../../../shared/engine/machine/energy-table'
import { convertForm } from '../../../shared/engine/problem/convert'
import type { VariableGroup } from '../../../shared/engine/problem/groups/group'
import { interactionGraph } from '../../../shared/engine/problem/interaction-graph'
import type { Problem } from '../../../shared/engine/problem/problem'
import type { Programmed } from '../../../shared/engine/programming/programme'
import type { Evidence } from '../../../shared/engine/readout/advice/evidence'
import { groupsEvidence } from '../../../shared/engine/readout/advice/evidence-of-groups'
import type { BreakStatistics } from '../../../shared/engine/readout/breaks'
import { chainLengths } from '../../../shared/engine/readout/breaks'
import type { GaugeRow } from '../../../shared/engine/readout/gauge-table'
import { gaugeTable } from '../../../shared/engine/readout/gauge-table'
import type { BreakGroup } from '../../../shared/engine/readout/grouped-breaks'
import { groupedBreaks } from '../../../shared/engine/readout/grouped-breaks'
import type { ScaleOutlook } from '../../../shared/engine/readout/scale-outlook'
import { scaleOutlook } from '../../../shared/engine/readout/scale-outlook'
import type { Success } from '../../../shared/engine/readout/success'
import { reaches, successWithin } from '../../../shared/engine/readout/success'
import type { EffectiveTemperature } from '../../../shared/engine/readout/temperature'
import { effectiveTemperature, TEMPERATURE_DEFAULTS } from '../../../shared/engine/readout/temperature'
import { physicalModel } from '../../../shared/engine/sampling/physical-model'
import type { SampleRows } from '../../../shared/engine/sampling/samples'
import { pausePlace } from '../../../shared/engine/spectrum/pause'
import type { Spectrum } from '../../../shared/engine/spectrum/spectrum'
import { spectrumOf } from '../../../shared/engine/spectrum/spectrum'
import { logicalSpins } from '../../../shared/engine/spectrum/spins'
import type { GaugeDifference } from '../../statistics/gauge-differences'
import { gaugeDifferences } from '../../statistics/gauge-differences'
import type { DecodedRows } from './summarise'

export interface AnalyseInput {
  samples: SampleRows
  /** What they were summed up to, decoded one way. */
  breaks: BreakStatistics
  physical: Float64Array
  decoded: DecodedRows
  programmed: Programmed
  ising: Problem
  /** Cut bound of every chain, in units of the Ising form. */
  bounds: Float64Array
  /** Of the lot that leaves rows out. */
  seed: number
  /** Energy of the minimised problem that counts as reached within the gap; null where none is known. */
  reference: { energy: number; gap: number; tolerance: number } | null
  groups: (VariableGroup & { name: string })[]
  /** The greatest scale that fits the ranges. */
  greatestScale: number
  /** Of a machine that takes schedules and was annealed straight: its table, and kT in GHz. */
  pause: { table: EnergyTable; kT: number } | null
}

export interface Analysis {
  /** Chains of two or more qubits grouped by a measure. */
  byMeasure: Record<'length' | 'margin' | 'degree', BreakGroup[]>
  /** Reads that the decoding keeps. */
  readsDecoded: number
  success: Success | null
  /** Least decoded energy, and reads that reach it; null without a read kept. */
  best: { energy: number; count: number } | null
  gauges: (GaugeRow & { temperature: EffectiveTemperature | null })[]
  differences: GaugeDifference[]
  temperature: EffectiveTemperature | null
  outlook: ScaleOutlook | null
  groups: Pick<Evidence, 'groups' | 'largest'>
  pause: Evidence['pause']
}

/** Grouped by how long chains are, how far they are held above their bound, and how many interactions they have. */
function byMeasure({ programmed, ising, bounds, breaks }: AnalyseInput): Analysis['byMeasure'] {
  const lengths = chainLengths(programmed)
  const { offsets } = interactionGraph(ising)
  const chains = Uint32Array.from(lengths.keys()).filter((i) => lengths[i]! > 1)
  const counts = Uint32Array.from(chains, (i) => breaks.perChain.breaks[i]!)
  const grouped = (measure: (i: number) => number): BreakGroup[] =>
    groupedBreaks(Float64Array.from(chains, measure), counts, breaks.reads)
  return {
    length: grouped((i) => lengths[i]!),
    margin: grouped((i) => programmed.chainStrength[i]! - bounds[i]!),
    degree: grouped((i) => offsets[i + 1]! - offsets[i]!),
  }
}

/** Spins of a spectrum that is worked out while a person waits, and the points of it. */
const PAUSE = { spins: 10, levels: 2, points: 41 }

/** Where a pause may serve, of problems with few spins; null where the spectrum does not say, or does not settle. */
function pauseOf({ ising, programmed, pause, seed }: AnalyseInput, control: Control<never>): Evidence['pause'] {
  if (!pause || ising.n > PAUSE.spins) return null
  const model = logicalSpins(ising, programmed.scale)
  let spectrum: Spectrum | null = null
  try {
    spectrum = spectrumOf(model, pause.table, { ...PAUSE, seed }, { ...control, report: () => {} })
  } catch {
    // Levels that lie too close to be told apart: nothing is advised from them, and all else stands.
    return null
  }
  const place = spectrum?.gap ? pausePlace(spectrum.gap, spectrum.s, pause.kT) : null
  if (place === null || place <= 0 || place >= 1) return null
  return { s: place, gap: spectrum!.gap!.gigahertz, gapAt: spectrum!.gap!.s, kT: pause.kT }
}

function rowOfBest(energies: Float64Array): number | null {
  const row = energies.reduce((best, energy, r) => (best < 0 || energy < energies[best]! ? r : best), -1)
  return row < 0 ? null : row
}

/** Energies by row of the samples, NaN where the decoding drops the row. */
function energiesByRow(rows: number, { kept, energies }: DecodedRows): Float64Array {
  const all = new Float64Array(rows).fill(NaN)
  kept.forEach((row, k) => (all[row] = energies[k]!))
  return all
}

/** What was read under each gauge, and how warm; nothing where the samples do not say. */
function gaugeRows(
  { samples, breaks, programmed, seed }: AnalyseInput,
  energies: Float64Array,
  hits: Uint8Array | null,
) {
  const { gauges, counts } = samples
  if (!gauges) return []
  const chains = breaks.reads > 0 ? breaks.chainReads / breaks.reads : 0
  const { brokenChains } = breaks.perRead
  const table = gaugeTable({ gauges, counts, brokenChains, chains, energies, hits })
  const model = physicalModel(programmed)
  const mostSpins = Math.ceil(TEMPERATURE_DEFAULTS.mostSpins / table.length)
  return table.map((row) => ({
    ...row,
    temperature: effectiveTemperature(model, samples, { rows: row.rows, mostSpins, seed }),
  }))
}

/** What a set of samples says beyond its summary: who breaks, how gauges differ, how warm, how successful. */
export function analyse(input: AnalyseInput, control: Control<never>): Analysis {
  const { samples, decoded, physical, programmed, ising, seed, reference, groups, greatestScale } = input
  const { counts } = samples
  const energies = energiesByRow(samples.rows, decoded)
  const target = reference && {
    energies,
    reference: reference.energy,
    gap: reference.gap,
    tolerance: reference.tolerance,
  }
  const best = rowOfBest(decoded.energies)
  const atBest = best === null ? null : { energies, reference: decoded.energies[best]!, gap: 0, tolerance: 0 }
  const gauges = gaugeRows(input, energies, target && reaches(target))
  const temperature = effectiveTemperature(physicalModel(programmed), samples, { seed })
  const scale = { scale: programmed.scale, greatest: greatestScale }
  return {
    byMeasure: byMeasure(input),
    readsDecoded: decoded.states.counts.reduce((sum, count) => sum + count, 0),
    success: target && successWithin({ ...target, counts }),
    best: atBest && { energy: atBest.reference, count: successWithin({ ...atBest, counts }).successes },
    gauges,
    differences: gaugeDifferences(gauges, energies, counts),
    temperature,
    outlook: temperature && scaleOutlook({ ...temperature, energies: physical, counts, ...scale }),
    groups: groupsEvidence({ qubo: convertForm(ising, 'ising', 'qubo'), groups, states: decoded.states, best }),
    pause: pauseOf(input, control),
  }
}
