import { firstDirection, type LibraryField } from '../../shared/library'
import type { LibraryQuery } from '../../shared/schemas/library'
import type { ProblemItem } from '../../shared/schemas/problems'

/** The library as plain functions over items in memory: what the queries of the database have to answer. */

type Key = string | number | null

const KEYS: Record<LibraryField, (item: ProblemItem) => Key> = {
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
}

/** Those without a value last either way, equals by number. */
export function sorted(items: readonly ProblemItem[], { sort = 'changedAt', direction }: Partial<LibraryQuery>) {
  const key = KEYS[sort]
  const sign = (direction ?? firstDirection(sort)) === 'ascending' ? 1 : -1
  return [...items].sort((one, two) => {
    const [a, b] = [key(one), key(two)]
    if (a === b) return one.number - two.number
    if (a === null || b === null) return a === null ? 1 : -1
    return a < b ? -sign : sign
  })
}

function wordsOf({ number, name, form, embedding, runSheet, tags }: ProblemItem): string {
  const made = embedding ? `E-${embedding.number} ${embedding.machine}` : ''
  const sheet = runSheet ? `RS-${runSheet.number} ${runSheet.state}` : ''
  return [`P-${number}`, name, form, made, sheet, ...tags].join(' ').toLowerCase()
}

export function matches(item: ProblemItem, { q = '', tag = [], form, state }: Partial<LibraryQuery>): boolean {
  const text = wordsOf(item)
  const borne = item.tags.map((one) => one.toLowerCase())
  return (
    q
      .toLowerCase()
      .split(/\s+/)
      .filter(Boolean)
      .every((word) => text.includes(word)) &&
    tag.every((one) => borne.includes(one.toLowerCase())) &&
    (!form || item.form === form) &&
    (!state || item.state === state)
  )
}
