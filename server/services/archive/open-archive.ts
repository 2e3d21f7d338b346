import { createHash } from 'node:crypto'
import type { Entry, ZipFile } from 'yauzl'
import { openPromise } from 'yauzl'
import type { WorkRow, WorkTable } from '../../database/repositories/workspace-rows'
import { WORK_TABLE_NAMES } from '../../database/repositories/workspace-rows'
import type { Manifest } from './manifest'
import { ARCHIVE_LIMITS, blobPath, isWorkTable, MANIFEST_PATH, manifestSchema, rowsPath } from './manifest'
import { notReadable, readRow } from './read-rows'

/** An archive that was opened: its entries are read when they are asked for, and held against the manifest's sums. */
export class Archive {
  private constructor(
    private readonly zip: ZipFile,
    private readonly entries: ReadonlyMap<string, Entry>,
    readonly manifest: Manifest,
  ) {}

  /** @throws DomainError for a file that is no such archive, is larger than is taken, or names what no archive holds */
  static async open(path: string): Promise<Archive> {
    const zip = await openPromise(path, { autoClose: false }).catch(() => {
      throw notReadable('it is no ZIP file')
    })
    try {
      const entries = await entriesOf(zip)
      const bytes = await contentsOf(zip, entries, MANIFEST_PATH, ARCHIVE_LIMITS.manifest)
      return new Archive(zip, entries, readManifest(bytes))
    } catch (error) {
      zip.close()
      throw error
    }
  }

  close(): void {
    this.zip.close()
  }

  /** Rows of a table; none where the archive is older than the table. */
  async rows(name: WorkTable): Promise<WorkRow[]> {
    const said = this.manifest.rows[name]
    if (!said) return []
    const bytes = await contentsOf(this.zip, this.entries, rowsPath(name), ARCHIVE_LIMITS.rows)
    requireSum(bytes, said.sha256, rowsPath(name))
    const lines = new TextDecoder().decode(bytes).split('\n').slice(0, -1)
    if (lines.length !== said.rows) throw notReadable(`${name} has ${lines.length} rows instead of ${said.rows}`)
    return lines.map((line, k) => readRow(name, line, k + 1))
  }

  async blob(id: string): Promise<Uint8Array> {
    const said = this.manifest.blobs[id]
    if (!said) throw notReadable(`the array ${id} is missing`)
    const bytes = await contentsOf(this.zip, this.entries, blobPath(id), ARCHIVE_LIMITS.blob)
    requireSum(bytes, said.sha256, blobPath(id))
    return bytes
  }
}

function requireSum(bytes: Uint8Array, sha256: string, path: string): void {
  if (createHash('sha256').update(bytes).digest('hex') !== sha256)
    throw notReadable(`${path} is not what was exported: its SHA-256 differs`)
}

const isKnown = (path: string): boolean =>
  path === MANIFEST_PATH ||
  /^blobs\/[\w-]{1,100}$/.test(path) ||
  WORK_TABLE_NAMES.some((name) => path === rowsPath(name))

async function entriesOf(zip: ZipFile): Promise<Map<string, Entry>> {
  const entries = new Map<string, Entry>()
  let total = 0
  let rows = 0
  if (zip.entryCount > ARCHIVE_LIMITS.entries) throw notReadable('it has too many entries')
  for await (const entry of zip.eachEntry()) {
    const { fileName, uncompressedSize } = entry
    if (!isKnown(fileName)) throw notReadable(`it holds ${fileName.slice(0, 100)}, which is no part of a workspace`)
    if (entries.has(fileName)) throw notReadable(`it holds ${fileName} twice`)
    total += uncompressedSize
    rows += fileName.startsWith('rows/') ? uncompressedSize : 0
    if (total > ARCHIVE_LIMITS.total || rows > ARCHIVE_LIMITS.rows) throw notReadable('unpacked it is too large')
    entries.set(fileName, entry)
  }
  return entries
}

async function contentsOf(zip: ZipFile, entries: ReadonlyMap<string, Entry>, path: string, limit: number) {
  const entry = entries.get(path)
  if (!entry) throw notReadable(`${path} is missing`)
  if (entry.uncompressedSize > limit) throw notReadable(`${path} is too large`)
  try {
    // The reader refuses an entry that unpacks to another size than it says, so that it fits and is filled.
    const bytes = new Uint8Array(entry.uncompressedSize)
    let at = 0
    for await (const chunk of await zip.openReadStreamPromise(entry)) {
      bytes.set(chunk as Buffer, at)
      at += (chunk as Buffer).length
    }
    return bytes
  } catch (error) {
    throw notReadable(`${path} does not unpack (${error instanceof Error ? error.message : String(error)})`)
  }
}

function readManifest(bytes: Uint8Array): Manifest {
  let value: unknown
  try {
    value = JSON.parse(new TextDecoder().decode(bytes))
  } catch {
    throw notReadable(`${MANIFEST_PATH} is no JSON`)
  }
  const result = manifestSchema.safeParse(value)
  if (!result.success) {
    const { path, message } = result.error.issues[0]!
    throw notReadable(`${MANIFEST_PATH}, ${path.join('.')}: ${message}`)
  }
  const unknown = Object.keys(result.data.rows).find((name) => !isWorkTable(name))
  if (unknown) throw notReadable(`it holds ${unknown.slice(0, 100)}, which this version does not know`)
  return result.data
}
