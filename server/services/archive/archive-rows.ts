import type { WorkRow, WorkTable } from '../../database/repositories/workspace-rows'
import { columnsOf, referencesOf, WORK_TABLE_NAMES } from '../../database/repositories/workspace-rows'
import type { Archive } from './open-archive'
import { mentionsIn, Presence, refersToItself } from './presence'
import { notReadable } from './read-rows'

export type ArchiveRows = Readonly<Record<WorkTable, readonly WorkRow[]>>

/** Every row belongs to the workspace of the archive and refers to nothing outside of it. */
function requireInside(rows: ArchiveRows, { manifest }: Archive): void {
  const present = new Presence()
  const people = new Set(manifest.people.map(({ id }) => id))
  for (const name of WORK_TABLE_NAMES) {
    const ofOwn = refersToItself(name)
    if (ofOwn) for (const row of rows[name]) present.add(name, row)
    for (const row of rows[name]) {
      for (const reference of referencesOf(name)) {
        const { to, columns } = reference
        const id = row[columns[0]!]
        const isInside =
          to === 'workspaces'
            ? id === manifest.workspace.id
            : to === 'users'
              ? id === null || id === undefined || people.has(id as string)
              : to === 'blobs'
                ? id === null || id === undefined || Object.hasOwn(manifest.blobs, id as string)
                : present.has(reference, row)
        if (!isInside) throw notReadable(`a row of ${name} refers by ${columns.join(', ')} to what is not in it`)
      }
      if (!mentionsIn(row).every((id) => people.has(id as string)))
        throw notReadable('a remark mentions somebody who is not in it')
      if (!ofOwn) present.add(name, row)
    }
  }
  requireOwnCounters(rows, manifest.workspace.id)
}

/** Running numbers have no reference that the database checks: one of another workspace must not be set from here. */
function requireOwnCounters({ counters, problems, runSheets }: ArchiveRows, workspaceId: string): void {
  const scopes = new Set([workspaceId, ...[...problems, ...runSheets].map(({ id }) => id)])
  if (!counters.every(({ scope }) => scopes.has(scope as string))) throw notReadable('it counts what is not in it')
}

/** Columns that an older archive lacks are as the database would make them. */
const completed = (name: WorkTable, row: WorkRow): WorkRow => {
  for (const [key, { notNull }] of Object.entries(columnsOf(name))) if (!notNull) row[key] ??= null
  return row
}

/** All rows of an archive. @throws DomainError naming the first that cannot be taken */
export async function rowsOf(archive: Archive): Promise<ArchiveRows> {
  const rows: Partial<Record<WorkTable, WorkRow[]>> = {}
  for (const name of WORK_TABLE_NAMES) rows[name] = (await archive.rows(name)).map((row) => completed(name, row))
  const read = rows as ArchiveRows
  requireInside(read, archive)
  return read
}
