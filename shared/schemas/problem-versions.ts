import { z } from 'zod'
import type { GraphStanding, TermChange } from '../engine/problem/difference/difference'
import type { Person } from './common'
import { nameSchema, textSchema, versionNumberSchema } from './common'
import type { formSchema, senseSchema, UploadedProblem } from './problems'
import { uploadProblemSchema } from './problems'

/** The fields beside the `file` of a new version; the name stays the problem's. */
export const uploadVersionSchema = uploadProblemSchema
  .omit({ name: true })
  .extend({ remark: textSchema(500).default('') })
export type UploadVersion = z.infer<typeof uploadVersionSchema>

export const compareVersionsSchema = z.object({ from: versionNumberSchema, to: versionNumberSchema })

const MOST_RENAMES = 1000

export const renameVariablesSchema = z.object({
  /** The version whose labels they are; refused when another one came in between. */
  version: versionNumberSchema.optional(),
  renames: z
    .array(z.strictObject({ from: z.string().max(200), to: z.string().max(1000) }))
    .min(1, 'name at least one variable')
    .max(MOST_RENAMES, `at most ${MOST_RENAMES} variables at a time`),
})
export type RenameVariables = z.infer<typeof renameVariablesSchema>

export const duplicateProblemSchema = z.object({
  version: versionNumberSchema.optional(),
  name: nameSchema.optional(),
})

/** How much changed from one version to another. */
export interface VersionChange {
  variablesAdded: number
  variablesRemoved: number
  variablesRenamed: number
  /** Linear coefficients of variables in both. */
  linearChanged: number
  interactionsAdded: number
  interactionsRemoved: number
  interactionsChanged: number
  offsetChanged: boolean
  formChanged: boolean
  senseChanged: boolean
  graph: GraphStanding
}

/** What changed, with the first of each; values in the later version's form, each in its own sense. */
export interface DifferenceView extends VersionChange {
  form: z.infer<typeof formSchema>
  /** The first labels of each. */
  added: string[]
  removed: string[]
  renamed: [string, string][]
  changes: TermChange[]
  offset: { before: number; after: number }
}

/** Two versions side by side. */
export interface ComparedVersions extends DifferenceView {
  from: number
  to: number
}

/** The version that something was made for, and how it stands to the current one. */
export interface VersionStanding {
  version: number
  current: number
  /** Null where it is the current one. An embedding still holds for the same interactions, and for fewer of them. */
  graph: GraphStanding | null
}

/** Where a version comes from. */
export interface ProblemSource {
  fileName: string
  bytes: number
  sha256: string
  /** Its labels were edited: the version whose coefficients these are. */
  relabelled?: number
  /** It was copied from a version of another problem. */
  copyOf?: { id: string; number: number; version: number }
  /** Against the version before; none for the first. */
  change?: VersionChange
}

export interface VersionItem {
  version: number
  at: string
  by: Person
  remark: string
  source: Omit<ProblemSource, 'change'>
  fingerprint: string
  form: z.infer<typeof formSchema>
  sense: z.infer<typeof senseSchema>
  variables: number
  interactions: number
  change: VersionChange | null
}

/** Answer to an upload of a new version; with dryRun nothing was saved and `version` is null. */
export interface UploadedVersion extends UploadedProblem {
  version: number | null
  /** The version it was compared with. */
  before: number
  difference: DifferenceView
  /** Nothing changed: saving it would be refused. */
  isSame: boolean
}
