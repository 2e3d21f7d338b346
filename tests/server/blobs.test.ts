import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, expect, it } from 'vitest'
import type { Database } from '../../server/database/client'
import { migrate, openDatabase } from '../../server/database/client'
import type { BlobStore } from '../../server/database/repositories/blobs'
import { createBlobStore } from '../../server/database/repositories/blobs'
import { createRandom } from '../../shared/engine/random'

const folder = mkdtempSync(join(tmpdir(), 'espalier-blobs-'))
let database: Database
let blobs: BlobStore

beforeAll(async () => {
  database = await openDatabase({ dataFolder: folder })
  await migrate(database)
  blobs = createBlobStore(database, () => new Date())
})
afterAll(async () => {
  await database.close()
  rmSync(folder, { recursive: true })
})

it('gives back every byte of a blob of several chunks', async () => {
  const random = createRandom(1)
  const bytes = Uint8Array.from({ length: 5_000_003 }, () => random.below(256))
  const id = await blobs.write(bytes)
  expect(Buffer.compare(await blobs.read(id), bytes)).toBe(0)
})

it('keeps an empty blob', async () => {
  expect(await blobs.read(await blobs.write(new Uint8Array()))).toHaveLength(0)
})

it('sweeps what was never adopted and keeps what was', async () => {
  const kept = await blobs.write(Uint8Array.of(1, 2, 3))
  await database.db.transaction((tx) => blobs.adopt(tx, kept))
  const dropped = await blobs.write(Uint8Array.of(4))
  await blobs.sweep(new Date(Date.now() + 1000))
  expect(await blobs.read(kept)).toEqual(Uint8Array.of(1, 2, 3))
  await expect(blobs.read(dropped)).rejects.toThrow('does not exist')
})

it('refuses a second process on the same folder', async () => {
  await expect(openDatabase({ dataFolder: folder })).rejects.toThrow('in use by another process')
})
