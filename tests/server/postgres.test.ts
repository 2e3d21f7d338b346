import pg from 'pg'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { Client } from '../support/client'
import { startPostgres } from '../support/postgres'
import type { RunningServer } from '../support/server'
import { startServer, startWorker, temporaryFolder, until } from '../support/server'

let postgres: Awaited<ReturnType<typeof startPostgres>>
let server: RunningServer
let pool: pg.Pool
const workers: ReturnType<typeof startWorker>[] = []

beforeAll(async () => {
  postgres = await startPostgres()
  pool = new pg.Pool({ connectionString: postgres.url })
  // The web process seeds the demo with its own workers, then is replaced by one that leaves jobs to others.
  const env = { DEMO: 'true', DATABASE_URL: postgres.url, DATA_DIR: temporaryFolder() }
  const seeding = await startServer(env)
  await Client.signedIn(seeding.url, 'developer')
  await seeding.stop()
  server = await startServer({ ...env, JOBS: '0' })
  for (let n = 0; n < 2; n++) workers.push(startWorker({ DATABASE_URL: postgres.url, JOBS: '1' }))
  await until(() => workers.every((worker) => worker.output().includes('takes jobs')), 60, 'two workers')
})
afterAll(async () => {
  await Promise.all(workers.map((worker) => worker.stop('SIGKILL')))
  await server?.stop()
  await pool?.end()
  await postgres?.stop()
})

it('shares the queue between two workers and redoes the job of a killed one once', async () => {
  const developer = await Client.signedIn(server.url, 'developer')
  const problems = (await developer.get<{ items: { id: string; name: string }[] }>('/api/problems')).body.items
  const machines = (await developer.get<{ items: { id: string; name: string }[] }>('/api/machines')).body.items
  const start = async () =>
    (
      await developer.post<{ id: string; jobId: string }>('/api/embeddings', {
        problemId: problems.find(({ name }) => name.startsWith('Deck'))!.id,
        machineId: machines.find(({ name }) => name === 'Alder')!.id,
        tries: 1000,
        timeLimitSeconds: 10,
      })
    ).body
  const jobs = [await start(), await start()]
  type Row = { id: string; worker: string; status: string }
  const rows = async (): Promise<Row[]> =>
    (await pool.query<Row>('select id, worker, status from jobs where id = any($1)', [jobs.map(({ jobId }) => jobId)]))
      .rows
  const running = await until(
    async () => {
      const found = await rows()
      return found.every(({ status }) => status === 'running') && found
    },
    30,
    'both jobs running',
  )
  expect(new Set(running.map(({ worker }) => worker)).size).toBe(2)

  await workers[0]!.stop('SIGKILL')
  const ends = await Promise.all(jobs.map(({ jobId }) => developer.finished(jobId, 90)))
  expect(ends.map(({ status }) => status)).toEqual(['done', 'done'])
  expect(ends.map(({ attempts }) => attempts).sort()).toEqual([1, 2])
  for (const { id } of jobs) {
    const { body } = await developer.get<{ status: string; valid: boolean }>(`/api/embeddings/${id}`)
    expect(body).toMatchObject({ status: 'found', valid: true })
  }
})
