import { afterEach, expect, it } from 'vitest'
import { Client } from '../support/client'
import { seededFolder } from '../support/folders'
import type { RunningServer } from '../support/server'
import { startServer, until } from '../support/server'

/** A complete graph is slow enough to embed that a kill lands in the middle of the search. */
const complete = (n: number): string => {
  const lines: string[] = []
  for (let i = 0; i < n; i++) for (let j = i + 1; j < n; j++) lines.push(`${i} ${j} 1`)
  return lines.join('\n')
}

let server: RunningServer | undefined
afterEach(() => server?.stop())

interface Job {
  status: string
  attempts: number
  progress: number
}

it('loses nothing when killed during an embedding, and ends the job after the restart', async () => {
  const env = { DEMO: 'true', DATA_DIR: seededFolder() }
  server = await startServer(env)
  let developer = await Client.signedIn(server.url, 'developer')
  const steward = await Client.signedIn(server.url, 'steward')
  const { body: machine } = await steward.post<{ id: string }>('/api/machines', {
    name: 'Large',
    family: { kind: 'chimera', m: 12 },
  })
  const { body: problem } = await developer.upload<{ id: string }>('/api/problems', complete(28), 'k28.txt')
  const { body: started } = await developer.post<{ id: string; jobId: string }>('/api/embeddings', {
    problemId: problem.id,
    machineId: machine.id,
    tries: 1000,
    timeLimitSeconds: 6,
  })
  await until(
    async () => (await developer.get<Job>(`/api/jobs/${started.jobId}`)).body.progress > 0,
    30,
    'progress of the search',
  )
  await server.stop('SIGKILL')

  server = await startServer(env)
  developer = await Client.signedIn(server.url, 'developer')
  const names = (await developer.get<{ items: { id: string; variables: number }[] }>('/api/problems')).body.items
  expect(names.find(({ id }) => id === problem.id)?.variables).toBe(28)
  expect(names).toHaveLength(4)
  const job = await developer.finished(started.jobId, 60)
  expect(job.attempts).toBe(2)
  expect(job.status).toBe('done')
  const { body: embedding } = await developer.get<{ status: string }>(`/api/embeddings/${started.id}`)
  expect(['found', 'none found']).toContain(embedding.status)
})

it('fails a job with the reason when its process died twice under it', async () => {
  const env = { DEMO: 'true', DATA_DIR: seededFolder() }
  server = await startServer(env)
  let developer = await Client.signedIn(server.url, 'developer')
  const { body: problems } = await developer.get<{ items: { id: string; name: string }[] }>('/api/problems')
  const { body: machines } = await developer.get<{ items: { id: string; name: string }[] }>('/api/machines')
  const { body: started } = await developer.post<{ id: string; jobId: string }>('/api/embeddings', {
    problemId: problems.items[0]!.id,
    machineId: machines.items[0]!.id,
    tries: 1000,
    timeLimitSeconds: 300,
  })
  for (let death = 1; death <= 2; death++) {
    await until(
      async () => (await developer.get<Job>(`/api/jobs/${started.jobId}`)).body.status === 'running',
      30,
      'the start of the job',
    )
    await server.stop('SIGKILL')
    server = await startServer(env)
    developer = await Client.signedIn(server.url, 'developer')
  }
  const job = await developer.finished(started.jobId, 30)
  expect(job).toMatchObject({ status: 'failed', attempts: 2 })
  expect(job.message).toMatch(/stopped 2 times/)
  const { body: embedding } = await developer.get<{ status: string; reason: string }>(`/api/embeddings/${started.id}`)
  expect(embedding).toMatchObject({ status: 'failed', reason: job.message })
})

it('cancels a running search and keeps the best', async () => {
  server = await startServer({ DEMO: 'true', DATA_DIR: seededFolder() })
  const developer = await Client.signedIn(server.url, 'developer')
  const { body: problems } = await developer.get<{ items: { id: string; name: string }[] }>('/api/problems')
  const { body: machines } = await developer.get<{ items: { id: string; name: string }[] }>('/api/machines')
  const { body: started } = await developer.post<{ id: string; jobId: string }>('/api/embeddings', {
    problemId: problems.items.find(({ name }) => name.startsWith('Deck'))!.id,
    machineId: machines.items.find(({ name }) => name === 'Alder')!.id,
    tries: 1000,
    timeLimitSeconds: 300,
  })
  type Detailed = { body: { detail: { longestChain: number | null } } }
  await until(
    async () => ((await developer.get(`/api/jobs/${started.jobId}`)) as unknown as Detailed).body.detail.longestChain,
    60,
    'a first embedding',
  )
  await developer.call('DELETE', `/api/jobs/${started.jobId}`)
  const job = await developer.finished(started.jobId, 20)
  expect(job.status).toBe('done')
  expect(job.message).toMatch(/stopped early/)
  const { body } = await developer.get<{ status: string; valid: boolean }>(`/api/embeddings/${started.id}`)
  expect(body).toMatchObject({ status: 'found', valid: true })
})

it('hands a running job back at an orderly stop, without counting the attempt', async () => {
  const env = { DEMO: 'true', DATA_DIR: seededFolder() }
  server = await startServer(env)
  let developer = await Client.signedIn(server.url, 'developer')
  const { body: problems } = await developer.get<{ items: { id: string }[] }>('/api/problems')
  const { body: machines } = await developer.get<{ items: { id: string }[] }>('/api/machines')
  const { body: started } = await developer.post<{ jobId: string }>('/api/embeddings', {
    problemId: problems.items[0]!.id,
    machineId: machines.items[0]!.id,
    tries: 1000,
    timeLimitSeconds: 8,
  })
  await until(
    async () => (await developer.get<Job>(`/api/jobs/${started.jobId}`)).body.status === 'running',
    30,
    'the start of the job',
  )
  await server.stop('SIGTERM')
  const stopped = Date.now()
  server = await startServer(env)
  developer = await Client.signedIn(server.url, 'developer')
  const job = await developer.finished(started.jobId, 60)
  expect(job).toMatchObject({ status: 'done', attempts: 1 })
  expect(Date.parse(job.startedAt)).toBeGreaterThan(stopped)
})
