import { createHash } from 'node:crypto'
import type { Embedding } from '../../shared/engine/embedding/embedding'
import { couplingSums } from '../../shared/engine/programming/ranges'
import { histogram } from '../../shared/engine/problem/histogram'
import { convertForm } from '../../shared/engine/problem/convert'
import type { Problem } from '../../shared/engine/problem/problem'
import type { LayoutInput } from '../../shared/engine/programming/layout'
import type { Programmed, ProgrammeResult } from '../../shared/engine/programming/programme'
import { programme } from '../../shared/engine/programming/programme'
import type { CutBounds, StrengthRule } from '../../shared/engine/programming/strength'
import {
  chainStrengths,
  cutBounds,
  referenceSize,
  rmsCoupling,
  rmsSize,
  STRENGTH_DEFAULTS,
} from '../../shared/engine/programming/strength'
import { precisionReport } from '../../shared/engine/programming/precision'
import { DomainError } from '../../shared/errors'
import { packArrays } from '../../shared/packed-arrays'
import type {
  RuleView,
  RunSheetSettings,
  RunSheetView,
  ScaleLimitView,
  Strength,
} from '../../shared/schemas/run-sheets'
import type { App } from '../app'
import type { EmbeddingRow } from '../database/repositories/embeddings'
import { findReferredProblem } from '../database/repositories/problems'
import type { ProblemRow } from '../database/repositories/problems'
import { unpackChains } from './chains'
import type { CalibratedMachine } from './machine-graphs'
import { calibratedMachine } from './machine-graphs'
import { problemData } from './problems'

/** What a strength rule is multiplied by when the person gives no value; ours, stated on the run sheet. */
export const RULE_DEFAULTS = {
  fixed: 1.25,
  rms: 1,
  choi: STRENGTH_DEFAULTS.margin,
  cut: STRENGTH_DEFAULTS.margin,
} as const

/** Everything that programming an embedding needs, loaded. */
export interface Bench {
  problem: ProblemRow
  labels: string[]
  ising: Problem
  embedding: Embedding
  row: EmbeddingRow
  machine: CalibratedMachine
}

/** Loads problem, embedding and the machine at the embedding's calibration. @throws DomainError when it holds no chains */
export async function loadBench(app: App, row: EmbeddingRow): Promise<Bench> {
  if (row.status !== 'found' || !row.chainsBlobId)
    throw new DomainError(
      'wrong state',
      'embedding.not-found',
      `Embedding E-${row.number} has no chains (${row.status}). Choose one that was found.`,
    )
  const problem = await findReferredProblem(app.db, row.problemId, row.problemVersion)
  if (!problem) throw new DomainError('not found', 'problem.unknown', 'The problem of this embedding was deleted.')
  const { form, labels, problem: coefficients } = await problemData(app, problem)
  return {
    problem,
    labels,
    ising: convertForm(coefficients, form, 'ising'),
    embedding: unpackChains(await app.blobs.read(row.chainsBlobId)),
    row,
    machine: await calibratedMachine(app, row, row.machineId, row.calibration),
  }
}

export function layoutInput({ ising, embedding, machine }: Bench, settings: RunSheetSettings): LayoutInput {
  const { fieldSplit, chainCouplers, interactionCouplers } = settings
  return { ising, embedding, machine: machine.graph, fieldSplit, chainCouplers, interactionCouplers }
}

/** The engine's rule for a strength as entered. @throws DomainError for variables that are unknown or have no strength */
export function ruleOf(strength: Strength, labels: readonly string[]): StrengthRule {
  const { rule, value, perChain } = strength
  if (rule !== 'manual') return { rule, value: value ?? RULE_DEFAULTS[rule] }
  const known = new Set(labels)
  const unknown = Object.keys(perChain ?? {}).filter((label) => !known.has(label))
  // A label may be the name of something that every object has, such as constructor.
  const given = labels.map((label) => (perChain && Object.hasOwn(perChain, label) ? perChain[label]! : null))
  if (unknown.length > 0)
    throw new DomainError(
      'not acceptable',
      'strength.variable',
      `The problem has no variable ${unknown.slice(0, 5).join(', ')}.`,
      [{ path: 'strength.perChain', message: 'unknown variable' }],
    )
  if (value === undefined && given.includes(null))
    throw new DomainError(
      'not acceptable',
      'strength.value',
      'A manual strength needs a value, or one for every variable.',
      [{ path: 'strength.value', message: 'missing' }],
    )
  return { rule, value: value ?? 0, perChain: given }
}

function strengthsOf(strength: Strength, bench: Bench, input: LayoutInput) {
  try {
    return chainStrengths(ruleOf(strength, bench.labels), input)
  } catch (error) {
    if (!(error instanceof RangeError)) throw error
    throw new DomainError('not acceptable', 'strength.value', `This strength cannot be used: ${error.message}.`, [
      { path: 'strength.value', message: error.message },
    ])
  }
}

export interface Programming {
  result: ProgrammeResult
  bounds: CutBounds
  /** Chain strength of every variable, in units of the Ising form. */
  strengths: Float64Array
}

/** Programmes an embedding with the settings of a run sheet. A pure function of stored things. */
export function programmeBench(bench: Bench, settings: RunSheetSettings): Programming {
  const input = layoutInput(bench, settings)
  const { perChain } = strengthsOf(settings.strength, bench, input)
  const { ranges } = bench.machine.sheet
  const scale = settings.scale ?? 'fit'
  return {
    result: programme({ ...input, strengths: perChain, ranges, scale }),
    bounds: cutBounds(input),
    strengths: perChain,
  }
}

/** The programmed values, or a refusal saying which range they leave. */
export function requireProgrammed({ result }: Programming): Programmed {
  if (result.programmed) return result.programmed
  const words = result.excesses.map(
    (excess) => `${excess.count} values of ${excess.range} outside ${excess.limits[0]} to ${excess.limits[1]}`,
  )
  throw new DomainError(
    'not acceptable',
    'programme.ranges',
    `The values leave the machine’s ranges: ${words.join('; ')}.`,
    [{ path: 'scale', message: words.join('; ') }],
  )
}

/**
 * What a run sheet is shown with: as programmed, or as it would be at the fitted scale where a chosen one leaves the
 * ranges, which a repaired embedding can bring about. A page that could not be opened could not be mended either.
 */
export function programmeShown(bench: Bench, settings: RunSheetSettings): Programming {
  const programming = programmeBench(bench, settings)
  const isChosen = settings.scale !== null
  return !programming.result.programmed && isChosen ? programmeBench(bench, { ...settings, scale: null }) : programming
}

/** SHA-256 over the programmed values, hex. */
export function fingerprintOf({ qubits, h, ends, J, scale, offset }: Programmed): string {
  return createHash('sha256')
    .update(packArrays({ qubits, h, ends, J, factors: Float64Array.of(scale, offset) }))
    .digest('hex')
}

const isMultiQubit = (bench: Bench, i: number): boolean =>
  bench.embedding.offsets[i + 1]! - bench.embedding.offsets[i]! > 1

export function chainsBelowBound(bench: Bench, strengths: Float64Array, bounds: CutBounds): number {
  return strengths.reduce((count, k, i) => count + (isMultiQubit(bench, i) && k < bounds.bound[i]! ? 1 : 0), 0)
}

/** Share of the programmed interaction couplings below 2σ_J; null where the machine states no control error. */
function couplingsUnderTwoSigma({ J, isChainCoupler }: Programmed, sigmaJ: number): number | null {
  const sizes = J.filter((_, c) => !isChainCoupler[c]).map(Math.abs)
  if (sigmaJ === 0 || sizes.length === 0) return null
  return sizes.filter((size) => size < 2 * sigmaJ).length / sizes.length
}

const figure = (value: number): string => String(Number(value.toPrecision(4)))

function fromOf(rule: Strength['rule'], value: number | undefined, ising: Problem): string {
  if (rule === 'fixed') return `${figure(value!)} × ${figure(referenceSize(ising))}, the largest |J|`
  if (rule === 'rms') return `κ ${figure(value!)} × ${figure(rmsSize(ising))}, r.m.s. of J × √degree`
  if (rule === 'manual') return value === undefined ? 'as entered, per chain' : 'as entered'
  return `${figure(value!)} × the bound of each chain`
}

const TITLES: Record<Strength['rule'], string> = {
  fixed: 'Fixed multiple',
  rms: 'Root-mean-square',
  choi: 'Choi’s bound',
  cut: 'Cut bound',
  manual: 'As entered',
}

/** Every strength rule worked out on this embedding, the chosen one with its own value. */
export function compareRules(bench: Bench, settings: RunSheetSettings, bounds: CutBounds): RuleView[] {
  const chosen = settings.strength
  const rules: Strength['rule'][] = [
    'fixed',
    'rms',
    'choi',
    'cut',
    ...(chosen.rule === 'manual' ? (['manual'] as const) : []),
  ]
  const input = layoutInput(bench, settings)
  return rules.map((rule) => {
    const selected = rule === chosen.rule
    const value = (selected ? chosen.value : undefined) ?? (rule === 'manual' ? undefined : RULE_DEFAULTS[rule])
    const { perChain, summary } = strengthsOf(selected ? chosen : { rule, value }, bench, input)
    const { ranges } = bench.machine.sheet
    const { programmed } = programme({ ...input, strengths: perChain, ranges, scale: settings.scale ?? 'fit' })
    return {
      rule,
      title: TITLES[rule],
      from: fromOf(rule, value, bench.ising),
      value: value ?? null,
      k: { min: summary.least, max: summary.greatest },
      scale: programmed?.scale ?? 0,
      scaleLimit: programmed ? scaleLimitOf(bench, programmed) : null,
      couplingsUnderTwoSigma: programmed
        ? couplingsUnderTwoSigma(programmed, bench.machine.sheet.controlError.J)
        : null,
      chainsBelowCutBound: chainsBelowBound(bench, perChain, bounds),
      selected,
    }
  })
}

/** The value before scaling that goes furthest beyond its range, where the scale had to come down for one. */
export function scaleLimitOf(bench: Bench, programmed: Programmed): ScaleLimitView | null {
  const { limitedBy: range, scale } = programmed
  if (range === 'nothing') return null
  const { h, J, couplingSum } = bench.machine.sheet.ranges
  const [values, ends] = {
    h: [programmed.h, h] as const,
    J: [programmed.J, J] as const,
    'coupling sum': [couplingSums(programmed), couplingSum!] as const,
  }[range]
  let limit: ScaleLimitView = { range, limit: 1, value: 0 }
  for (const value of values) {
    const end = ends[value < 0 ? 0 : 1]
    if (value / end > (limit.value * scale) / limit.limit) limit = { range, limit: end, value: value / scale }
  }
  return limit
}

/** Figures of the Ising form that strengths are reckoned from. */
export function isingSizes({ ising }: Bench): RunSheetView['ising'] {
  const greatest = (list: Float64Array) => list.reduce((most, value) => Math.max(most, Math.abs(value)), 0)
  return {
    variables: ising.n,
    interactions: ising.values.length,
    greatestJ: greatest(ising.values),
    greatestH: greatest(ising.linear),
    rmsJ: rmsCoupling(ising),
    leastShare: STRENGTH_DEFAULTS.leastShare,
  }
}

const SIZE_BINS = 24

/** What the machine's control error does to the programmed values. */
export function precisionOf(bench: Bench, programmed: Programmed): RunSheetView['precision'] {
  const { h: sigmaH, J: sigmaJ } = bench.machine.sheet.controlError
  const fields = programmed.h.map(Math.abs).filter((size) => size > 0)
  const couplings = programmed.J.filter((_, c) => !programmed.isChainCoupler[c]).map(Math.abs)
  return {
    sigmaH,
    sigmaJ,
    fieldsUnderTwoSigma:
      sigmaH === 0 || fields.length === 0 ? null : fields.filter((size) => size < 2 * sigmaH).length / fields.length,
    couplingsUnderTwoSigma: couplingsUnderTwoSigma(programmed, sigmaJ),
    energyNoise: precisionReport(programmed, bench.ising, { sigmaH, sigmaJ }).orderingNoise,
    fieldSizes: histogram(fields, SIZE_BINS),
    couplingSizes: histogram(couplings, SIZE_BINS),
  }
}
