import { afterAll, beforeAll, expect, it } from 'vitest'
import { embeddingView } from '../../server/services/embedding-view'
import { startEmbedding } from '../../server/services/embeddings'
import { cancelJob, jobOf } from '../../server/services/jobs'
import { JOB_KINDS } from '../../server/jobs/kinds'
import type { CreateEmbedding, EmbeddingProgress } from '../../shared/schemas/embeddings'
import { createEmbeddingSchema } from '../../shared/schemas/embeddings'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { until } from '../support/server'

/** K_n as a coefficient list. */
const complete = (n: number): string =>
  Array.from({ length: n }, (_, i) => Array.from({ length: i }, (_j, j) => `${j} ${i} 1`).join('\n')).join('\n')

let test: TestApp
beforeAll(async () => {
  test = await startTestApp(2)
})
afterAll(() => test.close())

const request = (input: Record<string, unknown>): CreateEmbedding => createEmbeddingSchema.parse(input)

async function embedded(input: Record<string, unknown>) {
  const { app, actor } = test
  const { id, jobId } = await startEmbedding(app, actor, request(input))
  const job = await test.finished(jobId)
  return { job, view: await embeddingView(app, actor, id) }
}

it('tells the course of a search while it runs, and ends it at the common time limit', async () => {
  const problemId = await test.problem(complete(20))
  const machineId = await test.machine({ kind: 'chimera', m: 8 })
  const { app, actor } = test
  const { id, jobId } = await startEmbedding(
    app,
    actor,
    request({ problemId, machineId, tries: 1000, timeLimitSeconds: 3, objective: 'total qubits' }),
  )
  const detail = await until(async () => {
    const { detail } = await jobOf(app, actor, jobId)
    return (detail as unknown as EmbeddingProgress).running === 2 && (detail as unknown as EmbeddingProgress)
  })
  expect(detail).toMatchObject({ tries: 1000, phase: expect.any(String), method: expect.any(String) })
  const job = await test.finished(jobId)
  expect(job.message).toMatch(/stopped early at the time limit/)
  const { trace } = job.detail as unknown as EmbeddingProgress
  expect(trace.length).toBeGreaterThan(2)
  expect(trace.length).toBeLessThanOrEqual(120)
  expect(trace.map(({ seconds }) => seconds)).toEqual(trace.map(({ seconds }) => seconds).sort((a, b) => a - b))
  const view = await embeddingView(app, actor, id)
  expect(view).toMatchObject({ status: 'found', objective: 'total qubits', chosen: false, start: null })
  expect(view.firstSeconds).toBeGreaterThan(0)
  expect(view.firstSeconds).toBeLessThan(view.seconds!)
  expect(view.stats!.qubitsUsed).toBe(trace.at(-1)!.qubitsUsed)
  const lengths = Object.values(view.chains).map((chain) => chain.length)
  expect(view.stats!.lengthHistogram).toEqual(
    Array.from({ length: Math.max(...lengths) + 1 }, (_, l) => lengths.filter((length) => length === l).length),
  )
  expect(view.stats!.unusedShare).toBeCloseTo(1 - lengths.reduce((sum, length) => sum + length, 0) / 512, 12)
})

it('keeps the best of all tries when it is cancelled', async () => {
  const problemId = await test.problem(complete(12))
  const machineId = await test.machine({ kind: 'chimera', m: 6 })
  const { app, actor } = test
  const { id, jobId } = await startEmbedding(
    app,
    actor,
    request({ problemId, machineId, tries: 1000, timeLimitSeconds: 300 }),
  )
  await until(async () => (await jobOf(app, actor, jobId)).detail.longestChain)
  await cancelJob(app, actor, jobId, JOB_KINDS)
  const job = await test.finished(jobId)
  expect(job).toMatchObject({ status: 'done', message: expect.stringMatching(/stopped early when it was cancelled/) })
  expect(await embeddingView(app, actor, id)).toMatchObject({ status: 'found', valid: true })
})

it('gives the same embedding on one thread and on two, with a target as well', async () => {
  const problemId = await test.problem(complete(9))
  const machineId = await test.machine({ kind: 'chimera', m: 4 })
  const input = { problemId, machineId, seed: 11, tries: 6, timeLimitSeconds: 60 }
  const outcome = async (target: Record<string, number>) => {
    const { view, job } = await embedded({ ...input, target })
    expect(view).toMatchObject({ status: 'found', valid: true })
    const { chains, methodUsed, tryNumber, stats } = view
    return { chains, methodUsed, tryNumber, stats, message: job.message }
  }
  const onTwo = await outcome({})
  // With what the best of all tries has for a target some tries are ended and some never begun.
  const target = { totalQubits: onTwo.stats!.qubitsUsed }
  const onTwoWithTarget = await outcome(target)
  expect(onTwoWithTarget.tryNumber).toBe(onTwo.tryNumber)
  test = await test.restarted(1)
  expect(await outcome({})).toEqual(onTwo)
  expect(await outcome(target)).toEqual(onTwoWithTarget)
})
