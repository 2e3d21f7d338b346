/** What pages and server know of the library alike; the schemas are in schemas/library.ts. */

/** States of a run sheet in the order in which it comes through them. */
export const RUN_SHEET_STATES = ['draft', 'in review', 'approved', 'sent back', 'issued', 'returned', 'closed'] as const

/**
 * How far the current version of a problem has come: the state of its run sheet, else of its embedding; `to carry over`
 * where only an earlier version was embedded.
 */
export const PROBLEM_STATES = [
  'not embedded',
  'searching',
  'none found',
  'to carry over',
  'embedded',
  ...RUN_SHEET_STATES,
] as const
export type ProblemState = (typeof PROBLEM_STATES)[number]

/** What the library can be sorted by. */
export const LIBRARY_FIELDS = [
  'number',
  'name',
  'form',
  'variables',
  'interactions',
  'density',
  'machine',
  'embedding',
  'longest',
  'runSheet',
  'best',
  'changedAt',
] as const
export type LibraryField = (typeof LIBRARY_FIELDS)[number]

export const DIRECTIONS = ['ascending', 'descending'] as const
export type Direction = (typeof DIRECTIONS)[number]

/** Where nothing is asked: what changed last comes first, anything else begins with the least. */
export const firstDirection = (field: LibraryField): Direction => (field === 'changedAt' ? 'descending' : 'ascending')

/** Tags of one problem at most, and characters of a tag at most. */
export const TAG_LIMITS = { count: 20, length: 40 } as const

/** White space within a tag counts as one space. */
export const plainTag = (typed: string): string => typed.trim().replace(/\s+/g, ' ')

/** Tags that differ only in case are the same tag. */
export const tagKey = (tag: string): string => tag.toLowerCase()
