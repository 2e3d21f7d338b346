import { randomUUID } from 'node:crypto'
import type { FileHandle } from 'node:fs/promises'
import { open } from 'node:fs/promises'
import type { PGlite } from '@electric-sql/pglite'
import { and, asc, eq, inArray, lt } from 'drizzle-orm'
import type { Database, Db } from '../client'
import { blobChunks, blobs } from '../schema'
import { decodeCopyColumn, encodeCopyRows } from './copy-format'

const CHUNK_BYTES = 2 * 2 ** 20
const IDS_AT_ONCE = 1000

/**
 * Stores byte arrays in chunks. On the embedded engine a large query parameter blocks the process for seconds, so there
 * the bytes go in and out by binary COPY; on a server they are plain parameters.
 */
export interface BlobStore {
  /** Writes the bytes and answers the id of a blob that no row refers to yet. */
  write(bytes: Uint8Array): Promise<string>
  /** The same with the bytes of a file, of which little is in memory at a time. */
  writeFile(path: string): Promise<string>
  /** Marks a blob as referred to, in the transaction that stores the reference. */
  adopt(tx: Db, id: string): Promise<void>
  /** @throws Error when the blob does not exist */
  read(id: string): Promise<Uint8Array>
  /** Writes the bytes into a file. @throws Error when the blob does not exist */
  readToFile(id: string, path: string): Promise<void>
  remove(tx: Db, ids: readonly string[]): Promise<void>
  /** Deletes blobs never adopted and older than the moment given. */
  sweep(before: Date): Promise<void>
}

export async function deleteBlobs(tx: Db, ids: readonly string[]): Promise<void> {
  for (let from = 0; from < ids.length; from += IDS_AT_ONCE)
    await tx.delete(blobs).where(inArray(blobs.id, ids.slice(from, from + IDS_AT_ONCE)))
}

interface ChunkStore {
  write(blobId: string, part: number, data: Uint8Array): Promise<void>
  read(blobId: string, part: number): Promise<Uint8Array | undefined>
}

function chunksInServer({ db }: Database): ChunkStore {
  return {
    async write(blobId, part, data) {
      await db.insert(blobChunks).values({ blobId, part, data })
    },
    async read(blobId, part) {
      const rows = await db
        .select({ data: blobChunks.data })
        .from(blobChunks)
        .where(and(eq(blobChunks.blobId, blobId), eq(blobChunks.part, part)))
      return rows[0]?.data
    },
  }
}

/**
 * Bytes as the embedded engine asks for them, and without a copy: a plain blob makes one when it is asked, which outlives
 * hundreds of others in a process with a large heap.
 */
class BytesBlob extends Blob {
  constructor(private readonly held: ArrayBuffer) {
    super()
  }

  override arrayBuffer(): Promise<ArrayBuffer> {
    return Promise.resolve(this.held)
  }
}

function chunksInPglite(pglite: PGlite): ChunkStore {
  return {
    async write(blobId, part, data) {
      const blob = new BytesBlob(encodeCopyRows([[blobId, part, data]]).buffer)
      await pglite.query(`copy blob_chunks (blob_id, part, data) from '/dev/blob' (format binary)`, [], { blob })
    },
    async read(blobId, part) {
      // COPY takes no parameters; ids are ours, and anything but hex and dashes is refused.
      if (!/^[0-9a-f-]+$/.test(blobId)) throw new Error(`blob id ${blobId} is malformed`)
      const query = `copy (select data from blob_chunks where blob_id = '${blobId}' and part = ${part}) to '/dev/blob' (format binary)`
      const { blob } = await pglite.query(query)
      return blob ? decodeCopyColumn(new Uint8Array(await blob.arrayBuffer()))[0] : undefined
    },
  }
}

export function createBlobStore(database: Database, now: () => Date): BlobStore {
  const { db, pglite } = database
  const chunks = pglite ? chunksInPglite(pglite) : chunksInServer(database)
  const store = async (bytes: number, chunkAt: (from: number, to: number) => Promise<Uint8Array>): Promise<string> => {
    const id = randomUUID()
    await db.insert(blobs).values({ id, bytes, adopted: false, createdAt: now() })
    for (let part = 0; part * CHUNK_BYTES < bytes; part++)
      await chunks.write(id, part, await chunkAt(part * CHUNK_BYTES, Math.min(bytes, (part + 1) * CHUNK_BYTES)))
    return id
  }
  const load = async function* (id: string): AsyncGenerator<{ at: number; total: number; chunk: Uint8Array }> {
    const [row] = await db.select().from(blobs).where(eq(blobs.id, id)).orderBy(asc(blobs.id))
    if (!row) throw new Error(`blob ${id} does not exist`)
    for (let part = 0; part * CHUNK_BYTES < row.bytes; part++) {
      const chunk = await chunks.read(id, part)
      if (!chunk) throw new Error(`blob ${id} misses part ${part}`)
      yield { at: part * CHUNK_BYTES, total: row.bytes, chunk }
    }
  }
  return {
    write: (bytes) => store(bytes.byteLength, async (from, to) => bytes.subarray(from, to)),
    writeFile(path) {
      const buffer = new Uint8Array(CHUNK_BYTES)
      return withFile(path, 'r', async (file) =>
        store((await file.stat()).size, async (from, to) => {
          const { bytesRead } = await file.read(buffer, 0, to - from, from)
          if (bytesRead < to - from) throw new Error(`${path} ended at ${from + bytesRead} bytes`)
          return buffer.subarray(0, bytesRead)
        }),
      )
    },
    async adopt(tx, id) {
      await tx.update(blobs).set({ adopted: true }).where(eq(blobs.id, id))
    },
    async read(id) {
      let bytes = new Uint8Array(0)
      for await (const { at, total, chunk } of load(id)) {
        if (at === 0) bytes = new Uint8Array(total)
        bytes.set(chunk, at)
      }
      return bytes
    },
    readToFile: (id, path) =>
      withFile(path, 'w', async (file) => {
        for await (const { at, chunk } of load(id)) await file.write(chunk, 0, chunk.byteLength, at)
      }),
    remove: deleteBlobs,
    async sweep(before) {
      await db.delete(blobs).where(and(eq(blobs.adopted, false), lt(blobs.createdAt, before)))
    },
  }
}

async function withFile<T>(path: string, flags: 'r' | 'w', work: (file: FileHandle) => Promise<T>): Promise<T> {
  const file = await open(path, flags)
  try {
    return await work(file)
  } finally {
    await file.close()
  }
}
