import { gzipSync } from 'node:zlib'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { drawGauge } from '../../shared/engine/programming/gauges'
import type { Programmed } from '../../shared/engine/programming/programme'
import { writeSamplesCsv } from '../../shared/engine/readout/files/write-csv'
import { packRows } from '../../shared/engine/sampling/merge'
import { importEmbedding } from '../../server/services/embedding-import'
import { loadReturn, readyRow } from '../../server/services/loaded-return'
import { samplesFile } from '../../server/services/return-files'
import { solutionsNpy, solutionsOf } from '../../server/services/return-solutions'
import { returnView } from '../../server/services/return-view'
import { uploadReturn } from '../../server/services/returns'
import { createRunSheet } from '../../server/services/run-sheets'
import { unpackSamples } from '../../server/services/samples-data'
import { asStoredFile } from '../../server/services/stored-files'
import { uploadReturnSchema } from '../../shared/schemas/returns'
import { createRunSheetSchema } from '../../shared/schemas/run-sheets'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'

/*
 * A path of three variables on a row of six qubits, two qubits a chain; three gauges. Rows of ±1 are chosen by hand, so
 * that every figure can be worked out beside them.
 */

const QUBITS = [0, 1, 2, 3, 4, 5]
const ROWS = [
  [1, 1, -1, -1, 1, 1],
  [1, 1, 1, -1, 1, 1],
  [-1, -1, -1, -1, -1, -1],
  [1, 1, -1, -1, 1, 1],
]
const GAUGES = [0, 1, 2, 2]

let test: TestApp
let sheetId: string
beforeAll(async () => {
  test = await startTestApp(1)
  const { app, actor } = test
  const machineId = await test.machine({ kind: 'square', width: 6, height: 1 })
  const problemId = await test.problem('# form: ising\na a 0.25\na b 1\nb c 1\n')
  const chains = { a: [0, 1], b: [2, 3], c: [4, 5] }
  const { id: embeddingId } = await importEmbedding(app, actor, { problemId, machineId, chains })
  const sheet = createRunSheetSchema.parse({ embeddingId, gauges: 3, reads: 100, seed: 5 })
  sheetId = (await createRunSheet(app, actor, sheet)).id
})
afterAll(() => test.close())

const upload = (name: string, bytes: Uint8Array, options: Record<string, unknown> = {}) =>
  asStoredFile(name, bytes, (file) =>
    uploadReturn(test.app, test.actor, sheetId, file, uploadReturnSchema.parse(options)),
  )
const text = (lines: readonly (readonly unknown[])[]): Uint8Array =>
  Buffer.from(lines.map((l) => l.join(',')).join('\n'))
const loaded = async (id: string) => {
  const row = await readyRow(test.app, test.actor, id)
  return { row, ...(await loadReturn(test.app, test.actor, row)) }
}
const storedRows = async (id: string) => {
  const { row } = await loaded(id)
  return unpackSamples(await test.app.blobs.read(row.samplesBlobId!))
}
const packed = packRows(6, ROWS.flat())

/** Σ h·s + Σ J·s·s as it stands in the textbook. */
function energyOf({ h, ends, J }: Programmed, spins: readonly number[]): number {
  let energy = 0
  h.forEach((field, p) => (energy += field * spins[p]!))
  J.forEach((coupling, c) => (energy += coupling * spins[ends[2 * c]!]! * spins[ends[2 * c + 1]!]!))
  return energy
}

describe('returned samples', () => {
  it('come as a table, plain or gzip, and say where they come from', async () => {
    const csv = text([[...QUBITS, 'count'], ...ROWS.map((row, r) => [...row, r + 1])])
    const plain = await upload('a.csv', csv)
    const zipped = await upload('a.csv.gz', gzipSync(csv))
    for (const { id, reads, rows } of [plain, zipped]) {
      expect({ reads, rows }).toEqual({ reads: 10, rows: 4 })
      expect(await storedRows(id)).toMatchObject({ bytes: packed.bytes, energies: null, gauges: null })
    }
    const { row } = await loaded(zipped.id)
    expect(row.made).toMatchObject({ format: 'csv', container: 'gzip', values: '±1', columns: 'file', rows: 4 })
    expect(row.readsWithBreak).toBe(2)
  })

  it('come as a document with all that is known of each row', async () => {
    const body = { kind: 'espalier.samples', version: 1, qubits: [...QUBITS].reverse() }
    const samples = ROWS.map((row) => [...row].reverse().map((spin) => (spin + 1) / 2))
    const document = { ...body, samples, counts: [2, 1, 1, 1], gauges: GAUGES, machineTimeSeconds: 0.5 }
    const { id, reads } = await upload('a.json', Buffer.from(JSON.stringify(document)))
    expect(reads).toBe(5)
    const rows = await storedRows(id)
    expect(rows.bytes).toEqual(packed.bytes)
    expect([...rows.gauges!]).toEqual(GAUGES)
    expect((await loaded(id)).row.made).toMatchObject({ format: 'json', values: '0/1', machineTimeSeconds: 0.5 })
  })

  it('have their gauges undone here where they stand as they were read', async () => {
    const { programmed } = await loaded((await upload('a.csv', text([QUBITS, ...ROWS]))).id)
    const read = ROWS.map((row, r) => {
      const signs = drawGauge(programmed, 5, GAUGES[r]!, 'chain')
      return [...row.map((spin, p) => spin * signs[p]!), GAUGES[r]]
    })
    const table = text([[...QUBITS, 'gauge'], ...read])
    const { id } = await upload('a.csv', table, { gauges: 'as read' })
    expect((await storedRows(id)).bytes).toEqual(packed.bytes)
    const untouched = await upload('a.csv', table)
    expect((await storedRows(untouched.id)).bytes).not.toEqual(packed.bytes)
  })

  it('say what their energies are, and what would explain others', async () => {
    const { programmed } = await loaded((await upload('a.csv', text([QUBITS, ...ROWS]))).id)
    const withEnergies = (sign: number) =>
      text([[...QUBITS, 'energy'], ...ROWS.map((row) => [...row, sign * energyOf(programmed, row)])])
    const right = await upload('a.csv', withEnergies(1))
    expect(right.energies).toMatchObject({ meaning: 'programmed', cause: null, agreeing: 4 })
    const wrong = await upload('a.csv', withEnergies(-1))
    expect(wrong.energies).toMatchObject({ meaning: null, cause: 'energy negated' })
    expect((await loaded(wrong.id)).row.made).toMatchObject({ energiesCause: 'energy negated', energiesLooked: 4 })
  })

  it.each([
    [
      'a gauge that there is none of',
      [
        [...QUBITS, 'gauge'],
        [...ROWS[0]!, 3],
      ],
      {},
      /gauge 3 .* has gauges 0 to 2/,
    ],
    ['gauges to undo that nobody names', [QUBITS, ROWS[0]!], { gauges: 'as read' }, /do not say their gauge/],
    ['an order that does not fit', [ROWS[0]!], { qubitOrder: '0 1 2 3 4 9' }, /does not use: 9/],
    ['another format than it is', [QUBITS, ROWS[0]!], { format: 'npy' }, /no NumPy array/],
    ['a short row', [QUBITS, [1, 1]], {}, /2 of 6/],
  ])('are refused for %s, and nothing is kept', async (_name, lines, options, message) => {
    const before = await test.app.db.query.returns.findMany()
    await expect(upload('a.csv', text(lines), options)).rejects.toThrow(message)
    expect(await test.app.db.query.returns.findMany()).toHaveLength(before.length)
  })

  it('are listed by assignment, taken out as an array, and come back as they went', async () => {
    const { id } = await upload('a.csv', text([[...QUBITS, 'gauge'], ...ROWS.map((row, r) => [...row, GAUGES[r]])]))
    const asked = { decode: 'discard', limit: 10, feasibleOnly: false } as const
    const rows = await solutionsOf(test.app, test.actor, id, asked)
    // E = 0.25·a + ab + bc: 0.25 − 1 − 1 twice, and −0.25 + 1 + 1.
    expect(rows.map(({ energy, count, violated }) => ({ energy, count, violated }))).toEqual([
      { energy: -1.75, count: 2, violated: null },
      { energy: 1.75, count: 1, violated: null },
    ])
    const array = solutionsNpy(rows)
    expect([...array.slice(-6)].map((byte) => (byte << 24) >> 24)).toEqual([1, -1, 1, -1, -1, -1])
    const view = await returnView(test.app, test.actor, id, 'majority', false)
    expect(view.breaks).toMatchObject({ readsWithBreak: { count: 1, total: 4 }, perRead: [3, 1] })
    expect(view.distinct).toBeGreaterThanOrEqual(2)
    const { bytes } = await samplesFile(test.app, test.actor, id)
    expect(Buffer.from(bytes).toString()).toBe(writeSamplesCsv({ ...packed, gauges: Uint32Array.from(GAUGES) }, QUBITS))
  })

  it('are summed up once, and for returns of before when they are asked for', async () => {
    const { id } = await upload('a.csv', text([QUBITS, ...ROWS]))
    const { row, summary } = await loaded(id)
    expect(row.summaryBlobId).not.toBeNull()
    const { eq } = await import('drizzle-orm')
    const { returns } = await import('../../server/database/schema')
    await test.app.db.update(returns).set({ summaryBlobId: null }).where(eq(returns.id, id))
    const again = await loaded(id)
    expect(again.summary).toEqual(summary)
    expect((await loaded(id)).row.summaryBlobId).not.toBeNull()
  })
})
