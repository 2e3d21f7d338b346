import { createHash } from 'node:crypto'
import { createWriteStream } from 'node:fs'
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { Readable, Transform } from 'node:stream'
import { pipeline } from 'node:stream/promises'

/** A file that stands on the disk for as long as it is worked on. */
export interface StoredFile {
  readonly name: string
  readonly path: string
  readonly bytes: number
  /** Hex. */
  readonly sha256: string
}

/** A folder of its own, gone with all that is in it once the work is over. */
export async function inTemporaryFolder<T>(work: (folder: string) => Promise<T>): Promise<T> {
  const folder = await mkdtemp(join(tmpdir(), 'espalier-upload-'))
  try {
    return await work(folder)
  } finally {
    await rm(folder, { recursive: true, force: true })
  }
}

/** Writes a stream into a folder, measured and hashed on the way. */
export async function storeFile(stream: Readable, name: string, folder: string): Promise<StoredFile> {
  const path = join(folder, 'file')
  const hash = createHash('sha256')
  let bytes = 0
  const measured = new Transform({
    transform(chunk: Buffer, _encoding, done) {
      hash.update(chunk)
      bytes += chunk.length
      done(null, chunk)
    },
  })
  await pipeline(stream, measured, createWriteStream(path))
  return { name, path, bytes, sha256: hash.digest('hex') }
}

/** Works on bytes as on a file that was sent. */
export const asStoredFile = <T>(name: string, bytes: Uint8Array, work: (file: StoredFile) => Promise<T>): Promise<T> =>
  inTemporaryFolder(async (folder) => work(await storeFile(Readable.from([bytes]), name, folder)))
