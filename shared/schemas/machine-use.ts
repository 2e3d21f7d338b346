import { z } from 'zod'
import type { CapacityResult, CapacitySettings, ChainLengthPoint } from './machines'
import { calibrationQuerySchema } from './machines'
import type { Page, Person, Proportion } from './common'
import { calibrationNumberSchema, pageQuerySchema, seedSchema } from './common'

export const machineUseQuerySchema = calibrationQuerySchema.extend(pageQuerySchema.shape)
export type MachineUseQuery = z.infer<typeof machineUseQuerySchema>

export const breaksQuerySchema = calibrationQuerySchema.extend({
  /** Counts rehearsals too, which say nothing about the machine. */
  rehearsals: z.stringbool().default(false),
  format: z.enum(['json', 'csv']).default('json'),
})

/** How the longest chains of a machine are to be measured. */
export const measureCapacitySchema = z.object({
  calibration: calibrationNumberSchema.optional(),
  seed: seedSchema.default(1),
  /** Random problems of each size and density. */
  problems: z.number().int().min(1).max(20).default(3),
  /** For each of them. */
  timeLimitSeconds: z.number().min(0.1).max(120).default(10),
})
export type MeasureCapacity = z.infer<typeof measureCapacitySchema>

/** An embedding that stands on a machine. */
export interface MachineUseItem {
  id: string
  number: number
  problem: { id: string; number: number; name: string }
  /** Calibration at which it was made. */
  calibration: number
  /** The calibration that broke it, where it does not hold at the one asked about. */
  brokenSince: number | null
  qubitsUsed: number
  /** Of the qubits that work at the calibration asked about, 0 … 1. */
  share: number
  longestChain: number
  chosen: boolean
  /** Run sheets that are neither returned nor closed. */
  openRunSheets: { id: string; number: number }[]
  /** Uploaded samples, without rehearsals. */
  returns: number
  reads: number
  by: Person | null
  madeAt: string
}

export interface MachineUse extends Page<MachineUseItem> {
  calibration: number
  workingQubits: number
}

/** Breaks of one part beside those of its neighbours; see docs/formulas.md, Breaks by part. */
export interface PartRate extends Proportion {
  /** Parts that it was compared with, summed over returns; 0 where there were too few like it. */
  neighbours: number
  neighbourRate: number | null
  /** Null too where the neighbours never broke. */
  ratio: number | null
  /** Adjusted for all parts that were compared. */
  q: number | null
  suspect: boolean
}

export interface QubitBreaks extends PartRate {
  id: number
}
export interface MachineCouplerBreaks extends PartRate {
  a: number
  b: number
}

/** What was compared, and how much parts differ anyway: standard deviation of the logarithm of their rates. */
export interface BreaksJudged {
  tested: number
  spread: number
}

export interface MachineBreaks {
  calibration: number
  rehearsals: boolean
  returns: {
    id: string
    number: number
    source: 'rehearsal' | 'upload'
    runSheet: { id: string; number: number }
    embedding: { id: string; number: number }
    reads: number
  }[]
  /** Older returns beyond the most that are summed up. */
  leftOut: number
  /** Embeddings that the returns come from. */
  embeddings: number
  reads: number
  qubits: QubitBreaks[]
  couplers: MachineCouplerBreaks[]
  judged: { qubits: BreaksJudged; couplers: BreaksJudged }
}

/** A measurement of the longest chains, with what made it. */
export interface CapacityMeasured {
  id: string
  calibration: number
  status: 'running' | 'measured' | 'cancelled' | 'failed'
  jobId: string | null
  settings: CapacitySettings
  complete: CapacityResult['complete']
  points: ChainLengthPoint[]
  reason: string | null
  seconds: number | null
  version: string
  by: Person | null
  at: string
}

/** What is known of a machine's room without working anything out. */
export interface CapacityCard {
  calibration: number
  qubits: { working: number; made: number }
  couplers: { working: number; made: number }
  /** Working qubits by their number of working couplers, ascending. */
  degrees: { degree: number; qubits: number }[]
  /** The newest that has points: of this calibration or, failing that, of an earlier one. */
  measured: CapacityMeasured | null
  /** The newest of this calibration where it is not the one above: under way, or why there is none. */
  newest: CapacityMeasured | null
}
