import { z } from 'zod'
import type { Rule } from '../engine/problem/presolve/record'
import { nameSchema, versionNumberSchema } from './common'
import type { ProblemView } from './problems'
import { energyRequestSchema } from './problems'

/** The version of the problem that is meant; the current one where none is given. */
export const presolveSchema = z.object({ version: versionNumberSchema.optional() })

/** Body that saves what is left as a problem. */
export const saveReducedSchema = presolveSchema.extend({ name: nameSchema.optional() })

/** States of a reduced problem, to be lifted to the one it came from. */
export const liftRequestSchema = energyRequestSchema

/** How large a problem is, and how it is related to another. */
export interface ProblemSize {
  variables: number
  interactions: number
}

/** A problem as it is referred to. */
export interface ProblemReference {
  id: string
  number: number
  name: string
  version: number
}

/** What a pre-solve came to. Energies are in the problem's own sense. */
export interface PresolveSummary {
  before: ProblemSize
  after: ProblemSize
  byRule: { rule: Rule; count: number }[]
  /** Runs of roof duality. */
  rounds: number
  /** No energy is better than this; proved. Null when it was stopped before. */
  bound: number | null
  /** The proved optimum, when nothing is left. */
  optimum: number | null
  /** Whether every coefficient of what is left is exact; else each is the exact value rounded once. */
  isExact: boolean
}

/** A variable taken out, in the order in which it was. */
export interface RemovedVariable {
  /** From 1. */
  order: number
  label: string
  rule: Rule
  /** In the alphabet of the problem's form; null while it depends on variables that are left. */
  value: number | null
  /** Labels of the variables that it depends on. */
  partners: string[]
  /** Its values (0 or 1) for (0), (1), or (0,0), (1,0), (0,1), (1,1) of its partners' values. */
  table: (0 | 1)[]
  /** See the engine's record: of the QUBO form, to be minimised. */
  quantities: number[]
}

export interface PresolveView extends PresolveSummary {
  problem: ProblemReference & { form: ProblemView['form']; sense: ProblemView['sense'] }
  /** The first of them; all are in the file. */
  removed: RemovedVariable[]
  removedCount: number
  /** Components of what is left by size, largest first. */
  components: { variables: number; count: number }[]
  isStopped: boolean
  seconds: number
  version: string
}

/** What can be said of a pre-solve without starting one. */
export type PresolveState =
  | { state: 'done'; summary: PresolveSummary }
  | { state: 'running'; phase: 'neighbours' | 'roof duality' | 'components'; left: number; round: number }
  | { state: 'not run' }
  | { state: 'too large' }

/** States lifted as far back as the record goes. */
export interface LiftedStates {
  /** The problem whose variables the states are of. */
  problem: ProblemReference
  form: ProblemView['form']
  labels: string[]
  states: number[][]
  /** In that problem's own sense, from its own coefficients; null when it has been deleted. */
  energies: number[] | null
  /** Problems passed on the way, nearest first; the last is the one above. */
  through: ProblemReference[]
}

/** Where a problem was reduced from, and what it was reduced to. */
export interface ReductionLinks {
  reducedFrom: (ProblemReference & { summary: PresolveSummary; isThere: boolean; seconds: number; by: string }) | null
  reduced: (Omit<ProblemReference, 'version'> & ProblemSize & { fromVersion: number })[]
}
