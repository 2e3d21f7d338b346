import { z } from 'zod'
import type { Page, Person } from './common'
import { idSchema } from './common'
import type { EmbeddingStatus } from './embeddings'
import type { EmbeddingDamage } from './machines'
import type { RunSheetState } from './run-sheets'

/** Asks for the repair of embeddings that a calibration broke; of all that wait for one where none are named. */
export const startRepairsSchema = z.strictObject({ embeddingIds: z.array(idSchema).min(1).max(1000).optional() })
export type StartRepairs = z.infer<typeof startRepairsSchema>

export interface RepairsStarted {
  repairs: { embeddingId: string; id: string; jobId: string }[]
  /** Those that cannot be repaired, with the reason; only where none were named. */
  refused: { embeddingId: string; number: number; message: string }[]
}

/** The newest try to repair an embedding: an embedding of its own. */
export interface RepairView {
  id: string
  number: number
  calibration: number
  status: EmbeddingStatus
  jobId: string | null
  /** 0 … 1 while it runs. */
  progress: number | null
  message: string
  /** Chains that differ from before; null unless found. */
  changedChains: number | null
}

/**
 * to repair: does not hold, and nothing is under way; running: a repair is; repaired: another embedding stands in its
 * place; holds again: a later calibration brought back what it lacked.
 */
export type BrokenState = 'to repair' | 'running' | 'repaired' | 'holds again'

/** An embedding that a calibration broke. */
export interface BrokenView {
  embedding: { id: string; number: number }
  machine: { id: string; name: string }
  problem: { id: string; number: number; name: string }
  createdBy: Person
  /** The calibration that broke it. */
  calibration: number
  calibrationInForce: number
  /** By the calibration in force. */
  damage: EmbeddingDamage
  /** On it, and not returned yet. */
  runSheets: { id: string; number: number; state: RunSheetState }[]
  state: BrokenState
  /** The later calibration at which it holds again, as it is. */
  holdsAgain: number | null
  repair: RepairView | null
}

export interface BrokenList extends Page<BrokenView> {
  calibration: number
}
