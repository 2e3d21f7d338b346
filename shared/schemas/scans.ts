import { z } from 'zod'
import type { Proportion } from './common'
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
