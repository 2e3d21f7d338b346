import type { ProblemItem } from '#shared/schemas/problems'
import type { RunSheetItem } from '#shared/schemas/run-sheets'
import type { Fact, Sort } from '../ui/parts'

type Key = string | number | null

const KEYS = {
  number: (item) => item.number,
  name: (item) => item.name.toLowerCase(),
  form: (item) => item.form,
  variables: (item) => item.variables,
  interactions: (item) => item.interactions,
  density: (item) => item.density,
  machine: (item) => item.embedding?.machine.toLowerCase() ?? null,
  embedding: (item) => item.embedding?.number ?? null,
  longest: (item) => item.embedding?.longestChain ?? null,
  runSheet: (item) => item.runSheet?.state ?? null,
  best: (item) => item.best,
  changedAt: (item) => item.changedAt,
} satisfies Record<string, (item: ProblemItem) => Key>

export type LibraryField = keyof typeof KEYS

export const isLibraryField = (field: string): field is LibraryField => Object.hasOwn(KEYS, field)

/** Problems by one column; those without a value stand last either way, equals by number. */
export function sortProblems(items: readonly ProblemItem[], sort: Sort): ProblemItem[] {
  const key: (item: ProblemItem) => Key = isLibraryField(sort.field) ? KEYS[sort.field] : KEYS.number
  const sign = sort.direction === 'ascending' ? 1 : -1
  return [...items].sort((one, two) => {
    const [a, b] = [key(one), key(two)]
    if (a === b) return one.number - two.number
    if (a === null || b === null) return a === null ? 1 : -1
    return a < b ? -sign : sign
  })
}

function wordsOf(item: ProblemItem): string {
  const { embedding, runSheet } = item
  return [
    `p-${item.number}`,
    item.name,
    item.form,
    embedding && `e-${embedding.number} ${embedding.machine}`,
    runSheet && `rs-${runSheet.number} ${runSheet.state}`,
  ]
    .join(' ')
    .toLowerCase()
}

/** Problems in whose name, number, form, machine, embedding or run sheet every typed word occurs. */
export function filterProblems(items: readonly ProblemItem[], typed: string): ProblemItem[] {
  const words = typed.toLowerCase().split(/\s+/).filter(Boolean)
  return items.filter((item) => words.every((word) => wordsOf(item).includes(word)))
}

function sheetFact(label: string, sheets: readonly RunSheetItem[]): Fact {
  const [first] = sheets
  const more = sheets.length > 1 ? ' and more' : ''
  return { label, value: sheets.length, note: first && `RS-${first.number}${more}` }
}

/** The strip above the table. `total` counts all problems of the workspace, listed or not. */
export function libraryFacts(total: number, items: readonly ProblemItem[], sheets: readonly RunSheetItem[]): Fact[] {
  const inState = (state: RunSheetItem['state']) => sheets.filter((sheet) => sheet.state === state)
  return [
    { label: 'Problems', value: total },
    { label: 'Not embedded yet', value: items.filter(({ embedding }) => !embedding).length },
    { label: 'With a run sheet', value: items.filter(({ runSheet }) => runSheet).length },
    sheetFact('Waiting for a reviewer', inState('in review')),
    sheetFact('Approved, not issued', inState('approved')),
    sheetFact('Returned', inState('returned')),
  ]
}
