import type { LocationQuery, LocationQueryRaw } from 'vue-router'
import type { Direction, LibraryField, ProblemState } from '#shared/library'
import { DIRECTIONS, firstDirection, LIBRARY_FIELDS, PROBLEM_STATES, RUN_SHEET_STATES } from '#shared/library'
import type { LibrarySummary } from '#shared/schemas/library'
import type { RunSheetItem } from '#shared/schemas/run-sheets'
import { formatCount, formatNumber } from '../format'
import type { Choice, Fact } from '../ui/parts'

/** What the library shows: what is sought, how it is sorted, and which page of it. */
export interface LibraryView {
  q: string
  tag: string[]
  form: 'qubo' | 'ising' | null
  state: ProblemState | null
  sort: LibraryField
  direction: Direction
  cursor: string | null
}

const ROWS = 100

const FORMS = { qubo: 'QUBO', ising: 'Ising' } as const

type Given = LocationQuery[string] | undefined
const textsOf = (given: Given): string[] => [given].flat().filter((text): text is string => Boolean(text))
const oneOf = <T extends string>(given: Given, allowed: readonly T[]): T | null =>
  allowed.find((one) => one === textsOf(given)[0]) ?? null

/** The view that an address stands for; parts of it that mean nothing are as good as left out. */
export function libraryView(query: LocationQuery): LibraryView {
  const sort = oneOf(query.sort, LIBRARY_FIELDS) ?? 'changedAt'
  return {
    q: textsOf(query.q)[0]?.trim() ?? '',
    tag: textsOf(query.tag),
    form: oneOf(query.form, ['qubo', 'ising']),
    state: oneOf(query.state, PROBLEM_STATES),
    sort,
    direction: oneOf(query.direction, DIRECTIONS) ?? firstDirection(sort),
    cursor: textsOf(query.cursor)[0] ?? null,
  }
}

/** The address's query for a view, without what goes without saying. */
export function libraryQuery(view: LibraryView): LocationQueryRaw {
  const query: LocationQueryRaw = {}
  if (view.q) query.q = view.q
  if (view.tag.length > 0) query.tag = view.tag
  if (view.form) query.form = view.form
  if (view.state) query.state = view.state
  if (view.sort !== 'changedAt') query.sort = view.sort
  if (view.direction !== firstDirection(view.sort)) query.direction = view.direction
  if (view.cursor) query.cursor = view.cursor
  return query
}

/** Where the problems of a view are loaded from. */
export function libraryAddress(view: LibraryView): string {
  const given = Object.entries(libraryQuery(view)).flatMap(([key, value]) =>
    [value].flat().map((one): [string, string] => [key, String(one)]),
  )
  return `/api/problems?${new URLSearchParams([...given, ['limit', String(ROWS)]])}`
}

export const isNarrowed = ({ q, tag, form, state }: LibraryView): boolean =>
  q !== '' || tag.length > 0 || form !== null || state !== null

/** `that hold “berth”, are tagged ferry, are Ising and are embedded`, for a view that found nothing. */
export function soughtWords({ q, tag, form, state }: LibraryView): string {
  const parts = [
    q && `hold “${q}”`,
    tag.length > 0 && `are tagged ${tag.join(', ')}`,
    form && `are in ${FORMS[form]} form`,
    state && `are “${state}”`,
  ].filter((part): part is string => Boolean(part))
  const last = parts.at(-1)
  return parts.length > 1 ? `${parts.slice(0, -1).join(', ')} and ${last}` : `${last}`
}

/** `Rows 101 to 200 of 10 000`. */
export function rowsWords(start: number, shown: number, total: number): string {
  if (shown === total) return formatCount(total, 'problem')
  return `${formatNumber(start + 1)} to ${formatNumber(start + shown)} of ${formatCount(total, 'problem')}`
}

export const stateChoices = ({ states }: Pick<LibrarySummary, 'states'>): Choice[] =>
  PROBLEM_STATES.map((state) => ({ value: state, label: state, note: formatNumber(states[state] ?? 0) }))

export const tagChoices = ({ tags }: Pick<LibrarySummary, 'tags'>, chosen: readonly string[]): Choice[] =>
  tags
    .filter(({ tag }) => !chosen.includes(tag))
    .map(({ tag, count }) => ({ value: tag, label: tag, note: formatNumber(count) }))

function sheetFact(label: string, sheets: readonly RunSheetItem[]): Fact {
  const [first] = sheets
  const more = sheets.length > 1 ? ' and more' : ''
  return { label, value: sheets.length, note: first && `RS-${first.number}${more}` }
}

/** The strip above the table, over all problems of the workspace. */
export function libraryFacts(
  { total, states }: Pick<LibrarySummary, 'total' | 'states'>,
  sheets: readonly RunSheetItem[],
): Fact[] {
  const inState = (state: RunSheetItem['state']) => sheets.filter((sheet) => sheet.state === state)
  const withSheet = RUN_SHEET_STATES.reduce((sum, state) => sum + (states[state] ?? 0), 0)
  const toCarry = states['to carry over'] ?? 0
  return [
    { label: 'Problems', value: formatNumber(total) },
    { label: 'Not embedded yet', value: formatNumber(states['not embedded'] ?? 0) },
    ...(toCarry > 0 ? [{ label: 'To carry over', value: formatNumber(toCarry), note: 'to the current version' }] : []),
    {
      label: 'With a run sheet',
      value: formatNumber(withSheet),
      note: toCarry > 0 ? 'for the current version' : undefined,
    },
    sheetFact('Waiting for a reviewer', inState('in review')),
    sheetFact('Approved, not issued', inState('approved')),
    sheetFact('Returned', inState('returned')),
  ]
}
