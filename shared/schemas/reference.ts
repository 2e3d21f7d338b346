import { z } from 'zod'
import type { Person, Proportion } from './common'
import { pageQuerySchema, seedSchema } from './common'

/** Ways to an optimum; all but annealing prove it when they come to their end. */
export const optimumMethodSchema = z.enum(['enumeration', 'tree decomposition', 'integer programme', 'annealing'])
export type OptimumMethodName = z.infer<typeof optimumMethodSchema>

/** Asks for the reference optimum of a problem at its current version. */
export const startReferenceSchema = z.strictObject({
  /** Of all components together. */
  timeLimitSeconds: z.number().min(0.1).max(3600).default(60),
  seed: seedSchema.default(1),
  /** For all components; without it each is given the one that takes least. */
  method: optimumMethodSchema.optional(),
})
export type StartReference = z.infer<typeof startReferenceSchema>

export const referenceQuerySchema = z.object({
  version: z.coerce
    .number()
    .int()
    .min(1)
    .max(2 ** 31 - 1)
    .optional(),
  format: z.enum(['json', 'csv']).default('json'),
})

export const referencesQuerySchema = referenceQuerySchema.pick({ version: true }).extend(pageQuerySchema.shape)
export type ReferencesQuery = z.infer<typeof referencesQuerySchema>

/** The `detail` of a job that looks for a reference optimum; energies in the problem's own sense. */
export interface ReferenceProgress {
  /** Null until every component has some state. */
  best: number | null
  /** Proved: nothing better than it exists. */
  bound: number
  /** In words, what is being done. */
  doing: string
  components: number
  solved: number
  limitSeconds: number
}

/** One component of two or more variables, or several small ones that went the same way. */
export interface ReferencePart {
  components: number
  /** Of the largest of them. */
  variables: number
  interactions: number
  /** What was tried, and what gave the state. */
  method: OptimumMethodName
  by: OptimumMethodName
  /** Width of the tree decomposition, where one was used. */
  width: number | null
  proved: boolean
  /** Energy less bound, of all of them; 0 where proved exactly. */
  gap: number
  seconds: number
}

/** How a look for the optimum stands or ended. */
export type ReferenceStatus = 'running' | 'proved' | 'best found' | 'cancelled' | 'failed'

/** One look for the optimum of a problem. Energies are in the problem's own sense, offset included. */
export interface ReferenceItem {
  id: string
  problemVersion: number
  status: ReferenceStatus
  jobId: string | null
  energy: number | null
  /** Nothing better than it exists: below the energy where the problem is minimised, above it where maximised. */
  bound: number | null
  /** Size of the difference between energy and bound; null without an energy. */
  gap: number | null
  /** How far "proved" may be off through rounding: 0 where coefficients allow exact sums. */
  tolerance: number
  /** In words: the methods that were used, and how often. */
  method: string | null
  parts: ReferencePart[]
  /** Variables without interactions, settled by their sign. */
  isolated: number
  /** How many states have this energy, where all were visited. */
  optima: number | null
  /** The first labels of variables that are up, and how many there are. */
  up: { labels: string[]; total: number } | null
  settings: { seed: number; timeLimitSeconds: number; method: OptimumMethodName | null }
  seconds: number | null
  /** Of the software that found it. */
  version: string
  reason: string | null
  createdBy: Person
  createdAt: string
}

/** The newest look that has a value, with its state. */
export interface ReferenceView extends ReferenceItem {
  form: 'qubo' | 'ising'
  /** 0/1 for a QUBO, −1/+1 for an Ising problem: by label, and in the order of the variables. */
  state: Record<string, number>
  values: number[]
}

/** The reads of one decoding held against the reference optimum of the version of the problem that was programmed. */
export interface ReferenceOfSamples {
  /** In the problem's own sense. */
  energy: number
  proved: boolean
  method: string
  /** How much worse the best read is: below zero where it beats a value that is not proved. Null without reads. */
  gap: number | null
  /** Reads that reach the value or better it, of those kept. */
  success: Proportion
}
