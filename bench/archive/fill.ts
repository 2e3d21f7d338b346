import { mkdirSync, openAsBlob } from 'node:fs'
import { join } from 'node:path'
import { createBlobStore } from '../../server/database/repositories/blobs'
import { openDatabase } from '../../server/database/client'
import { returns } from '../../server/database/schema'
import { packSamples } from '../../server/services/samples-data'
import { createRandom } from '../../shared/engine/random'
import { strideOf } from '../../shared/engine/sampling/samples'
import type { Client } from '../../tests/support/client'
import { rowsOf, setUpCase } from '../returns/case'
import { writeFiles } from '../returns/files'

/** Of a Chimera machine with 2,048 qubits, all of which are used. */
const CELLS = 16
const FIRST_READS = 10

/** Problem, machine, embedding and run sheet with one small set of samples, as people bring them in. */
export async function bringIn(client: Client, folder: string): Promise<void> {
  const given = await setUpCase(client, CELLS)
  mkdirSync(folder, { recursive: true })
  const file = writeFiles(folder, given.qubits, rowsOf(given, FIRST_READS)).find(({ name }) => name.endsWith('.npy'))!
  const form = new FormData()
  form.append('file', await openAsBlob(join(folder, file.name)), file.name)
  const { status, text } = await client.post(`/api/run-sheets/${given.runSheetId}/returns`, form)
  if (status !== 201) throw new Error(`samples were answered ${status}: ${text}`)
}

/** Rows of random spins, which no packing makes smaller. */
function samplesOf(reads: number): Uint8Array {
  const random = createRandom(3)
  const width = 8 * CELLS * CELLS
  const bytes = Uint8Array.from({ length: reads * strideOf(width) }, () => random.below(256))
  return packSamples({
    width,
    rows: reads,
    bytes,
    counts: new Uint32Array(reads).fill(1),
    gauges: null,
    energies: null,
  })
}

/** Further sets of samples beside the first, until there are so many bytes. No server may run on the folder meanwhile. */
export async function fill({ dataFolder, bytes, reads }: { dataFolder: string; bytes: number; reads: number }) {
  const database = await openDatabase({ dataFolder })
  const blobs = createBlobStore(database, () => new Date())
  const [first] = await database.db.select().from(returns)
  const samples = samplesOf(reads)
  const sets = Math.ceil(bytes / samples.byteLength)
  for (let k = 0; k < sets; k++) {
    const samplesBlobId = await blobs.write(samples)
    await database.db.transaction(async (tx) => {
      await blobs.adopt(tx, samplesBlobId)
      const copied = { ...first!, id: crypto.randomUUID(), number: first!.number + k + 1, reads, samplesBlobId }
      await tx.insert(returns).values({ ...copied, breaksBlobId: null, summaryBlobId: null, measures: null })
    })
  }
  await database.close()
}
