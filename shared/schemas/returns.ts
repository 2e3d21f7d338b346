import { z } from 'zod'
import type { HistogramBin, Person, Proportion } from './common'
import type { ConstraintGroup } from './problems'
import type { VersionStanding } from './problem-versions'
import type { ReferenceOfSamples } from './reference'

export const decodeSchema = z.enum(['majority', 'discard', 'descent'])
export type Decoding = z.infer<typeof decodeSchema>
const flag = z.enum(['true', 'false']).default('false')
export const returnQuerySchema = z.object({
  decode: decodeSchema.default('majority'),
  /** List only the assignments that keep every confirmed constraint group. */
  feasible: flag,
})
export const samplesQuerySchema = z.object({ format: z.enum(['csv', 'packed']).default('csv') })
export const solutionsQuerySchema = z.object({
  decode: decodeSchema.default('majority'),
  format: z.enum(['json', 'csv', 'npy']).default('json'),
  limit: z.coerce.number().int().min(1).max(100_000).default(100),
  /** CSV: assignments of the problem that this one was reduced from, in place of its own. */
  lifted: flag,
  /** Only the assignments that keep every confirmed constraint group. */
  feasible: flag,
})
/** Numbers apart by commas, blanks or line ends, as a JSON list or not. */
const qubitOrderSchema = z
  .string()
  .transform((text) =>
    text
      .replace(/^\s*\[|\]\s*$/g, ' ')
      .split(/[\s,;]+/)
      .filter((word) => word !== ''),
  )
  .pipe(
    z
      .array(
        z
          .string()
          .regex(/^\d{1,9}$/, 'each is a qubit number')
          .transform(Number),
      )
      .min(1)
      .max(200_000),
  )

export const uploadReturnSchema = z.object({
  /** Found from the file where it is left out. */
  format: z.enum(['csv', 'npy', 'npz', 'json']).optional(),
  /** Qubit numbers column by column, for files that do not name them; else they stand as in the bundle, ascending. */
  qubitOrder: qubitOrderSchema.optional(),
  /** Whether gauges were undone already, or the rows stand as the machine read them. */
  gauges: z.enum(['undone', 'as read']).default('undone'),
  /** Of all reads together; what the file says itself is taken where this is left out. */
  machineTimeSeconds: z.coerce.number().positive().max(1e6).optional(),
})
export type UploadReturn = z.infer<typeof uploadReturnSchema>

export interface ChainBreaks extends Proportion {
  variable: number
  label: string
  length: number
  strength: number
  cutBound: number
  cutBoundExact: boolean
  /** The split of the chain that the bound comes from: min(up, down) / cut. Null for a single qubit. */
  cutSplit: { up: number; down: number; cut: number } | null
}

/** A coupler inside a chain whose two qubits disagreed. */
export interface CouplerBreaks extends Proportion {
  a: number
  b: number
  label: string
}

/** A qubit that disagreed with the majority of its chain. */
export interface QubitBreaks extends Proportion {
  qubit: number
  label: string
}

export interface DecodingRow {
  decoding: Decoding
  title: string
  readsKept: number
  /** Chain reads settled by a seeded coin. */
  ties: number
  best: number | null
  bestCount: number
  median: number | null
  mean: number | null
  /** Of the energies of all reads kept; the mean is this over `readsKept`. */
  total: number | null
}

export interface EnergySeries {
  title: string
  returnId: string
  reads: number
  counts: number[]
  /** Best first: energies that occur, each with the reads that are as good or better; thinned where they are very many. */
  cumulative: { energy: number; reads: number }[]
}

/** An answer to a reduced problem as an answer to the problem that it came from first. */
export interface LiftedSolution {
  /** In that problem's own sense, from its own coefficients; null when it has been deleted. */
  energy: number | null
  /** Whether it equals the energy of the answer, as it must; null when there is nothing to compare with. */
  isEqual: boolean | null
  assignment: Record<string, number>
}

/** The problem that answers are lifted to. */
export interface LiftedTo {
  id: string
  number: number
  name: string
  version: number
  variables: number
  /** False once it was deleted. */
  isThere: boolean
}

export interface SolutionRow {
  energy: number
  count: number
  /** Variables that differ from the best solution. */
  distance: number
  /** Confirmed constraint groups that it breaks; null while there are none. */
  violated: number | null
  /** 0/1 for a QUBO, −1/+1 for an Ising problem, by label. */
  assignment: Record<string, number>
  /** Null where the problem was not reduced from another one. */
  lifted: LiftedSolution | null
}

/** A solution with the parts that its energy is the sum of, in the Ising form and the problem's own sense. */
export interface SolutionView extends SolutionRow {
  parts: { linear: number; interactions: number; offset: number }
}

/** Reads, decoded, that break a constraint group of the problem. */
export interface GroupViolations extends Proportion {
  name: string
  kind: ConstraintGroup['kind']
  k: number
  members: number
}

export interface ReturnView {
  id: string
  number: number
  source: 'rehearsal' | 'upload'
  status: 'running' | 'ready' | 'failed' | 'cancelled'
  jobId: string | null
  reason: string | null
  runSheet: { id: string; number: number; name: string; state: string }
  problem: { id: string; number: number; name: string; variables: number; form: 'qubo' | 'ising'; sense: 'min' | 'max' }
  /** The version of the problem that was programmed. */
  ofVersion: VersionStanding
  embedding: { id: string; number: number }
  machine: { id: string; name: string; calibration: number }
  /** How the samples came to be: sweeps, temperature and seed of a rehearsal, or the uploaded file. */
  made: Record<string, string | number | boolean | null>
  seconds: number | null
  version: string
  reads: number
  decode: Decoding
  /** Whether only assignments that keep every confirmed group are listed. */
  feasibleOnly: boolean
  breaks: {
    chains: ChainBreaks[]
    couplers: CouplerBreaks[]
    qubits: QubitBreaks[]
    readsWithBreak: Proportion
    chainReads: Proportion
    /** perRead[k] reads had exactly k broken chains. */
    perRead: number[]
  } | null
  decodings: DecodingRow[]
  energies: {
    best: number
    bestCount: number
    mean: number
    median: number
    start: number
    width: number
    series: EnergySeries[]
  } | null
  best: SolutionView | null
  /** Where the problem was reduced from another one: that one, which `lifted` of the solutions answers. */
  liftedTo: LiftedTo | null
  solutions: SolutionView[]
  /** Distinct assignments there are, of those that may be listed. */
  distinct: number
  physicalEnergies: HistogramBin[]
  /** Null where nobody has looked for the optimum of that version of the problem. */
  reference: ReferenceOfSamples | null
  /** Of the reads kept by the decoding shown; null while the problem has no confirmed groups. */
  violations: { any: Proportion; groups: GroupViolations[] } | null
  createdBy: Person
  createdAt: string
}
