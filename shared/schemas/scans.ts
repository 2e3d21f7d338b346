import { z } from 'zod'
import type { Page, Person, Proportion } from './common'
import { seedSchema } from './common'

const strength = z.number().positive().max(1e9)

/** Strengths in the units of the Ising form, each rehearsed with the run sheet's other settings. */
export const scanSchema = z.object({
  strengths: z
    .array(strength)
    .min(2, 'at least two strengths')
    .max(64, 'at most 64 strengths')
    .refine((list) => new Set(list).size === list.length, 'each strength once'),
  reads: z.number().int().min(10).max(100_000).default(1000),
  sweeps: z.number().int().min(1).max(100_000).default(256),
  /** Final temperature in units of the programmed values. */
  temperature: z.number().positive().max(100).optional(),
  controlError: z.boolean().default(true),
  seed: seedSchema.default(1),
})
export type ScanRequest = z.infer<typeof scanSchema>

/** What was measured at one strength; energies in the problem's own sense, offset included. */
export interface ScanPoint {
  strength: number
  /** Scale of the programmed problem at this strength. */
  scale: number
  reads: number
  /** Broken chains over all chains of all reads, its interval from the spread over reads. */
  brokenChains: { mean: number; low: number; high: number }
  readsWithBreak: Proportion
  /** Of majority-decoded answers. */
  energy: { mean: number; standardError: number; best: number }
  /** Reads whose decoded answer is the reference optimum; null without one. */
  success: Proportion | null
  seconds: number
}

export interface ScanView {
  id: string
  number: number
  status: 'running' | 'ready' | 'failed' | 'cancelled'
  jobId: string | null
  made: ScanRequest
  /** In order of rising strength; as far as it came. */
  points: ScanPoint[]
  /**
   * The weakest strength as good as the best one, within two standard errors; `edge` where it lies at an end of the scan.
   * Null for fewer than two points.
   */
  knee: { strength: number; edge: 'weakest' | 'strongest' | null } | null
  reason: string | null
  seconds: number | null
  version: string
  by: Person
  createdAt: string
}

/** Samples that the machine returned on the same embedding, all chains at one strength. */
export interface ReturnedAtStrength {
  returnId: string
  number: number
  runSheet: number
  strength: number
  readsWithBreak: Proportion
  /** Best majority-decoded energy, in the problem's own sense. */
  best: number
}

/** Scans, newest first, and beside each page of them all that the machine returned. */
export interface RunSheetScans extends Page<ScanView> {
  returned: ReturnedAtStrength[]
}
