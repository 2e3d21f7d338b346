import type { Reference, WorkRow, WorkTable } from '../../database/repositories/workspace-rows'
import { referencesOf, WORK_TABLE_NAMES } from '../../database/repositories/workspace-rows'

const textOf = (row: WorkRow, columns: readonly string[]): string => JSON.stringify(columns.map((key) => row[key]))

/** Columns by which rows of a table are referred to from anywhere in a workspace. */
const KEYS = new Map<string, string[][]>()
for (const name of WORK_TABLE_NAMES)
  for (const { to, keys } of referencesOf(name)) {
    const known = KEYS.get(to) ?? []
    if (!known.some((one) => one.join() === keys.join())) KEYS.set(to, [...known, [...keys]])
  }

/** Which rows an archive holds, so that none of its rows refers to anything outside. */
export class Presence {
  private readonly held = new Map<string, Set<string>>()

  add(name: WorkTable, row: WorkRow): void {
    for (const keys of KEYS.get(name) ?? []) this.setOf(name, keys).add(textOf(row, keys))
  }

  /** Whether the row that is referred to is here; true where none is. */
  has({ to, columns, keys }: Reference, row: WorkRow): boolean {
    if (columns.some((column) => row[column] === null)) return true
    return this.setOf(to, keys).has(textOf(row, columns))
  }

  private setOf(name: string, keys: readonly string[]): Set<string> {
    const key = `${name} ${keys.join()}`
    const known = this.held.get(key) ?? new Set<string>()
    this.held.set(key, known)
    return known
  }
}

/** References to other rows of the workspace itself. */
export const innerReferences = (name: WorkTable): Reference[] =>
  referencesOf(name).filter(({ to }) => to !== 'users' && to !== 'workspaces' && to !== 'blobs')

export const refersToItself = (name: WorkTable): boolean => referencesOf(name).some(({ to }) => to === name)

/** Ids of the people that a row names. */
export const peopleIn = (name: WorkTable, row: WorkRow): string[] =>
  referencesOf(name)
    .filter(({ to }) => to === 'users')
    .map(({ columns }) => row[columns[0]!])
    .concat(mentionsIn(row))
    .filter((id) => typeof id === 'string')

/** Ids of the people whom a remark mentions; other rows mention nobody. */
export const mentionsIn = ({ mentions }: WorkRow): unknown[] => (Array.isArray(mentions) ? mentions : [])
