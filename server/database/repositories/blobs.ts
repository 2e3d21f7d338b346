import { randomUUID } from 'node:crypto'
import { and, asc, eq, inArray, lt } from 'drizzle-orm'
import type { Database, Db } from '../client'
import { blobChunks, blobs } from '../schema'
import { decodeCopyColumn, encodeCopyRows } from './copy-format'

const CHUNK_BYTES = 2 * 2 ** 20

/**
 * Stores byte arrays in chunks. On the embedded engine a large query parameter blocks the process for seconds, so there
 * the bytes go in and out by binary COPY; on a server they are plain parameters.
 */
export interface BlobStore {
  /** Writes the bytes and answers the id of a blob that no row refers to yet. */
  write(bytes: Uint8Array): Promise<string>
  /** Marks a blob as referred to, in the transaction that stores the reference. */
  adopt(tx: Db, id: string): Promise<void>
  /** @throws Error when the blob does not exist */
  read(id: string): Promise<Uint8Array>
  remove(tx: Db, ids: readonly string[]): Promise<void>
  /** Deletes blobs never adopted and older than the moment given. */
  sweep(before: Date): Promise<void>
}

export function createBlobStore(database: Database, now: () => Date): BlobStore {
  const { db, pglite } = database
  const writeChunk = async (blobId: string, part: number, data: Uint8Array): Promise<void> => {
    if (!pglite) {
      await db.insert(blobChunks).values({ blobId, part, data })
      return
    }
    const blob = new Blob([encodeCopyRows([[blobId, part, data]])])
    await pglite.query(`copy blob_chunks (blob_id, part, data) from '/dev/blob' (format binary)`, [], { blob })
  }
  const readChunk = async (blobId: string, part: number): Promise<Uint8Array | undefined> => {
    if (!pglite) {
      const rows = await db
        .select({ data: blobChunks.data })
        .from(blobChunks)
        .where(and(eq(blobChunks.blobId, blobId), eq(blobChunks.part, part)))
      return rows[0]?.data
    }
    // COPY takes no parameters; ids are ours, and anything but hex and dashes is refused.
    if (!/^[0-9a-f-]+$/.test(blobId)) throw new Error(`blob id ${blobId} is malformed`)
    const query = `copy (select data from blob_chunks where blob_id = '${blobId}' and part = ${part}) to '/dev/blob' (format binary)`
    const { blob } = await pglite.query(query)
    return blob ? decodeCopyColumn(new Uint8Array(await blob.arrayBuffer()))[0] : undefined
  }
  return {
    async write(bytes) {
      const id = randomUUID()
      await db.insert(blobs).values({ id, bytes: bytes.byteLength, adopted: false, createdAt: now() })
      for (let part = 0; part * CHUNK_BYTES < bytes.byteLength; part++)
        await writeChunk(id, part, bytes.subarray(part * CHUNK_BYTES, (part + 1) * CHUNK_BYTES))
      return id
    },
    async adopt(tx, id) {
      await tx.update(blobs).set({ adopted: true }).where(eq(blobs.id, id))
    },
    async read(id) {
      const [row] = await db.select().from(blobs).where(eq(blobs.id, id)).orderBy(asc(blobs.id))
      if (!row) throw new Error(`blob ${id} does not exist`)
      const bytes = new Uint8Array(row.bytes)
      for (let part = 0; part * CHUNK_BYTES < row.bytes; part++) {
        const chunk = await readChunk(id, part)
        if (!chunk) throw new Error(`blob ${id} misses part ${part}`)
        bytes.set(chunk, part * CHUNK_BYTES)
      }
      return bytes
    },
    async remove(tx, ids) {
      if (ids.length > 0) await tx.delete(blobs).where(inArray(blobs.id, [...ids]))
    },
    async sweep(before) {
      await db.delete(blobs).where(and(eq(blobs.adopted, false), lt(blobs.createdAt, before)))
    },
  }
}
