import { z } from 'zod'
import type { ProblemState } from '../library'
import { DIRECTIONS, LIBRARY_FIELDS, plainTag, PROBLEM_STATES, TAG_LIMITS } from '../library'
import type { Page } from './common'
import { lineSchema, textSchema } from './common'
import type { ProblemItem } from './problems'

const tagSchema = lineSchema(TAG_LIMITS.length).transform(plainTag).pipe(z.string().min(1, 'a tag is empty'))

const tagsSchema = z.array(tagSchema).max(TAG_LIMITS.count, `at most ${TAG_LIMITS.count} tags`)

/** Changes of a problem's tags, made one after the other with those of others; what is added twice stands once. */
export const editTagsSchema = z.object({ add: tagsSchema.default([]), remove: tagsSchema.default([]) })
export type EditTags = z.infer<typeof editTagsSchema>

export const libraryQuerySchema = z.object({
  /** Problems in whose number, name, form, tags, machine, embedding or run sheet every word occurs. */
  q: textSchema(200).default(''),
  /** May stand several times: problems that bear all of them. */
  tag: z.preprocess((given) => (given === undefined || given === '' ? [] : [given].flat()), tagsSchema),
  form: z.enum(['qubo', 'ising']).optional(),
  state: z.enum(PROBLEM_STATES).optional(),
  sort: z.enum(LIBRARY_FIELDS).default('changedAt'),
  direction: z.enum(DIRECTIONS).optional(),
  limit: z.coerce.number().int().min(1).max(200).default(50),
  cursor: z.string().max(200).optional(),
})
export type LibraryQuery = z.infer<typeof libraryQuerySchema>

export interface LibraryPage extends Page<ProblemItem> {
  previousCursor: string | null
  /** Problems that match, on all pages. */
  total: number
  /** How many of them come before the first one here. */
  start: number
}

/** The library as a whole, whatever is shown of it. */
export interface LibrarySummary {
  total: number
  /** How many problems have come to each state; states without problems are left out. */
  states: Partial<Record<ProblemState, number>>
  /** Tags in use, in alphabetical order, with how many problems bear them. */
  tags: { tag: string; count: number }[]
  /** Id of the problem that changed last. */
  newest: string | null
}
