import { z } from 'zod'
import type { AdviceAction, AdviceFigure } from '../engine/readout/advice/item'
import { ADVICE_KINDS } from '../engine/readout/advice/item'
import type { BreakGroup } from '../engine/readout/grouped-breaks'
import type { ScaleOutlook } from '../engine/readout/scale-outlook'
import type { Proportion } from './common'
import { decodeSchema } from './returns'

export const analysisQuerySchema = z.object({
  decode: decodeSchema.default('majority'),
  /** How much worse than the reference still counts as reached, in units of the problem. */
  gap: z.coerce.number().min(0).max(1e300).default(0),
})
export type AnalysisQuery = z.infer<typeof analysisQuerySchema>

export const nextDraftSchema = z.object({
  items: z.array(z.enum(ADVICE_KINDS)).min(1, 'choose at least one item').max(ADVICE_KINDS.length),
  decode: decodeSchema.default('majority'),
  gap: z.number().min(0).max(1e300).default(0),
  /** Only tells what would change. */
  dryRun: z.boolean().default(false),
})
export type NextDraft = z.infer<typeof nextDraftSchema>

/** One thing that differs between the run sheet of the samples and the next one. */
export interface DraftChange {
  field: string
  from: string
  to: string
}

/** Of a dry run nothing was saved and id and number are null. */
export interface NextDraftView {
  id: string | null
  number: number | null
  /** The run sheet that the samples came from. */
  madeFrom: { id: string; number: number }
  changes: DraftChange[]
}

/** A number of reads or a time with its interval; null where it is without end. */
export interface Needed {
  value: number | null
  low: number | null
  high: number | null
}

export interface SuccessView extends Proportion {
  /** In the problem's own sense. */
  reference: { energy: number; proved: boolean }
  r99: Needed
  /** Whole machine time over all reads, and whether it came with the samples or is the estimate of the run sheet. */
  millisecondsPerRead: number
  isTimeMeasured: boolean
  milliseconds: Needed
}

export interface TemperatureView {
  /** In programmed units; 0 where no spin ever stood against its local field. */
  temperature: number
  inverseTemperature: number | null
  /** Standard error of the inverse temperature; null where it has none. */
  standardError: number | null
  /** Rows it was worked out from. */
  rows: number
}

export interface GaugeView {
  gauge: number
  reads: number
  readsWithBreak: Proportion
  chainReads: Proportion
  /** In the problem's own sense; null where the decoding keeps no read. */
  energy: { mean: number; standardError: number } | null
  success: Proportion | null
  temperature: TemperatureView | null
}

export interface GaugeTestView {
  of: 'breaks' | 'successes' | 'energies'
  statistic: number
  degrees: number
  p: number
  adjusted: number
  isReliable: boolean
}

export interface AdviceView {
  kind: (typeof ADVICE_KINDS)[number]
  action: AdviceAction
  /** Whether the next draft can be made with it: the others say where to look. */
  isSetting: boolean
  sentence: string
  evidence: readonly AdviceFigure[]
}

/** What samples say beyond their summary, and what to change next. */
export interface AnalysisView {
  decode: z.infer<typeof decodeSchema>
  gap: number
  reads: number
  /** Null where no reference is known. */
  success: SuccessView | null
  breaks: { length: readonly BreakGroup[]; margin: readonly BreakGroup[]; degree: readonly BreakGroup[] }
  /** Empty where the samples do not say under which gauge they were read. */
  gauges: GaugeView[]
  gaugeTests: GaugeTestView[]
  temperature: (TemperatureView & { rowsInAll: number }) | null
  scale: { value: number; greatest: number; limitedBy: string; outlook: ScaleOutlook | null }
  advice: AdviceView[]
  /** Of ties and of rows left out by lot. */
  seed: number
  version: string
}
