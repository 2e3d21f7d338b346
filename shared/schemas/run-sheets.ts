import { z } from 'zod'
import type { Roundings } from '../engine/sampling/arithmetic'
import { PATH_DEFAULTS } from '../engine/sampling/path-limits'
import type { EnergyTable } from '../engine/machine/energy-table'
import type { ScheduleLimits } from '../engine/programming/schedule'
import type { RUN_SHEET_STATES } from '../library'
import type { Person } from './common'
import type { VersionStanding } from './problem-versions'
import { courseIssues } from '../engine/programming/schedule'
import type { BridgeCallView, SheetBridge } from './bridges'
import type { BrokenView } from './repairs'
import { idSchema, nameSchema, seedSchema, textSchema } from './common'

const positive = z.number().positive().max(1e9)

export const strengthSchema = z.object({
  /**
   * fixed: value × max |J|; rms: value × J_rms × √(mean degree); choi: Choi’s bound; cut: cut bound × value;
   * manual: value for all chains, perChain for named ones. Strengths are in the units of the Ising form.
   */
  rule: z.enum(['fixed', 'rms', 'choi', 'cut', 'manual']),
  value: positive.optional(),
  perChain: z.record(z.string(), positive).optional(),
})
export type Strength = z.infer<typeof strengthSchema>

/** s over time, from (0, 0) to (T, 1); whether the machine takes it is for the checks to say. */
export const schedulePointsSchema = z
  .array(z.object({ microseconds: z.number().min(0).max(1e6), s: z.number().min(0).max(1) }))
  .min(2, 'a schedule has at least two points')
  .max(1000, 'a schedule has at most 1000 points')
  .superRefine((points, context) => {
    for (const { point, message } of courseIssues(points))
      context.addIssue({ code: 'custom', path: [point], message: `point ${point + 1}: ${message}` })
  })

const settings = {
  strength: strengthSchema.default({ rule: 'rms' }),
  fieldSplit: z.enum(['even', 'external coupling']).default('even'),
  interactionCouplers: z.enum(['all', 'one']).default('all'),
  chainCouplers: z.enum(['all', 'spanning tree']).default('all'),
  gauges: z.number().int().min(1).max(1000).default(1),
  reads: z.number().int().min(1).max(100_000).default(1000),
  /** The duration of the schedule where one is given. */
  annealMicroseconds: z.number().positive().max(1e6).default(20),
  /** Null: the straight ramp. */
  schedule: schedulePointsSchema.nullable().default(null),
  /** The factor from Ising coefficients to programmed values; null: the greatest up to 1 that fits the ranges. */
  scale: z.number().positive().max(1e9).nullable().default(null),
  seed: seedSchema.default(1),
}
export const runSheetSettingsSchema = z.object(settings)
export type RunSheetSettings = z.infer<typeof runSheetSettingsSchema>

export const createRunSheetSchema = z.object({ embeddingId: idSchema, name: nameSchema.optional(), ...settings })

export const editRunSheetSchema = z.object({
  name: nameSchema.optional(),
  strength: strengthSchema.optional(),
  fieldSplit: settings.fieldSplit.unwrap().optional(),
  interactionCouplers: settings.interactionCouplers.unwrap().optional(),
  chainCouplers: settings.chainCouplers.unwrap().optional(),
  gauges: settings.gauges.unwrap().optional(),
  reads: settings.reads.unwrap().optional(),
  annealMicroseconds: settings.annealMicroseconds.unwrap().optional(),
  schedule: settings.schedule.unwrap().optional(),
  scale: settings.scale.unwrap().optional(),
  seed: seedSchema.optional(),
})
export type EditRunSheet = z.infer<typeof editRunSheetSchema>

export const remarkSchema = z.object({ remark: textSchema(2000).default('') })
export const issueSchema = remarkSchema.extend({
  /** Sent to the bridge of its machine; else whoever issues it hands on the bundle. */
  byBridge: z.boolean().default(false),
})
export const sendBackSchema = z.object({ remark: textSchema(2000).min(1, 'say what should change') })

export const addRemarkSchema = z.object({
  /** Members are mentioned by `@[` and their id, as the list of people has it, and `]`; they are told. */
  remark: textSchema(2000).min(1, 'write what you want to say'),
})

/** A run sheet for each s at which to quench; without a time as fast as the machine takes. */
export const quenchSeriesSchema = z.object({
  points: z
    .array(z.number().gt(0, 'between 0 and 1').lt(1, 'between 0 and 1'))
    .min(1, 'give at least one s')
    .max(50, 'at most 50 run sheets at once')
    .refine((points) => new Set(points).size === points.length, 'each s once'),
  quenchMicroseconds: z.number().positive().max(1e6).optional(),
})
export type QuenchSeries = z.infer<typeof quenchSeriesSchema>

export const compareRunSheetsSchema = z.object({ a: idSchema, b: idSchema })

export const rehearseSchema = z.object({
  reads: z.number().int().min(1).max(100_000).default(1000),
  sweeps: z.number().int().min(1).max(1_000_000).default(1000),
  /** Final temperature in units of the programmed values; default 0.1. */
  temperature: z.number().positive().max(100).optional(),
  /** Simulated annealing, or path-integral Monte Carlo along the machine’s A(s) and B(s) and the run sheet’s schedule, at the machine’s temperature. */
  model: z.enum(['simulated annealing', 'path-integral']).default('simulated annealing'),
  /** Of simulated annealing; automatic: 16 bits where their rounding is hidden by control error, else 32. */
  arithmetic: z.enum(['automatic', '16-bit', '32-bit', '64-bit']).default('automatic'),
  /** Of path-integral Monte Carlo: Trotter slices. */
  slices: z.number().int().min(2).max(PATH_DEFAULTS.mostSlices).default(PATH_DEFAULTS.slices),
  /** Redraw every programmed value with the machine’s control error. */
  controlError: z.boolean().default(false),
  seed: seedSchema.default(1),
})
export type Rehearse = z.infer<typeof rehearseSchema>

export const programmedQuerySchema = z.object({ format: z.enum(['json', 'csv', 'mtx']).default('json') })

export type RunSheetState = (typeof RUN_SHEET_STATES)[number]

/** States in which the settings may change, and in which a run sheet may be deleted. */
export const EDITABLE_STATES: readonly RunSheetState[] = ['draft', 'sent back']

/** States in which a run sheet moves to the embedding that its own was repaired as. */
export const MOVABLE_STATES: readonly RunSheetState[] = ['draft', 'sent back', 'in review', 'approved']

/** States from approval on: nothing of a run sheet changes any more, and its bundle can be had. */
export const FIXED_STATES: readonly RunSheetState[] = ['approved', 'issued', 'returned', 'closed']

/** States of a run sheet whose samples are not back yet: a broken embedding concerns it. */
export const OPEN_STATES: readonly RunSheetState[] = [...MOVABLE_STATES, 'issued']

/** What a check looks at; a run sheet has at most one check of each. */
export type CheckSubject =
  | 'ranges'
  | 'scale'
  | 'gauges'
  | 'embedding'
  | 'version'
  | 'schedule'
  | 'strength'
  | 'precision'
  | 'rehearsal'
  | 'reference'
  | 'price'
  | 'budget'

export interface CheckView {
  about: CheckSubject
  verdict: 'passed' | 'caution' | 'refused'
  what: string
  figure: string
  /** Where what it speaks of can be changed: `#` and an id on the page of the run sheet, or the path of another page. */
  at: string
}

/** The value that decides the scale, and the end of the machine's range that it must come down to. */
export interface ScaleLimitView {
  range: 'h' | 'J' | 'coupling sum'
  limit: number
  /** Before scaling, in units of the Ising form. */
  value: number
}

/** A coefficient of the Ising form, and the control error of its kind in programmed units. */
export interface SmallestView {
  kind: 'field' | 'coupling'
  value: number
  sigma: number
}

/** One strength rule worked out on this embedding, for comparing rules side by side. */
export interface RuleView {
  rule: Strength['rule']
  title: string
  /** How k follows, in words and figures. */
  from: string
  /** What the rule is multiplied by, or the k as entered; null when every chain has its own. */
  value: number | null
  /** Smallest and largest k over the chains, in units of the Ising form. */
  k: { min: number; max: number }
  scale: number
  scaleLimit: ScaleLimitView | null
  /** The smallest nonzero coefficient beside its σ; null where the machine states none for those there are. */
  smallest: SmallestView | null
  /** Nonzero coefficients with α·|c| under 2σ, of those whose kind has a control error; null where nothing fits. */
  coefficients: { under: number; of: number } | null
  chainsBelowCutBound: number
  selected: boolean
}

export interface ChainRow {
  variable: number
  label: string
  qubits: number
  /** Couplers to other chains in use. */
  couplers: number
  strength: number
  cutBound: number
  /** False where the bound is a safe upper bound, for chains with cycles. */
  cutBoundExact: boolean
  /** The split of the chain that the bound comes from: min(up, down) / cut. Null for a single qubit. */
  cutSplit: { up: number; down: number; cut: number } | null
  /** Σ|J| over the variable's interactions, and its field, of the Ising form. */
  pull: number
  field: number
}

/** What a run sheet’s machine may still spend, as those see it who prepare and review. */
export interface BudgetLeft {
  /** Available for its machine, its own and any machine's time together. */
  leftSeconds: number
  /** Held for this run sheet already. */
  heldSeconds: number
}

export interface MachineTimePart {
  part: string
  reckoning: string
  milliseconds: number
}

export interface ReturnOfRunSheet {
  id: string
  number: number
  source: 'rehearsal' | 'upload'
  /** It came by a bridge. */
  byBridge: boolean
  status: 'running' | 'ready' | 'failed' | 'cancelled'
  jobId: string | null
  reads: number
  readsWithBreak: number | null
  best: number | null
  createdAt: string
}

export interface RemarkView {
  at: string
  by: Person | null
  /** The reviewer who was away, in whose place it was decided. */
  for: Person | null
  what: string
  /** Who is mentioned stands in it as `@[` id `]`. */
  text: string
  /** Those who are mentioned, by the names they have now. */
  mentions: Person[]
}

export interface RunSheetItem {
  id: string
  number: number
  name: string
  state: RunSheetState
  problem: { id: string; number: number; name: string }
  embedding: { id: string; number: number }
  machine: { id: string; name: string }
  reads: number
  machineTimeMilliseconds: number
  changedAt: string
}

/** A run sheet that was made from another. */
export interface MadeFromItem {
  id: string
  number: number
  name: string
  state: RunSheetState
  annealMicroseconds: number
  machineTimeMilliseconds: number
  /** Where its schedule leaves for the last piece, and how long that takes; null for a straight ramp. */
  lastPiece: { s: number; microseconds: number } | null
}

export interface RunSheetView extends RunSheetItem {
  /** The run sheet that it was copied from. */
  madeFrom: { id: string; number: number; name: string } | null
  /** Run sheets that were copied from it, by number. */
  copies: MadeFromItem[]
  settings: RunSheetSettings
  /** The version of the problem that is programmed. */
  ofVersion: VersionStanding
  calibration: number
  sense: 'min' | 'max'
  fingerprints: { problem: string; embedding: string; programmed: string }
  maxAbsJ: number
  /** Figures of the Ising form that strengths are reckoned from. */
  ising: {
    variables: number
    interactions: number
    greatestJ: number
    greatestH: number
    rmsJ: number
    /** Least strength of a chain by Choi's and the cut bound, as a share of the largest |J|. */
    leastShare: number
  }
  rules: RuleView[]
  /** The chains themselves are asked for on their own: there may be tens of thousands. */
  chainTotals: { qubits: number; longest: number }
  scale: number
  limitedBy: string
  scaleLimit: ScaleLimitView | null
  precision: {
    sigmaH: number
    sigmaJ: number
    fieldsUnderTwoSigma: number | null
    couplingsUnderTwoSigma: number | null
    /** One standard deviation, in units of the problem. */
    energyNoise: number
    /** Programmed fields that are not 0, and programmed couplings between chains. */
    fields: number
    couplings: number
  }
  /** What a schedule is held against, and the energies that it goes through. */
  anneal: {
    limits: ScheduleLimits
    energyTable: EnergyTable | null
    temperatureMillikelvin: number | null
  }
  /** What is left of the budget for its machine; null where none is kept. */
  budget: BudgetLeft | null
  machineTime: {
    parts: MachineTimePart[]
    totalMilliseconds: number
    /** From the machine sheet. */
    timing: { programmingMicroseconds: number; readoutMicroseconds: number; delayMicroseconds: number }
    /** The whole estimate at the price of the machine sheet; null where that states none. */
    price: { perSecond: number; currency: string; amount: number } | null
  }
  rehearsal: RehearsalChoices
  checks: CheckView[]
  /** Its embedding, where that does not hold at the calibration in force and the samples are not back yet. */
  broken: BrokenView | null
  /** What it can be issued by; null where its machine has no bridge that is on. */
  bridge: SheetBridge | null
  /** How far it is on its way to a bridge and back; null where it was not sent to one. */
  call: BridgeCallView | null
  returns: ReturnOfRunSheet[]
  remarks: RemarkView[]
  preparedBy: Person
  reviewedBy: Person | null
  createdAt: string
}

/** What a rehearsal of this run sheet can be made of. */
export interface RehearsalChoices extends Roundings {
  /** The machine's temperature in programmed units at s = 1; null without temperature or energy table. */
  physical: { temperature: number; millikelvin: number; B: number } | null
}

export interface ProgrammedView {
  h: Record<string, number>
  J: [number, number, number][]
  scale: number
  chainStrength: Record<string, number>
  /** scale · E_logical = E_physical + offset on every unbroken state. */
  offset: number
}
