import { createHash } from 'node:crypto'
import type { Embedding } from '../../shared/engine/embedding/embedding'
import { convertForm } from '../../shared/engine/problem/convert'
import type { Problem } from '../../shared/engine/problem/problem'
import type { CutBounds } from '../../shared/engine/programming/cut-bounds'
import { cutBoundsOf } from '../../shared/engine/programming/cut-bounds'
import type { Layout, LayoutInput } from '../../shared/engine/programming/layout'
import { layOut } from '../../shared/engine/programming/layout'
import type { Programmed, ProgrammeResult } from '../../shared/engine/programming/programme'
import { programmeLayout } from '../../shared/engine/programming/programme'
import type { ChainStrengths, StrengthRule } from '../../shared/engine/programming/strength'
import { chainStrengthsOf, STRENGTH_DEFAULTS } from '../../shared/engine/programming/strength'
import { DomainError } from '../../shared/errors'
import { packArrays } from '../../shared/packed-arrays'
import type { RunSheetSettings, Strength } from '../../shared/schemas/run-sheets'
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

/** What is programmed, without what it is called. */
export type Programmable = Pick<Bench, 'labels' | 'ising' | 'embedding'> & {
  machine: Pick<CalibratedMachine, 'graph' | 'sheet'>
}

export function layoutInput({ ising, embedding, machine }: Programmable, settings: RunSheetSettings): LayoutInput {
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

/** Chain strengths by a rule. @throws DomainError for a rule that cannot be used */
export function strengthsOf(
  strength: Strength,
  { labels, ising }: Pick<Bench, 'labels' | 'ising'>,
  layout: Layout,
): ChainStrengths {
  try {
    return chainStrengthsOf(ruleOf(strength, labels), layout, ising)
  } catch (error) {
    if (!(error instanceof RangeError)) throw error
    throw new DomainError('not acceptable', 'strength.value', `This strength cannot be used: ${error.message}.`, [
      { path: 'strength.value', message: error.message },
    ])
  }
}

export interface Programming {
  /** Before strengths and scale. */
  layout: Layout
  result: ProgrammeResult
  bounds: CutBounds
  /** Chain strength of every variable, in units of the Ising form. */
  strengths: Float64Array
}

/** Programmes an embedding with the settings of a run sheet. A pure function of stored things. */
export function programmeBench(bench: Programmable, settings: RunSheetSettings): Programming {
  const layout = layOut(layoutInput(bench, settings))
  const { perChain } = strengthsOf(settings.strength, bench, layout)
  const { ranges } = bench.machine.sheet
  const scale = settings.scale ?? 'fit'
  return {
    layout,
    result: programmeLayout(layout, bench.ising, { strengths: perChain, ranges, scale }),
    bounds: cutBoundsOf(layout),
    strengths: perChain,
  }
}

/** The programmed values, or a refusal saying which range they leave. */
export function requireProgrammed({ result }: Programming): Programmed {
  if (result.programmed) return result.programmed
  const words = result.excesses.map(({ count, range, limits }) => {
    const [low, high] = limits.map((limit) => String(limit).replace('-', '−'))
    return `${count} ${count === 1 ? 'value' : 'values'} of ${range} outside ${low} to ${high}`
  })
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
