import { z } from 'zod'
import type { Person } from './common'
import { calibrationNumberSchema, idSchema, seedSchema } from './common'

export const createEmbeddingSchema = z.object({
  problemId: idSchema,
  machineId: idSchema,
  calibration: calibrationNumberSchema.optional(),
  method: z.enum(['auto', 'search']).default('auto'),
  seed: seedSchema.default(1),
  tries: z.number().int().min(1).max(1000).default(8),
  timeLimitSeconds: z.number().min(0.1).max(3600).default(30),
})
export type CreateEmbedding = z.infer<typeof createEmbeddingSchema>

export const importEmbeddingSchema = z.object({
  problemId: idSchema,
  machineId: idSchema,
  calibration: calibrationNumberSchema.optional(),
  chains: z.record(z.string(), z.array(z.number().int().min(0)).max(100_000)),
})
export type ImportEmbedding = z.infer<typeof importEmbeddingSchema>

export type EmbeddingStatus = 'running' | 'found' | 'none found' | 'cancelled' | 'failed'

export interface EmbeddingStats {
  qubitsUsed: number
  chainLength: { max: number; mean: number; min: number }
  /** Couplers inside chains and between interacting chains. */
  chainCouplers: number
  interactionCouplers: number
  couplersUsed: number
}

/** Why there is no embedding: what stood in the way when the search ended. */
export interface UnmetView {
  message: string
  /** Qubits wanted by more than one chain, surplus uses counted. */
  overlap: number
  overlappedQubits: number[]
  /** Variables whose chains overlap, by label. */
  variables: string[]
  /** Interactions without a coupler between their chains. */
  unmetInteractions: number
  /** The best state reached, by label: chains that still share qubits. */
  partialChains: Record<string, number[]>
}

export interface EmbeddingView {
  id: string
  number: number
  status: EmbeddingStatus
  jobId: string | null
  problem: { id: string; number: number; name: string; variables: number; interactions: number }
  machine: { id: string; name: string; family: string; qubits: number }
  calibration: number
  /** False when a newer calibration of the machine broke it. */
  holdsAtCurrentCalibration: boolean | null
  method: string
  seed: number
  tries: number
  timeLimitSeconds: number
  seconds: number | null
  version: string
  /** Qubit numbers by variable label; empty unless found. */
  chains: Record<string, number[]>
  stats: EmbeddingStats | null
  valid: boolean
  unmet: UnmetView | null
  reason: string | null
  createdBy: Person
  createdAt: string
  runSheets: { id: string; number: number; state: string }[]
}
