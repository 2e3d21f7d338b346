import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { cancelJob, jobOf } from '../../server/services/jobs'
import { referenceFile, referencesOf, referenceView } from '../../server/services/reference-view'
import { startReference } from '../../server/services/reference-start'
import { problemData, problemRow } from '../../server/services/problems'
import { referenceOfSamples } from '../../server/services/return-reference'
import { JOB_KINDS } from '../../server/jobs/kinds'
import { toIsing } from '../../shared/engine/problem/convert'
import { createRandom } from '../../shared/engine/random'
import type { ReferenceProgress } from '../../shared/schemas/reference'
import { startReferenceSchema } from '../../shared/schemas/reference'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { until } from '../support/server'

let test: TestApp
beforeAll(async () => {
  test = await startTestApp(2)
})
afterAll(() => test.close())

/** A coefficient list of n variables, each pair interacting with the given probability, and its terms. */
function randomTerms(n: number, density: number, seed: number, first = 0): [number, number, number][] {
  const random = createRandom(seed)
  const terms: [number, number, number][] = []
  for (let i = 0; i < n; i++)
    for (let j = i; j < n; j++)
      if (i === j || random.float() < density) terms.push([first + i, first + j, random.below(21) - 10])
  return terms
}
const textOf = (terms: readonly [number, number, number][]): string => terms.map((term) => term.join(' ')).join('\n')

const energyOf = (terms: readonly [number, number, number][], state: Record<string, number>): number =>
  terms.reduce((sum, [i, j, value]) => sum + value * state[i]! * state[j]!, 0)

const start = (problemId: string, input: Record<string, unknown> = {}) =>
  startReference(test.app, test.actor, problemId, startReferenceSchema.parse(input))

async function solved(problemId: string, input: Record<string, unknown> = {}) {
  const { jobId } = await start(problemId, input)
  const job = await test.finished(jobId)
  return { job, view: await referenceView(test.app, test.actor, problemId) }
}

describe('a problem of 40 variables', () => {
  const terms = randomTerms(40, 0.12, 3)

  it('has the same proved optimum by dynamic programming and by the integer programme', async () => {
    const problemId = await test.problem(textOf(terms))
    const { job, view } = await solved(problemId)
    expect(job.status).toBe('done')
    expect(view).toMatchObject({ status: 'proved', method: 'tree decomposition', tolerance: 0, gap: 0, reason: null })
    expect(view.bound).toBe(view.energy)
    expect(energyOf(terms, view.state)).toBe(view.energy)
    const again = await test.problem(textOf(terms))
    const programme = await solved(again, { method: 'integer programme' })
    expect(programme.view).toMatchObject({ status: 'proved', method: 'integer programme', energy: view.energy })
    expect(energyOf(terms, programme.view.state)).toBe(view.energy)
    const annealed = await solved(again, { method: 'annealing' })
    // The newest look proves nothing; the proved value stays the one that counts.
    expect(annealed.view.method).toBe('integer programme')
    const { items } = await referencesOf(test.app, test.actor, again, { limit: 50 })
    expect(items.map(({ status }) => status)).toEqual(['best found', 'proved'])
    expect(items[0]!.energy).toBe(view.energy)
  })

  it('gives the same twice, and its state as a file', async () => {
    const problemId = await test.problem(textOf(terms))
    const first = await solved(problemId, { seed: 7, method: 'annealing' })
    const second = await solved(problemId, { seed: 7, method: 'annealing' })
    expect(second.view.values).toEqual(first.view.values)
    const { text } = await referenceFile(test.app, test.actor, problemId)
    const lines = text.trim().split('\n').slice(1)
    expect(lines.map((line) => Number(line.split(',')[1]))).toEqual(first.view.values)
    for (const line of lines) {
      const [label, value] = line.split(',')
      expect(first.view.state[label!]).toBe(Number(value))
    }
  })
})

it('puts components together that are solved in different ways, in the sense of the problem', async () => {
  const small = randomTerms(6, 1, 5)
  const middle = randomTerms(26, 1, 6, 10)
  const terms: [number, number, number][] = [...small, ...middle, [50, 50, 4], [51, 51, -4]]
  const file = `# sense: max\n${textOf(terms)}`
  const problemId = await test.problem(file)
  const { view } = await solved(problemId)
  expect(view.status).toBe('proved')
  expect(view.isolated).toBe(2)
  expect(view.parts.map(({ variables, method }) => [variables, method])).toEqual([
    [26, 'enumeration'],
    [6, 'enumeration'],
  ])
  expect([view.state[50], view.state[51]]).toEqual([1, 0])
  expect(energyOf(terms, view.state)).toBe(view.energy)
  let best = -Infinity
  for (let code = 0; code < 64; code++) {
    const state = Object.fromEntries(Array.from({ length: 6 }, (_, i) => [i, (code >> i) & 1]))
    best = Math.max(best, energyOf(small, state))
  }
  expect(energyOf(small, view.state)).toBe(best)
  expect(view.optima).toBeGreaterThan(0)
  expect(view.up!.total).toBe(view.values.filter((value) => value === 1).length)
})

describe('a problem that takes long', () => {
  const hard = textOf(randomTerms(60, 1, 9))

  it('tells where it stands, refuses a second look, and keeps the best when it is stopped', async () => {
    const problemId = await test.problem(hard)
    await expect(referenceView(test.app, test.actor, problemId)).rejects.toMatchObject({
      kind: 'not found',
      code: 'reference.none',
      message: expect.stringContaining('Nobody has looked for it yet'),
    })
    const { jobId } = await start(problemId, { timeLimitSeconds: 600 })
    const standing = await until(async () => {
      const { detail } = await jobOf(test.app, test.actor, jobId)
      const progress = detail as unknown as ReferenceProgress
      return progress.best !== undefined && /integer programme/.test(progress.doing) && progress
    }, 60)
    expect(standing.best).toBeLessThan(0)
    expect(standing.bound).toBeLessThan(standing.best!)
    await expect(start(problemId)).rejects.toMatchObject({ kind: 'wrong state', code: 'reference.running' })
    await cancelJob(test.app, test.actor, jobId, JOB_KINDS)
    await test.finished(jobId)
    const view = await referenceView(test.app, test.actor, problemId)
    expect(view).toMatchObject({
      status: 'best found',
      energy: standing.best,
      reason: expect.stringContaining('Stopped before it was proved'),
    })
    expect(view.bound).toBeLessThan(view.energy!)
    expect(view.gap).toBe(view.energy! - view.bound!)
  })

  it('ends at the time limit with a bound', async () => {
    const { view } = await solved(await test.problem(hard), { timeLimitSeconds: 3 })
    expect(view).toMatchObject({ status: 'best found', reason: expect.stringMatching(/time limit of 3.s/) })
    expect(view.bound).toBeLessThan(view.energy!)
  })

  it('refuses a method that it is too large for', async () => {
    const problemId = await test.problem(hard)
    await expect(start(problemId, { method: 'enumeration' })).rejects.toMatchObject({
      kind: 'not acceptable',
      code: 'reference.method',
    })
    expect((await referencesOf(test.app, test.actor, problemId, { limit: 50 })).items).toEqual([])
  })
})

it('holds decoded reads against the best known value of the version that was programmed', async () => {
  // At most one of the two: −1 at best, by two states.
  const problemId = await test.problem('# sense: max\na a 1\nb b 1\na b -2\n')
  const problem = await problemRow(test.app, test.actor, problemId)
  const ising = toIsing((await problemData(test.app, problem)).problem)
  const against = (energies: number[]) =>
    referenceOfSamples(
      test.app,
      { problem, ising },
      { energies: Float64Array.from(energies), counts: Uint32Array.from(energies, (_, k) => k + 1) },
    )
  expect(await against([0, -1])).toBeNull()
  const { view } = await solved(problemId)
  expect(view).toMatchObject({ energy: 1, optima: 2, status: 'proved' })
  expect(await against([0, -1, 0])).toMatchObject({
    energy: 1,
    proved: true,
    gap: 0,
    success: { count: 2, total: 6, rate: 2 / 6 },
  })
  expect(await against([0, 0])).toMatchObject({ gap: 1, success: { count: 0, total: 3 } })
  expect(await against([])).toMatchObject({ gap: null, success: { count: 0, total: 0 } })
})

it('is taken up again after a restart', async () => {
  const problemId = await test.problem(textOf(randomTerms(60, 1, 10)))
  const { jobId } = await start(problemId, { timeLimitSeconds: 8 })
  const before = await until(async () => {
    const job = await jobOf(test.app, test.actor, jobId)
    return job.detail.best ? job : undefined
  }, 60)
  test = await test.restarted(2)
  const job = await test.finished(jobId)
  expect(job).toMatchObject({ status: 'done' })
  expect(job.startedAt!.getTime()).toBeGreaterThan(Date.parse(before.startedAt!))
  expect(await referenceView(test.app, test.actor, problemId)).toMatchObject({ status: 'best found' })
})

it('says what a look that was cancelled before it began left behind', async () => {
  const busy = await Promise.all([0, 1].map((seed) => test.problem(textOf(randomTerms(60, 1, 20 + seed)))))
  const jobs = await Promise.all(busy.map((problemId) => start(problemId, { timeLimitSeconds: 300 })))
  await until(async () => {
    const views = await Promise.all(jobs.map(({ jobId }) => jobOf(test.app, test.actor, jobId)))
    return views.every(({ status }) => status === 'running')
  })
  const problemId = await test.problem('a b 1\n')
  const { jobId } = await start(problemId)
  await cancelJob(test.app, test.actor, jobId, JOB_KINDS)
  await expect(referenceView(test.app, test.actor, problemId)).rejects.toMatchObject({
    message: expect.stringContaining('was cancelled before'),
  })
  for (const { jobId: running } of jobs) await cancelJob(test.app, test.actor, running, JOB_KINDS)
  for (const { jobId: running } of jobs) await test.finished(running)
})
