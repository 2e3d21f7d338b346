import { rmSync } from 'node:fs'
import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest'
import type { App } from '../../server/app'
import type { Database } from '../../server/database/client'
import { migrate, openDatabase } from '../../server/database/client'
import { createBlobStore } from '../../server/database/repositories/blobs'
import { insertEmbedding, updateEmbedding } from '../../server/database/repositories/embeddings'
import { claimJob, findJob, insertJob } from '../../server/database/repositories/jobs'
import { insertMachine } from '../../server/database/repositories/machines'
import { insertMembership, insertUser, insertWorkspace } from '../../server/database/repositories/people'
import { insertProblem } from '../../server/database/repositories/problems'
import { blobs as blobTable } from '../../server/database/schema'
import { removeProblem } from '../../server/services/problems'
import { temporaryFolder } from '../support/server'

const folder = temporaryFolder()
const now = (): Date => new Date()
const actor = { userId: 'u', workspaceId: 'w' }
let database: Database
let app: App
let round = 0

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
let jobId: string
let dataBlobId: string

beforeEach(async () => {
  const { db, blobs } = app
  round++
  ;[problemId, embeddingId, jobId] = [`p${round}`, `e${round}`, `j${round}`]
  dataBlobId = await blobs.write(Uint8Array.of(1))
  await blobs.adopt(db, dataBlobId)
  await insertProblem(db, {
    id: problemId,
    workspaceId: 'w',
    number: round,
    name: 'P',
    form: 'qubo',
    sense: 'min',
    variables: 1,
    interactions: 0,
    dataBlobId,
    fingerprint: '-',
    source: { fileName: 'p.csv', bytes: 1, sha256: '-' },
    reading: {} as never,
    structure: {} as never,
    createdBy: 'u',
    createdAt: now(),
    changedAt: now(),
  })
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
})

it('ends a waiting job with the problem it works on', async () => {
  await removeProblem(app, actor, problemId)
  expect(await findJob(app.db, jobId)).toMatchObject({ status: 'cancelled', cancelRequested: true })
})

it('asks a running job to stop, and what it then brings finds no row to be kept in', async () => {
  await claimJob(app.db, jobId, 'worker', now())
  await removeProblem(app, actor, problemId)
  expect(await findJob(app.db, jobId)).toMatchObject({ status: 'running', cancelRequested: true })
  expect(await updateEmbedding(app.db, embeddingId, { status: 'found' })).toBe(false)
})

it('leaves the jobs of other problems alone, and removes the blobs', async () => {
  await insertJob(app.db, { id: 'other', workspaceId: 'w', kind: 'embedding', subjectId: 'x', createdBy: 'u' }, now())
  await removeProblem(app, actor, problemId)
  expect(await findJob(app.db, 'other')).toMatchObject({ status: 'waiting', cancelRequested: false })
  expect(await app.db.select().from(blobTable).where(eq(blobTable.id, dataBlobId))).toEqual([])
})
