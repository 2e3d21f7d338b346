import { z } from 'zod'
import { textSchema } from './common'
import type { Person } from './common'
import type { VersionStanding } from './problem-versions'
import type { LiftedTo, ReturnView, SolutionRow } from './returns'
import { decodeSchema } from './returns'

const MOST_ASSIGNMENTS = 20

const assignments = z.coerce.number().int().min(1).max(MOST_ASSIGNMENTS)

export const answerQuerySchema = z.object({
  decode: decodeSchema.default('majority'),
  assignments: assignments.default(3),
  format: z.enum(['json', 'csv']).default('json'),
})
export const sharedAnswerQuerySchema = answerQuerySchema.pick({ format: true })

/** What is handed out behind a link: fixed when the link is made. */
export const shareAnswerSchema = z.object({
  decode: decodeSchema.default('majority'),
  assignments: assignments.default(3),
  remark: textSchema(2000).default(''),
})
export type ShareAnswer = z.infer<typeof shareAnswerSchema>

/** A constraint group and whether an assignment keeps it. */
export interface GroupCheck {
  name: string
  kind: 'exactly' | 'at most' | 'at least'
  k: number
  members: number
  /** Members at 1 in each assignment, in their order. */
  atOne: number[]
  kept: boolean[]
}

export interface AnswerAssignment extends SolutionRow {
  /** Names of the groups that it breaks. */
  broken: string[]
}

/** An answer as the person who asked is given it. */
export interface AnswerView {
  workspace: string
  problem: ReturnView['problem'] & { interactions: number }
  ofVersion: VersionStanding
  /** The problem that this one was reduced from, where assignments are its own. */
  liftedTo: LiftedTo | null
  decode: ReturnView['decode']
  reads: number
  readsKept: number
  assignments: AnswerAssignment[]
  groups: GroupCheck[]
  reference: ReturnView['reference']
  source: ReturnView['source']
  /** Chain reads and reads with a break, which say how well the chains held. */
  readsWithBreak: NonNullable<ReturnView['breaks']>['readsWithBreak']
  made: ReturnView['made']
  runSheet: Pick<ReturnView['runSheet'], 'number' | 'name'> & { fingerprint: string | null; reviewedBy: string | null }
  machine: ReturnView['machine']
  embedding: { number: number }
  number: number
  version: string
  createdAt: string
}

/** A link that stands; the secret in it was shown once. */
export interface AnswerLink {
  by: Person
  at: string
  decode: ReturnView['decode']
  assignments: number
  remark: string
}

export interface AnswerPage {
  answer: AnswerView
  links: AnswerLink[]
}

export interface SharedAnswer {
  answer: AnswerView
  by: string
  at: string
  remark: string
}
