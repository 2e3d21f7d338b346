import { createHash } from 'node:crypto'
import { once } from 'node:events'
import { createWriteStream } from 'node:fs'
import { join } from 'node:path'
import { PassThrough, Readable } from 'node:stream'
import { finished } from 'node:stream/promises'
import { ZipFile } from 'yazl'
import type { App } from '../../app'
import type { Db } from '../../database/client'
import { MIGRATIONS } from '../../database/migrations'
import { findWorkspace, listMembers, namesOf } from '../../database/repositories/people'
import type { WorkRow, WorkTable } from '../../database/repositories/workspace-rows'
import { blobsOf, DERIVED, WORK_TABLE_NAMES, workRows } from '../../database/repositories/workspace-rows'
import type { Manifest } from './manifest'
import { ARCHIVE_FORMAT, ARCHIVE_VERSION, blobPath, MANIFEST_PATH, rowsPath } from './manifest'
import { innerReferences, peopleIn, Presence, refersToItself } from './presence'

interface Gathering {
  readonly present: Presence
  readonly people: Set<string>
  readonly blobIds: Set<string>
}

/** A row as it is kept, or null where what it stands on is not kept: deleted a moment ago, or still at work. */
function keptRow(name: WorkTable, row: WorkRow, present: Presence): WorkRow | null {
  const kept = { ...row, ...DERIVED[name] }
  for (const reference of innerReferences(name)) {
    if (reference.to === name || present.has(reference, kept)) continue
    if (reference.isRequired) return null
    for (const column of reference.columns) kept[column] = null
  }
  return kept
}

/** References within the table itself, once all of its rows are known. */
function withoutDangling(name: WorkTable, row: WorkRow, present: Presence): WorkRow {
  for (const reference of innerReferences(name))
    if (reference.to === name && !present.has(reference, row)) row[reference.columns[0]!] = null
  return row
}

async function* keptRows(tx: Db, name: WorkTable, workspaceId: string, present: Presence): AsyncGenerator<WorkRow> {
  for await (const rows of workRows(tx, name, workspaceId, 'whole'))
    for (const row of rows) {
      const kept = keptRow(name, row, present)
      if (kept) yield kept
    }
}

/** Writes the rows of a table into the folder, one a line. */
async function writeRows(tx: Db, name: WorkTable, workspaceId: string, folder: string, gathering: Gathering) {
  const { present, people, blobIds } = gathering
  if (refersToItself(name)) for await (const row of keptRows(tx, name, workspaceId, present)) present.add(name, row)
  const file = createWriteStream(join(folder, name))
  const hash = createHash('sha256')
  let count = 0
  for await (const kept of keptRows(tx, name, workspaceId, present)) {
    const row = withoutDangling(name, kept, present)
    present.add(name, row)
    for (const id of peopleIn(name, row)) people.add(id)
    for (const id of blobsOf(name, row)) blobIds.add(id)
    const line = `${JSON.stringify(row)}\n`
    hash.update(line)
    count++
    if (!file.write(line)) await once(file, 'drain')
  }
  file.end()
  await finished(file)
  return { rows: count, sha256: hash.digest('hex') }
}

export interface Snapshot {
  readonly folder: string
  readonly manifest: Manifest
  readonly blobIds: readonly string[]
}

/** All rows of a workspace as they are at one moment, written into a folder; its arrays never change and come later. */
export async function takeSnapshot(
  app: App,
  { workspaceId, madeBy, folder }: { workspaceId: string; madeBy: string; folder: string },
): Promise<Snapshot> {
  const work = async (tx: Db): Promise<Snapshot> => {
    const gathering: Gathering = { present: new Presence(), people: new Set(), blobIds: new Set() }
    const rows: Manifest['rows'] = {}
    for (const name of WORK_TABLE_NAMES) rows[name] = await writeRows(tx, name, workspaceId, folder, gathering)
    const { id, name, createdAt } = (await findWorkspace(tx, workspaceId))!
    const members = await listMembers(tx, workspaceId)
    const former = [...gathering.people].filter((one) => members.every((member) => member.id !== one))
    const people = [...members, ...(await namesOf(tx, former)).map((person) => ({ ...person, roles: [] }))]
    const manifest: Manifest = {
      format: ARCHIVE_FORMAT,
      formatVersion: ARCHIVE_VERSION,
      version: app.version,
      migration: MIGRATIONS.at(-1)!.tag,
      madeAt: app.now().toISOString(),
      madeBy,
      workspace: { id, name, createdAt: createdAt.toISOString() },
      people: people.map(({ id, name, email, roles }) => ({ id, name, email, roles })),
      rows,
      blobs: {},
    }
    return { folder, manifest, blobIds: [...gathering.blobIds].sort() }
  }
  return app.db.transaction(work, { isolationLevel: 'repeatable read', accessMode: 'read only' })
}

/** Packs a snapshot and its arrays, one after another as they are asked for; the manifest, with their sums, comes last. */
export function packSnapshot(app: App, { folder, manifest, blobIds }: Snapshot): Readable {
  const zip = new ZipFile()
  const options = { mtime: new Date(manifest.madeAt) }
  for (const name of WORK_TABLE_NAMES) zip.addFile(join(folder, name), rowsPath(name), options)
  const blobs: Manifest['blobs'] = {}
  for (const id of blobIds)
    zip.addReadStreamLazy(blobPath(id), options, (give) => {
      const reading = async (): Promise<Readable> => {
        const bytes = await app.blobs.read(id)
        blobs[id] = { bytes: bytes.byteLength, sha256: createHash('sha256').update(bytes).digest('hex') }
        return Readable.from([Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength)])
      }
      reading().then(
        (stream) => give(null, stream),
        (error: unknown) => give(error, Readable.from([])),
      )
    })
  zip.addReadStreamLazy(MANIFEST_PATH, options, (give) =>
    give(null, Readable.from([Buffer.from(`${JSON.stringify({ ...manifest, blobs }, null, 1)}\n`)])),
  )
  zip.end()
  const packed = new PassThrough()
  zip.on('error', (error: Error) => packed.destroy(error))
  return zip.outputStream.pipe(packed)
}
