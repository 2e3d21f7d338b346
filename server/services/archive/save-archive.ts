import { randomUUID } from 'node:crypto'
import { DomainError } from '../../../shared/errors'
import type { App } from '../../app'
import type { Db } from '../../database/client'
import { insertArchivedPeople, insertPersonWithoutAccount } from '../../database/repositories/archived-people'
import { insertAuditEntry } from '../../database/repositories/audit'
import { findUser, insertMembership, insertWorkspace } from '../../database/repositories/people'
import type { WorkRow, WorkTable } from '../../database/repositories/workspace-rows'
import {
  insertWorkRows,
  isHere,
  referencesOf,
  setWorkField,
  withBlobs,
  WORK_TABLE_NAMES,
} from '../../database/repositories/workspace-rows'
import { FOUNDER_ROLES } from '../people'
import type { ArchiveRows } from './archive-rows'
import type { Manifest } from './manifest'
import { mentionsIn } from './presence'

export interface ReadArchive {
  readonly manifest: Manifest
  readonly rows: ArchiveRows
  readonly blobIds: ReadonlyMap<string, string>
}

type Person = Manifest['people'][number]

/**
 * Who a person of the archive is here. Only the account of whoever imports, and one with the same id and the same address,
 * is taken for theirs: an archive may say anything of anybody.
 */
async function accountOf(tx: Db, person: Person, importer: { id: string; email: string }): Promise<string | null> {
  if (person.email === importer.email) return importer.id
  const account = await findUser(tx, person.id)
  return account && account.email === person.email ? account.id : null
}

/** Ids here of the people of the archive; those without an account are kept by name, for an invitation to find them. */
async function takePeople(app: App, tx: Db, manifest: Manifest, importerId: string): Promise<Map<string, string>> {
  const importer = (await findUser(tx, importerId))!
  const ids = new Map<string, string>()
  for (const person of manifest.people) {
    const known = await accountOf(tx, person, importer)
    if (known) {
      ids.set(person.id, known)
      continue
    }
    const id = (await isHere(tx, 'users', person.id)) ? randomUUID() : person.id
    const { name, email, roles } = person
    await insertPersonWithoutAccount(tx, { id, name, createdAt: app.now() })
    await insertArchivedPeople(tx, { userId: id, workspaceId: manifest.workspace.id, email, roles })
    ids.set(person.id, id)
  }
  return ids
}

const ownReferences = (name: WorkTable): string[] =>
  referencesOf(name).flatMap(({ to, columns }) => (to === name ? columns : []))

/** A remark with the ids of here in the place of those that it mentions people by. */
function mentionedHere(remark: WorkRow, people: Map<string, string>): WorkRow {
  const mentioned = mentionsIn(remark) as string[]
  const said = String(remark.text)
  const text = mentioned.reduce((words, id) => words.replaceAll(`@[${id}]`, `@[${people.get(id)!}]`), said)
  return { text, mentions: mentioned.map((id) => people.get(id)!) }
}

/** The row as it is here: with the people and the arrays of this database, its references to its own table still open. */
function rowHere(name: WorkTable, row: WorkRow, blobIds: ReadonlyMap<string, string>, people: Map<string, string>) {
  const here = withBlobs(name, row, blobIds)
  for (const { to, columns } of referencesOf(name))
    if (to === 'users') here[columns[0]!] = people.get(row[columns[0]!] as string) ?? null
  for (const column of ownReferences(name)) here[column] = null
  if (name === 'runSheetRemarks') Object.assign(here, mentionedHere(here, people))
  if (name === 'auditEntries' && row.kind === 'person') here.thingId = people.get(row.thingId as string) ?? row.thingId
  return here
}

async function insertAll(tx: Db, { rows, blobIds }: ReadArchive, people: Map<string, string>): Promise<void> {
  for (const name of WORK_TABLE_NAMES) {
    await insertWorkRows(
      tx,
      name,
      rows[name].map((row) => rowHere(name, row, blobIds, people)),
    )
    for (const column of ownReferences(name))
      for (const row of rows[name])
        if (row[column] !== null) await setWorkField(tx, name, row.id as string, column, row[column])
  }
}

/** What the database says when something of the archive is in it already. */
const isTaken = (error: unknown): boolean => {
  const { code, cause } = error as { code?: unknown; cause?: unknown }
  return code === '23505' || (cause !== undefined && isTaken(cause))
}

const taken = (name: string): DomainError =>
  new DomainError(
    'wrong state',
    'archive.here',
    `${name}, or a part of it, is in this installation already. Things keep their addresses when they move, so they can be here only once.`,
  )

/**
 * Stores a workspace from its archive, with the importing person as its owner.
 * @throws DomainError where it, or a part of it, is here already
 */
export async function saveArchive(app: App, tx: Db, archive: ReadArchive, importerId: string): Promise<void> {
  const { workspace, madeAt, madeBy } = archive.manifest
  if (await isHere(tx, 'workspaces', workspace.id)) throw taken(workspace.name)
  try {
    for (const id of archive.blobIds.values()) await app.blobs.adopt(tx, id)
    await insertWorkspace(tx, { ...workspace, createdAt: new Date(workspace.createdAt) })
    const people = await takePeople(app, tx, archive.manifest, importerId)
    await insertAll(tx, archive, people)
    const membership = { workspaceId: workspace.id, userId: importerId, roles: [...FOUNDER_ROLES] }
    await insertMembership(tx, { ...membership, createdAt: app.now() })
    await insertAuditEntry(tx, {
      id: randomUUID(),
      workspaceId: workspace.id,
      at: app.now(),
      by: importerId,
      token: null,
      address: '',
      what: 'imported',
      kind: 'workspace',
      thingId: null,
      thing: `${workspace.name}, as exported by ${madeBy} at ${madeAt}`,
    })
  } catch (error) {
    throw isTaken(error) ? taken(workspace.name) : error
  }
}
