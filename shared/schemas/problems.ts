import { z } from 'zod'
import type { ProblemState } from '../library'
import { PROBLEM_FILE_KEYS } from '../problem-files'
import { PROBLEM_FORMAT_IDS } from '../problem-formats'
import type { HistogramBin, Person } from './common'
import { flag, nameSchema, textSchema, versionNumberSchema } from './common'
import type { EmbeddingMethod, EmbeddingStats, EmbeddingStatus, MethodUsed, Objective } from './embeddings'
import { editTagsSchema } from './library'
import type { ProblemSource, VersionStanding } from './problem-versions'
import type { ReductionLinks } from './presolve'
import type { RunSheetState } from './run-sheets'

export const formSchema = z.enum(['qubo', 'ising'])
export const senseSchema = z.enum(['min', 'max'])
export const conventionSchema = z.enum(['plus', 'minus'])
export const problemFormatSchema = z.enum(PROBLEM_FORMAT_IDS)

/** The fields beside the `file` of a problem upload. */
export const uploadProblemSchema = z.object({
  name: nameSchema.optional(),
  form: formSchema.optional(),
  format: problemFormatSchema.optional(),
  convention: conventionSchema.optional(),
  sense: senseSchema.optional(),
  /** Names the file of an earlier dry run that is still kept (`kept` of its answer), in place of `file`. */
  kept: z.uuid().optional(),
  /** Read and report without saving. */
  dryRun: flag.default(false),
  /** Save even though some lines could not be read; they are listed with the problem. */
  skipRejected: flag.default(false),
})
export type UploadProblem = z.infer<typeof uploadProblemSchema>

export const editProblemSchema = z.object({
  name: nameSchema.optional(),
  note: textSchema(2000).optional(),
  tags: editTagsSchema.optional(),
})

/** `?version=` of everything that is read of a problem; the current one where none is given. */
const version = versionNumberSchema.optional()
export const versionQuerySchema = z.object({ version })

export const coefficientsQuerySchema = z.object({
  version,
  form: formSchema.optional(),
  format: z.enum(PROBLEM_FILE_KEYS).default('csv'),
  /** Pack the file with gzip. */
  gzip: flag.default(false),
})

export const energyRequestSchema = z.object({
  form: formSchema,
  states: z.array(z.array(z.number())).max(10_000, 'at most 10,000 states at a time'),
})

export const termsQuerySchema = z.object({
  version,
  part: z.enum(['linear', 'interactions']),
  start: z.coerce.number().int().min(0).default(0),
  limit: z.coerce.number().int().min(1).max(500).default(100),
})

export interface RejectedLine {
  line: number
  text: string
  reason: string
}

/** What the reader understood of a file. Coefficients are in the sense and convention of the file. */
export interface ReadingView {
  format: z.infer<typeof problemFormatSchema>
  formatTitle: string
  /** Left out, as the two after it, in readings of before they were kept. */
  formatSource?: 'given' | 'detected'
  /** What the beginning of the file looks like, the likeliest first, 0 … 1. */
  likenesses?: { format: z.infer<typeof problemFormatSchema>; score: number }[]
  /** What the file was packed in. */
  container?: 'gzip' | null
  form: z.infer<typeof formSchema>
  formSource: 'given' | 'file' | 'default'
  convention: z.infer<typeof conventionSchema>
  sense: z.infer<typeof senseSchema>
  triangle: string
  entriesRead: number
  duplicatesSummed: number
  zerosDropped: number
  firstRows: [string, string, number][]
  /** The first 100 of them. */
  rejected: RejectedLine[]
  rejectedCount: number
  /** Where all of them are kept, when there are more; see `GET /api/problems/:id/rejected`. */
  rejectedBlobId?: string
}

export interface StructureView {
  variables: number
  interactions: number
  /** Share of all pairs that interact, 0 … 1. */
  density: number
  degree: { min: number; mean: number; max: number }
  degreeHistogram: { value: number; count: number }[]
  linearHistogram: HistogramBin[]
  interactionHistogram: HistogramBin[]
  /** Left out in reports of before it was kept. */
  coefficientSizes?: { least: number; greatest: number } | null
  /** max |coefficient| / min nonzero |coefficient|, or null without coefficients. */
  dynamicRange: number | null
  components: number
  isolated: number
  treewidthUpperBound: number | null
}

/** Variables of which exactly, at most or at least `k` are 1 in an answer that is allowed. */
export interface ConstraintGroup {
  name: string
  kind: 'exactly' | 'at most' | 'at least'
  k: number
  /** Indices of the variables. */
  members: number[]
  source: 'recognised' | 'entered'
}

/** Answer to an upload; with dryRun nothing was saved and `id` is null. */
export interface UploadedProblem {
  id: string | null
  number: number | null
  /** Of a large file that was only looked at: what to send in place of it, for ten minutes. */
  kept: string | null
  name: string
  form: z.infer<typeof formSchema>
  variables: number
  interactions: number
  offset: number
  sense: z.infer<typeof senseSchema>
  warnings: string[]
  reading: ReadingView
  structure: StructureView
}

export interface ProblemItem {
  id: string
  number: number
  name: string
  form: z.infer<typeof formSchema>
  sense: z.infer<typeof senseSchema>
  variables: number
  interactions: number
  density: number
  tags: string[]
  state: ProblemState
  currentVersion: number
  /** One of the current version before others, then one that is chosen, one that was found, the newest. */
  embedding: {
    id: string
    number: number
    status: EmbeddingStatus
    machine: string
    longestChain: number | null
    /** The version of the problem that it was made for. */
    ofVersion: number
  } | null
  /** The newest run sheet for the current version, else the newest of all. */
  runSheet: { id: string; number: number; state: RunSheetState; ofVersion: number } | null
  /** Best decoded energy of any samples of this version so far, in the problem's own sense. */
  best: number | null
  changedAt: string
}

export interface EmbeddingOfProblem {
  id: string
  number: number
  status: EmbeddingStatus
  machineId: string
  machine: string
  calibration: number
  method: EmbeddingMethod
  methodUsed: MethodUsed | null
  seed: number
  objective: Objective
  /** The one to go on with among the problem's embeddings on that machine. */
  chosen: boolean
  stats: EmbeddingStats | null
  longestChain: number | null
  qubitsUsed: number | null
  seconds: number | null
  createdAt: string
  /** The version of the problem that it was made for. */
  ofVersion: VersionStanding
  runSheets: { id: string; number: number; state: RunSheetState }[]
}

export interface ProblemView extends Omit<ProblemItem, 'embedding' | 'runSheet'>, ReductionLinks {
  note: string
  /** The version shown. */
  version: number
  versionBy: Person
  versionAt: string
  /** What the version is for, in the words of who made it. */
  remark: string
  /** When and by whom the version after it was made. */
  superseded: { at: string; by: Person } | null
  offset: number
  /** SHA-256 over form, labels, coefficients and offset, hex. */
  fingerprint: string
  source: Omit<ProblemSource, 'change'>
  reading: ReadingView
  structure: StructureView
  embeddings: EmbeddingOfProblem[]
  createdBy: Person
  createdAt: string
}

/** One row of the double ledger of both forms; values in the problem's own sense. */
export interface LinearTerm {
  label: string
  qubo: number
  ising: number
}
export interface InteractionTerm {
  /** Places of a and b among the variables, from 1. */
  places: [number, number]
  a: string
  b: string
  qubo: number
  ising: number
}
export interface TermsView {
  part: 'linear' | 'interactions'
  start: number
  total: number
  linear: LinearTerm[]
  interactions: InteractionTerm[]
  offset: { qubo: number; ising: number }
}
