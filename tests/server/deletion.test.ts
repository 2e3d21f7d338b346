import { rmSync } from 'node:fs'
import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import type { App } from '../../server/app'
import type { Database } from '../../server/database/client'
import { migrate, openDatabase } from '../../server/database/client'
import { createBlobStore } from '../../server/database/repositories/blobs'
import { findEmbedding, insertEmbedding, updateEmbedding } from '../../server/database/repositories/embeddings'
import { claimJob, findJob, insertJob } from '../../server/database/repositories/jobs'
import { insertMachine } from '../../server/database/repositories/machines'
import { countThings, insertMembership, insertUser, insertWorkspace } from '../../server/database/repositories/people'
import { findProblem, insertProblem } from '../../server/database/repositories/problems'
import {
  findReturn,
  findRunSheet,
  insertReturn,
  insertRunSheet,
  updateRunSheet,
} from '../../server/database/repositories/run-sheets'
import { blobs as blobTable, embeddings, problems, returns, runSheets } from '../../server/database/schema'
import { restore, sweepDeletions } from '../../server/services/deletions'
import { removeEmbedding } from '../../server/services/embeddings'
import { libraryPage } from '../../server/services/library'
import { removeProblem } from '../../server/services/problems'
import { removeRunSheet, runSheetsOf } from '../../server/services/run-sheets'
import { libraryQuerySchema } from '../../shared/schemas/library'
import { emptyFolder } from '../support/folders'

const folder = emptyFolder()
let later = 0
/** The clock, which the tests put forward. */
const now = (): Date => new Date(Date.now() + later)
const actor = { userId: 'u', workspaceId: 'w' }
let database: Database
let app: App
let round = 0

const MINUTE = 60_000
const LIST = { limit: 50 }
const LIBRARY = libraryQuerySchema.parse({})

beforeAll(async () => {
  database = await openDatabase({ dataFolder: folder })
  await migrate(database)
  const { db } = database
  app = { database, db, blobs: createBlobStore(database, now), now, version: '0', demo: false } as unknown as App
  await insertWorkspace(db, { id: 'w', name: 'W', createdAt: now() })
  await insertUser(db, { id: 'u', name: 'U', email: 'u@example.org', passwordHash: '-', createdAt: now() })
  await insertMembership(db, { ...actor, roles: ['owner'], createdAt: now() })
  await insertMachine(db, {
    id: 'm',
    workspaceId: 'w',
    name: 'M',
    family: { kind: 'king', width: 2, height: 2 },
    calibration: 1,
    createdBy: 'u',
    createdAt: now(),
    changedAt: now(),
  })
})
afterAll(async () => {
  await database.close()
  rmSync(folder, { recursive: true })
})

let problemId: string
let embeddingId: string
let sheetId: string
let returnId: string
let jobId: string
let dataBlobId: string
let samplesBlobId: string

const blobsLeft = async (): Promise<string[]> => (await app.db.select().from(blobTable)).map(({ id }) => id)

beforeEach(async () => {
  const { db, blobs } = app
  await db.delete(problems)
  round++
  later = 0
  ;[problemId, embeddingId, sheetId, returnId, jobId] = ['p', 'e', 's', 'r', 'j'].map((kind) => kind + round) as [
    string,
    string,
    string,
    string,
    string,
  ]
  dataBlobId = await blobs.write(Uint8Array.of(1))
  await blobs.adopt(db, dataBlobId)
  samplesBlobId = await blobs.write(Uint8Array.of(2))
  await blobs.adopt(db, samplesBlobId)
  const at = now()
  await insertProblem(
    db,
    { id: problemId, workspaceId: 'w', number: round, name: 'P', createdBy: 'u', createdAt: at, changedAt: at },
    {
      form: 'qubo',
      sense: 'min',
      variables: 1,
      interactions: 0,
      dataBlobId,
      fingerprint: '-',
      source: { fileName: 'p.csv', bytes: 1, sha256: '-' },
      reading: {} as never,
      structure: { density: 0 } as never,
      versionBy: 'u',
      versionAt: at,
    },
  )
  await insertEmbedding(db, {
    id: embeddingId,
    workspaceId: 'w',
    problemId,
    machineId: 'm',
    calibration: 1,
    number: 1,
    status: 'running',
    method: 'search',
    seed: 1,
    tries: 1,
    timeLimitSeconds: 1,
    version: '0',
    createdBy: 'u',
    createdAt: now(),
  })
  await insertJob(db, { id: jobId, workspaceId: 'w', kind: 'embedding', subjectId: embeddingId, createdBy: 'u' }, now())
  await insertRunSheet(db, {
    id: sheetId,
    workspaceId: 'w',
    embeddingId,
    number: round,
    name: 'S',
    state: 'draft',
    settings: { reads: 1 } as never,
    machineTimeMilliseconds: 1,
    preparedBy: 'u',
    createdAt: now(),
    changedAt: now(),
  })
  await insertReturn(db, {
    id: returnId,
    workspaceId: 'w',
    runSheetId: sheetId,
    embeddingId,
    number: 1,
    source: 'upload',
    status: 'ready',
    made: {},
    settings: {} as never,
    samplesBlobId,
    reads: 1,
    version: '0',
    createdBy: 'u',
    createdAt: now(),
  })
})

/** The four rows of this round, as they are stored. */
async function stored() {
  const { db } = app
  return {
    problem: (await db.select().from(problems).where(eq(problems.id, problemId)))[0],
    embedding: (await db.select().from(embeddings).where(eq(embeddings.id, embeddingId)))[0],
    sheet: (await db.select().from(runSheets).where(eq(runSheets.id, sheetId)))[0],
    samples: (await db.select().from(returns).where(eq(returns.id, returnId)))[0],
  }
}

const numbersListed = async (): Promise<number[]> => [
  ...(await libraryPage(app, actor, LIBRARY)).items.map(({ number }) => number),
  ...(await runSheetsOf(app, actor, LIST)).items.map(({ number }) => number),
]

describe('while a deletion can be undone', () => {
  it('a problem is out of sight with everything on it, for its own workspace too', async () => {
    const { restorableUntil } = await removeProblem(app, actor, problemId)
    expect(new Date(restorableUntil).getTime() - now().getTime()).toBeGreaterThan(MINUTE / 2)
    expect(await numbersListed()).not.toContain(round)
    expect(await findProblem(app.db, 'w', problemId)).toBeUndefined()
    expect(await findEmbedding(app.db, 'w', embeddingId)).toBeUndefined()
    expect(await findRunSheet(app.db, 'w', sheetId)).toBeUndefined()
    expect(await findReturn(app.db, 'w', returnId)).toBeUndefined()
    expect(await countThings(app.db, 'w')).toMatchObject({ problems: 0, runSheets: 0 })
    await expect(removeProblem(app, actor, problemId)).rejects.toMatchObject({ kind: 'not found' })
  })

  it('restoring brings back every row and every array as it was', async () => {
    const before = await stored()
    await removeProblem(app, actor, problemId)
    await sweepDeletions(app)
    await restore(app, actor, 'problem', problemId)
    expect(await stored()).toEqual(before)
    expect(await numbersListed()).toEqual([round, round])
    expect(await app.blobs.read(dataBlobId)).toEqual(Uint8Array.of(1))
    expect(await app.blobs.read(samplesBlobId)).toEqual(Uint8Array.of(2))
  })

  it('jobs work on, and what they bring is there after the undo', async () => {
    await claimJob(app.db, jobId, 'worker', now())
    await removeProblem(app, actor, problemId)
    expect(await findJob(app.db, jobId)).toMatchObject({ status: 'running', cancelRequested: false })
    expect(await updateEmbedding(app.db, embeddingId, { status: 'found' })).toBe(true)
    await restore(app, actor, 'problem', problemId)
    expect(await findEmbedding(app.db, 'w', embeddingId)).toMatchObject({ status: 'found' })
  })

  it('a run sheet deleted before its problem stays deleted when the problem comes back, and can follow', async () => {
    await removeRunSheet(app, actor, sheetId)
    await removeProblem(app, actor, problemId)
    await expect(restore(app, actor, 'run sheet', sheetId)).rejects.toMatchObject({ kind: 'wrong state' })
    await restore(app, actor, 'problem', problemId)
    expect(await findRunSheet(app.db, 'w', sheetId)).toBeUndefined()
    expect(await findEmbedding(app.db, 'w', embeddingId)).toBeDefined()
    await restore(app, actor, 'run sheet', sheetId)
    expect(await findReturn(app.db, 'w', returnId)).toBeDefined()
  })

  it('an embedding goes and comes with its drafts, and leaves its problem alone', async () => {
    await removeEmbedding(app, actor, embeddingId)
    expect(await numbersListed()).toEqual([round])
    expect(await findRunSheet(app.db, 'w', sheetId)).toBeUndefined()
    await restore(app, actor, 'embedding', embeddingId)
    expect(await findRunSheet(app.db, 'w', sheetId)).toBeDefined()
  })

  it('nobody of another workspace brings it back, and nothing that was not deleted', async () => {
    await expect(restore(app, actor, 'problem', problemId)).rejects.toMatchObject({ kind: 'not found' })
    await removeProblem(app, actor, problemId)
    const stranger = { ...actor, workspaceId: 'other' }
    await expect(restore(app, stranger, 'problem', problemId)).rejects.toMatchObject({ kind: 'not found' })
    await expect(restore(app, actor, 'embedding', embeddingId)).rejects.toMatchObject({ kind: 'not found' })
  })
})

it('an embedding stays once a run sheet on it was handed over', async () => {
  await updateRunSheet(app.db, sheetId, ['draft'], { state: 'approved' })
  await expect(removeEmbedding(app, actor, embeddingId)).rejects.toMatchObject({ code: 'embedding.kept' })
  expect(await findEmbedding(app.db, 'w', embeddingId)).toBeDefined()
})

describe('once the time is over', () => {
  beforeEach(async () => {
    await removeProblem(app, actor, problemId)
    later = 2 * MINUTE
  })

  it('it cannot be restored, even before it is swept', async () => {
    await expect(restore(app, actor, 'problem', problemId)).rejects.toMatchObject({ code: 'deletion.final' })
  })

  it('the sweep takes the rows and their stored arrays', async () => {
    const kept = await app.blobs.write(Uint8Array.of(3))
    await app.blobs.adopt(app.db, kept)
    await sweepDeletions(app)
    expect(Object.values(await stored())).toEqual([undefined, undefined, undefined, undefined])
    const left = await blobsLeft()
    expect(left).toContain(kept)
    expect(left).not.toContain(dataBlobId)
    expect(left).not.toContain(samplesBlobId)
  })

  it('the sweep ends a waiting job, and leaves the jobs of others alone', async () => {
    const other = `other${round}`
    const job = { id: other, workspaceId: 'w', kind: 'embedding', subjectId: 'x', createdBy: 'u' } as const
    await insertJob(app.db, job, now())
    await sweepDeletions(app)
    expect(await findJob(app.db, jobId)).toMatchObject({ status: 'cancelled', cancelRequested: true })
    expect(await findJob(app.db, other)).toMatchObject({ status: 'waiting', cancelRequested: false })
  })

  it('the sweep asks a running job to stop, and what it then brings finds no row to be kept in', async () => {
    await claimJob(app.db, jobId, 'worker', now())
    await sweepDeletions(app)
    expect(await findJob(app.db, jobId)).toMatchObject({ status: 'running', cancelRequested: true })
    expect(await updateEmbedding(app.db, embeddingId, { status: 'found' })).toBe(false)
  })
})

it('a run sheet is swept for good even while its problem can still come back', async () => {
  await removeRunSheet(app, actor, sheetId)
  later = MINUTE - 1000
  await removeProblem(app, actor, problemId)
  later = MINUTE + 1000
  await sweepDeletions(app)
  await restore(app, actor, 'problem', problemId)
  const { sheet, samples, embedding } = await stored()
  expect([sheet, samples]).toEqual([undefined, undefined])
  expect(embedding).toMatchObject({ deletedAt: null, deletedWith: null })
  expect(await blobsLeft()).not.toContain(samplesBlobId)
})
