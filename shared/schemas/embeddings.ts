import { z } from 'zod'
import type { AdviceKind } from '../engine/embedding/advice'
import type { Person } from './common'
import { calibrationNumberSchema, idSchema, seedSchema } from './common'
import type { VersionStanding } from './problem-versions'
import type { BrokenView } from './repairs'

/** Ways to make an embedding that a person may ask for; `auto` races those that fit the problem and the machine. */
export const embeddingMethodSchema = z.enum(['auto', 'search', 'lines', 'template'])
/** What embeddings are compared by first; the other decides between equals. */
export const objectiveSchema = z.enum(['longest chain', 'total qubits'])
/** `repair` mends what does not hold and changes as little as it can; `shorten` makes chains shorter. */
export const startWorkSchema = z.enum(['repair', 'shorten'])

const MAX_FROZEN = 100_000

/** The search ends as soon as an embedding is at least this good in all that is given. */
export const targetSchema = z.strictObject({
  longestChain: z.number().int().min(1).optional(),
  totalQubits: z.number().int().min(1).optional(),
})

/**
 * An embedding on the same machine to begin from. It may be of another calibration, or of another problem with some of
 * the same variables: chains are carried over by variable label and qubit number.
 */
export const startSchema = z.strictObject({
  embeddingId: idSchema,
  work: startWorkSchema,
  /** Labels of the variables whose chains must stay as they are. */
  frozen: z.array(z.string()).max(MAX_FROZEN).default([]),
})

/** Asks for an embedding; everything but the problem and the machine has a default. */
export const createEmbeddingSchema = z
  .object({
    problemId: idSchema,
    machineId: idSchema,
    /** The one in force where none is given. */
    calibration: calibrationNumberSchema.optional(),
    /** `auto` where neither a method nor a start is given. */
    method: embeddingMethodSchema.optional(),
    seed: seedSchema.default(1),
    tries: z.number().int().min(1).max(1000).default(8),
    /** Of all tries together. */
    timeLimitSeconds: z.number().min(0.1).max(3600).default(30),
    objective: objectiveSchema.default('longest chain'),
    target: targetSchema.default({}),
    start: startSchema.optional(),
  })
  .refine(({ method, start }) => !method || !start, {
    path: ['method'],
    message: 'leave the method out where an embedding to begin from is given: its work says what is done',
  })
export type CreateEmbedding = z.infer<typeof createEmbeddingSchema>

/** Marks an embedding as the one to go on with, or takes the mark away. */
export const editEmbeddingSchema = z.object({ chosen: z.boolean() })

export const importEmbeddingSchema = z.object({
  problemId: idSchema,
  machineId: idSchema,
  calibration: calibrationNumberSchema.optional(),
  /** The embedding whose chains were edited by hand: of the same problem on the same machine. */
  editedFrom: idSchema.optional(),
  chains: z.record(z.string(), z.array(z.number().int().min(0)).max(100_000)),
})
export type ImportEmbedding = z.infer<typeof importEmbeddingSchema>

export type EmbeddingStatus = 'running' | 'found' | 'none found' | 'cancelled' | 'failed'

export type Objective = z.infer<typeof objectiveSchema>
export type StartWork = z.infer<typeof startWorkSchema>
/** What was asked for. */
export type EmbeddingMethod = z.infer<typeof embeddingMethodSchema> | StartWork | 'imported' | 'edited'
/** What made the embedding that is kept. */
export type MethodUsed = Exclude<EmbeddingMethod, 'auto'>

/** Null where nothing is asked. */
export interface TargetView {
  longestChain: number | null
  totalQubits: number | null
}

export interface EmbeddingStats {
  qubitsUsed: number
  chainLength: { max: number; mean: number; min: number }
  /** Couplers inside chains and between interacting chains. */
  chainCouplers: number
  interactionCouplers: number
  couplersUsed: number
  /** Share of the machine's working qubits that are left free, 0 … 1. */
  unusedShare: number
}

/** The embedding that another was made from. */
export interface StartView {
  id: string
  number: number
  /** Another problem than the embedding's own where the problem was changed in between. */
  problem: { id: string; number: number }
  work: StartWork | 'edited'
  /** Labels of the variables whose chains had to stay. */
  frozen: string[]
  /** Chains that differ from the start's; null unless found. */
  changed: number | null
  /** Their labels, the first 200; empty unless found. */
  changedChains: string[]
  /** Longest chain and qubits of the start. */
  before: { longestChain: number; qubitsUsed: number } | null
  /** Whether it was made to take the start's place: open run sheets moved to it. */
  replaces: boolean
}

/** Something to do about what stood in the way, the most promising first. */
export interface AdviceView {
  kind: AdviceKind
  message: string
  /** Labels of the variables concerned. */
  variables: string[]
  /** Interactions concerned, by the labels of their variables. */
  interactions: [string, string][]
}

/** Why there is no embedding: what stood in the way when the search ended. */
export interface UnmetView {
  message: string
  /** Whether a bound proves that there is none: no search will find one. */
  proved: boolean
  /** Qubits wanted by more than one chain, surplus uses counted. */
  overlap: number
  overlappedQubits: number[]
  /** Variables whose chains overlap, by label. */
  variables: string[]
  /** Interactions without a coupler between their chains. */
  unmetInteractions: number
  /** An estimate from the closest state; null for searches of before there was one. */
  neededQubits: number | null
  advice: AdviceView[]
  /** The best state reached, by label: chains that still share qubits. */
  partialChains: Record<string, number[]>
}

export interface EmbeddingView {
  id: string
  number: number
  status: EmbeddingStatus
  jobId: string | null
  problem: { id: string; number: number; name: string; variables: number; interactions: number }
  /** The version of the problem that it was made for. */
  ofVersion: VersionStanding
  machine: { id: string; name: string; family: string; qubits: number }
  calibration: number
  /** Of the machine, now. */
  calibrationInForce: number
  /** False when a newer calibration of the machine broke it. */
  holdsAtCurrentCalibration: boolean | null
  /** Why not, and what becomes of it. */
  broken: BrokenView | null
  method: EmbeddingMethod
  /** Method and number of the try that gave the embedding; null unless found, and no try where imported. */
  methodUsed: MethodUsed | null
  tryNumber: number | null
  seed: number
  /** As asked for; with `auto`, tries of each method that fits. */
  tries: number
  /** Tries of all methods together; null before the search has told. */
  triesPlanned: number | null
  timeLimitSeconds: number
  seconds: number | null
  /** Seconds to the first valid embedding of any try. */
  firstSeconds: number | null
  objective: Objective
  target: TargetView
  start: StartView | null
  /** The one to go on with among the embeddings of the problem on the machine. */
  chosen: boolean
  version: string
  /** Qubit numbers by variable label; empty unless found. */
  chains: Record<string, number[]>
  /** lengthHistogram[l] is the number of chains of l qubits. */
  stats: (EmbeddingStats & { lengthHistogram: number[] }) | null
  valid: boolean
  unmet: UnmetView | null
  reason: string | null
  createdBy: Person
  createdAt: string
  runSheets: { id: string; number: number; state: string }[]
}

/** A moment of a search: least overlap of the tries at work, and the best valid embedding of all tries so far. */
export interface TracePoint {
  /** Since the search began. */
  seconds: number
  overlap: number
  longestChain: number | null
  qubitsUsed: number | null
}

/** `detail` of a job of kind embedding; empty until the first report. */
export interface EmbeddingProgress {
  /** Of the try that reported last. */
  method: MethodUsed
  tryNumber: number
  phase: string
  overlap: number
  tries: number
  /** Tries at work. */
  running: number
  /** Best valid embedding of all tries so far. */
  longestChain: number | null
  qubitsUsed: number | null
  /** Since the search began. */
  seconds: number
  /** From the beginning on, thinned to at most 120 points. */
  trace: TracePoint[]
}
