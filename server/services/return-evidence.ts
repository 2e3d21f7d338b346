import { countDrowned } from '../../shared/engine/programming/coefficients'
import { energyNoise } from '../../shared/engine/programming/precision'
import type { Programmed } from '../../shared/engine/programming/programme'
import { programmeLayout } from '../../shared/engine/programming/programme'
import type { Evidence } from '../../shared/engine/readout/advice/evidence'
import type { BreakStatistics } from '../../shared/engine/readout/breaks'
import { chainLengths } from '../../shared/engine/readout/breaks'
import { Z_95 } from '../../shared/engine/readout/intervals'
import type { EffectiveTemperature } from '../../shared/engine/readout/temperature'
import type { Actor, App } from '../app'
import type { ReturnRow } from '../database/repositories/run-sheets'
import type { Analysis } from '../workers/tasks/analyse'
import type { LoadedReturn } from './loaded-return'
import { machineBreaks } from './machine-breaks'
import { controlErrorOf } from './precision'
import type { Bench, Programming } from './programming'

/** Where a scale is kept down by chains, it grows as their strength falls: tried with a tenth less. */
const LESS = { strength: 0.9, gain: 1.005 }

/** The greatest scale that fits the ranges, and whether it is the chains that keep it from being greater. */
export function scaleRoom(
  { ising, machine }: Bench,
  { layout, strengths }: Programming,
): { greatest: number; isLimitedByChains: boolean } {
  const { ranges } = machine.sheet
  const fitted = (factor: number): number => {
    const given = { strengths: strengths.map((k) => k * factor), ranges, scale: 'fit' as const }
    return programmeLayout(layout, ising, given).programmed?.scale ?? 0
  }
  const greatest = fitted(1)
  return { greatest, isLimitedByChains: fitted(LESS.strength) > LESS.gain * greatest }
}

function precisionEvidence(bench: Bench, { settings }: ReturnRow, programmed: Programmed): Evidence['precision'] {
  const { ising } = bench
  const error = controlErrorOf(bench)
  const { under, of } = countDrowned(ising, programmed.scale, error)
  const sizes = [...ising.linear, ...ising.values].map(Math.abs).filter((size) => size > 0)
  // As many couplers that join chains as there are interactions, and no chain coupler, for those blur no order.
  const isChainCoupler = new Uint8Array(ising.values.length)
  const isSpread = settings.interactionCouplers === 'all'
  return {
    isKnown: error.sigmaH > 0 || error.sigmaJ > 0,
    coefficients: of,
    underTwoSigma: under,
    smallest: sizes.reduce((least, size) => Math.min(least, size), Infinity),
    blur: energyNoise(programmed, error).ofOrder,
    blurWithOneCoupler: isSpread ? energyNoise({ ...programmed, isChainCoupler }, error).ofOrder : null,
  }
}

/** Suspected parts that the embedding uses. Rehearsals tell of the settings, not of the machine: none from them. */
async function suspectsOf(app: App, actor: Actor, row: ReturnRow, bench: Bench, { qubits }: Programmed) {
  if (row.source === 'rehearsal') return { qubits: [], couplers: [] }
  const { machine, fabric, calibration } = { ...bench.machine, machine: bench.machine.machine }
  const options = { calibration: calibration.number, rehearsals: false }
  const judged = await machineBreaks(app, actor, machine.id, options)
  const used = new Set(Array.from(qubits, (q) => fabric.ids[q]!))
  return {
    qubits: judged.qubits.filter(({ suspect, id }) => suspect && used.has(id)).map(({ id }) => id),
    couplers: judged.couplers
      .filter(({ suspect, a, b }) => suspect && used.has(a) && used.has(b))
      .map(({ a, b }): [number, number] => [a, b]),
  }
}

function temperatureEvidence(
  temperature: EffectiveTemperature | null,
  outlook: Analysis['outlook'],
): Evidence['temperature'] {
  if (!temperature || !outlook) return null
  const { inverseTemperature: beta, standardError } = temperature
  const spread = Z_95 * (standardError ?? 0)
  return {
    value: temperature.temperature,
    interval: beta > spread ? { low: 1 / (beta + spread), high: 1 / (beta - spread) } : null,
    fallAtGreatest: outlook.fallAtGreatest,
    standardError: outlook.standardError,
  }
}

function successEvidence({ success, best }: Analysis, reads: number): Evidence['success'] {
  if (success) return { target: 'reference', successes: success.successes, trials: success.trials }
  return best && { target: 'best found', successes: best.count, trials: reads }
}

function chainsEvidence({ labels }: Bench, { bounds }: Programming, programmed: Programmed, breaks: BreakStatistics) {
  const lengths = chainLengths(programmed)
  return labels.flatMap((label, i) =>
    lengths[i]! < 2
      ? []
      : [
          {
            variable: i,
            label,
            length: lengths[i]!,
            strength: programmed.chainStrength[i]!,
            bound: bounds.bound[i]!,
            breaks: breaks.perChain.breaks[i]!,
          },
        ],
  )
}

/** Everything that the rules of advice look at. */
export async function evidenceOf(
  app: App,
  actor: Actor,
  row: ReturnRow,
  given: LoadedReturn & { analysis: Analysis },
): Promise<Evidence> {
  const { bench, programming, programmed, analysis } = given
  const { breaks } = given.summary
  const { settings } = row
  return {
    reads: breaks.reads,
    readsDecoded: analysis.readsDecoded,
    chains: chainsEvidence(bench, programming, programmed, breaks),
    scale: {
      value: programmed.scale,
      isChosen: settings.scale !== null,
      ...scaleRoom(bench, programming),
    },
    precision: precisionEvidence(bench, row, programmed),
    asked: { reads: settings.reads, gauges: settings.gauges },
    gaugeTests: analysis.differences.filter(({ isReliable }) => isReliable),
    success: successEvidence(analysis, breaks.reads),
    suspects: await suspectsOf(app, actor, row, bench, programmed),
    ...analysis.groups,
    pause: analysis.pause,
    temperature: temperatureEvidence(analysis.temperature, analysis.outlook),
  }
}
