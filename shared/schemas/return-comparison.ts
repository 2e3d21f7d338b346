import { z } from 'zod'
import type { Page, Proportion } from './common'
import { pageQuerySchema } from './common'
import type { Needed, TemperatureView } from './return-analysis'
import { analysisQuerySchema } from './return-analysis'
import type { Decoding } from './returns'

/** How samples are decoded and how far from the reference still counts, and which page of them, as JSON or as CSV. */
export const returnComparisonQuerySchema = pageQuerySchema
  .extend(analysisQuerySchema.shape)
  .extend({ format: z.enum(['json', 'csv']).default('json') })
export type ReturnComparisonQuery = z.infer<typeof returnComparisonQuerySchema>

/** What never changes about samples once they are there, and takes long to work out. */
export interface ReturnMeasures {
  /** Chains of two or more qubits that were broken, over all reads, of all of them. */
  chainReads: { count: number; total: number }
  /** Of chains of two or more qubits, in units of the Ising form; null where every chain is a single qubit. */
  strength: { min: number; mean: number; max: number } | null
  scale: number
  /** Null where the samples tell none. */
  temperature: (TemperatureView & { rowsInAll: number }) | null
}

/** One set of samples beside others of the same problem. */
export interface ComparedReturn {
  id: string
  number: number
  source: 'rehearsal' | 'upload'
  createdAt: string
  runSheet: { id: string; number: number; name: string }
  /** Version of the problem that was programmed. */
  version: number
  embedding: { id: string; number: number }
  machine: { id: string; name: string; calibration: number }
  annealMicroseconds: number
  gauges: number
  reads: number
  strength: ReturnMeasures['strength']
  scale: number
  readsWithBreak: Proportion
  chainReads: Proportion
  /** In the sense of the problem; null where the decoding keeps no read. */
  best: number | null
  mean: number | null
  /** How much worse than the reference the best is, 0 where they are equal but for rounding; null without a reference. */
  gapOfBest: number | null
  success: Proportion | null
  r99: Needed | null
  /** To solution, with 99 % confidence. */
  milliseconds: Needed | null
  millisecondsPerRead: number
  isTimeMeasured: boolean
  temperature: ReturnMeasures['temperature']
}

/** The samples of a problem, newest first. */
export interface ReturnComparison extends Page<ComparedReturn> {
  decode: Decoding
  gap: number
  sense: 'min' | 'max'
  currentVersion: number
  /** Over all pages. */
  counts: { returned: number; rehearsals: number }
}
