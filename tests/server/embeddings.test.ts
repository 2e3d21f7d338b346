import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { importEmbedding } from '../../server/services/embedding-import'
import { embeddingView } from '../../server/services/embedding-view'
import { chooseEmbedding, startEmbedding } from '../../server/services/embeddings'
import { cancelJob, jobOf } from '../../server/services/jobs'
import { calibrateMachine } from '../../server/services/machines'
import { libraryPage } from '../../server/services/library'
import { problemView } from '../../server/services/problem-view'
import { JOB_KINDS } from '../../server/jobs/kinds'
import type { CreateEmbedding, EmbeddingProgress } from '../../shared/schemas/embeddings'
import { createEmbeddingSchema } from '../../shared/schemas/embeddings'
import { libraryQuerySchema } from '../../shared/schemas/library'
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
    request({ problemId, machineId, method: 'search', tries: 1000, timeLimitSeconds: 3, objective: 'total qubits' }),
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
    request({ problemId, machineId, method: 'search', tries: 1000, timeLimitSeconds: 300 }),
  )
  await until(async () => (await jobOf(app, actor, jobId)).detail.longestChain)
  await cancelJob(app, actor, jobId, JOB_KINDS)
  const job = await test.finished(jobId)
  expect(job).toMatchObject({ status: 'done', message: expect.stringMatching(/stopped early when it was cancelled/) })
  expect(await embeddingView(app, actor, id)).toMatchObject({ status: 'found', valid: true })
})

/** A triangle on a 3 × 3 grid: the chain of c joins qubits 3 and 4. */
const TRIANGLE = 'a b 1\nb c 1\na c 1\n'
const CHAINS = { a: [0], b: [1], c: [3, 4] }

async function triangle(): Promise<{ problemId: string; machineId: string; embeddingId: string }> {
  const { app, actor } = test
  const problemId = await test.problem(TRIANGLE)
  const machineId = await test.machine({ kind: 'square', width: 3, height: 3 })
  const { id } = await importEmbedding(app, actor, { problemId, machineId, chains: CHAINS })
  return { problemId, machineId, embeddingId: id }
}

const ask = (input: Record<string, unknown>) => startEmbedding(test.app, test.actor, request(input))
const lose = (machineId: string, qubits: number[]) =>
  calibrateMachine(test.app, test.actor, machineId, { defects: { qubits, couplers: [] }, remark: '' })

describe('an embedding to begin from', () => {
  it('has to be on the same machine, with chains, and share a variable with the problem', async () => {
    const { problemId, machineId, embeddingId } = await triangle()
    const start = { embeddingId, work: 'repair' }
    const otherMachine = await test.machine({ kind: 'square', width: 3, height: 3 })
    await expect(ask({ problemId, machineId: otherMachine, start })).rejects.toMatchObject({
      kind: 'not acceptable',
      code: 'embedding.start-machine',
    })
    const otherProblem = await test.problem('x y 1\n')
    await expect(ask({ problemId: otherProblem, machineId, start })).rejects.toMatchObject({
      code: 'embedding.start-variables',
    })
    const { id: unfinished } = await ask({ problemId, machineId, method: 'search', tries: 1000, timeLimitSeconds: 2 })
    await expect(
      ask({ problemId, machineId, start: { embeddingId: unfinished, work: 'repair' } }),
    ).rejects.toMatchObject({ kind: 'wrong state', code: 'embedding.start-state' })
    await expect(
      ask({ problemId, machineId, start: { embeddingId: 'nowhere', work: 'repair' } }),
    ).rejects.toMatchObject({ kind: 'not found' })
  })

  it('keeps only chains that are there, and never all of them', async () => {
    const { machineId, embeddingId } = await triangle()
    const problemId = await test.problem(`${TRIANGLE}c d 1\n`)
    const frozen = (...labels: string[]) =>
      ask({ problemId, machineId, start: { embeddingId, work: 'repair', frozen: labels } })
    await expect(frozen('a', 'e', 'd')).rejects.toMatchObject({
      code: 'embedding.frozen',
      issues: [
        { path: 'start.frozen.1', message: expect.stringContaining('no variable e') },
        { path: 'start.frozen.2', message: expect.stringContaining('d is new') },
      ],
    })
    const same = await triangle()
    await expect(
      ask({ ...same, start: { embeddingId: same.embeddingId, work: 'shorten', frozen: ['c', 'b', 'a'] } }),
    ).rejects.toMatchObject({ code: 'embedding.frozen-all' })
  })

  it('keeps no chain that a newer calibration broke', async () => {
    const { problemId, machineId, embeddingId } = await triangle()
    await lose(machineId, [4])
    const start = { embeddingId, work: 'repair', frozen: ['a', 'c'] }
    await expect(ask({ problemId, machineId, start })).rejects.toMatchObject({
      code: 'embedding.frozen-broken',
      message: expect.stringMatching(/calibration 2.*qubit 4/),
      issues: [{ path: 'start.frozen.1' }],
    })
    // At the calibration it was made for it may stay.
    await expect(ask({ problemId, machineId, calibration: 1, start })).resolves.toHaveProperty('jobId')
  })
})

/** How many variables have another chain than before. */
const countChanged = (before: Record<string, number[]>, after: Record<string, number[]>): number =>
  Object.entries(after).filter(([label, chain]) => String(chain) !== String(before[label] ?? '')).length

describe('repair', () => {
  it('mends what a newer calibration broke, keeps what must stay and tells what it changed', async () => {
    const { app, actor } = test
    const problemId = await test.problem(complete(6))
    const machineId = await test.machine({ kind: 'chimera', m: 4 })
    const { view: before } = await embedded({ problemId, machineId, tries: 2, timeLimitSeconds: 60 })
    const [broken, kept] = Object.keys(before.chains)
    const lost = before.chains[broken!]![0]!
    await lose(machineId, [lost])
    expect(await embeddingView(app, actor, before.id)).toMatchObject({ holdsAtCurrentCalibration: false })
    const start = { embeddingId: before.id, work: 'repair', frozen: [kept] }
    const { view } = await embedded({ problemId, machineId, tries: 3, timeLimitSeconds: 60, start })
    expect(view).toMatchObject({
      status: 'found',
      calibration: 2,
      holdsAtCurrentCalibration: true,
      method: 'repair',
      methodUsed: 'repair',
      start: { id: before.id, number: before.number, problem: { id: problemId }, work: 'repair', frozen: [kept] },
    })
    expect(view.chains[kept!]).toEqual(before.chains[kept!])
    expect(Object.values(view.chains).flat()).not.toContain(lost)
    expect(view.start!.changed).toBe(countChanged(before.chains, view.chains))
    expect(view.start!.changed).toBeGreaterThan(0)
    expect(view.start!.changed).toBeLessThan(6)
  })

  it('carries chains over to a changed problem by label', async () => {
    const { machineId, embeddingId } = await triangle()
    const changed = await test.problem('d c 1\nc b 1\nb a 1\n')
    const start = { embeddingId, work: 'repair', frozen: ['b', 'c'] }
    const { view } = await embedded({ problemId: changed, machineId, timeLimitSeconds: 60, start })
    expect(view).toMatchObject({ status: 'found', chains: CHAINS, start: { id: embeddingId, changed: 1 } })
    expect(view.chains.d).toHaveLength(1)
    expect(view.start!.problem.id).not.toBe(changed)
  })
})

describe('shortening', () => {
  const LONG = { a: [0], b: [1, 2, 5], c: [3, 4] }

  it('makes chains shorter but those that must stay', async () => {
    const { problemId, machineId } = await triangle()
    const { id: embeddingId } = await importEmbedding(test.app, test.actor, { problemId, machineId, chains: LONG })
    const start = { embeddingId, work: 'shorten' }
    const free = await embedded({ problemId, machineId, timeLimitSeconds: 60, start })
    expect(free.view).toMatchObject({ status: 'found', methodUsed: 'shorten', stats: { qubitsUsed: 4 } })
    const keeping = await embedded({
      problemId,
      machineId,
      timeLimitSeconds: 60,
      start: { ...start, frozen: ['b'] },
    })
    expect(keeping.view).toMatchObject({ status: 'found', chains: { b: LONG.b }, start: { frozen: ['b'] } })
    expect(keeping.view.stats!.qubitsUsed).toBeLessThanOrEqual(6)
  })

  it('begins only from what holds', async () => {
    const { problemId, machineId, embeddingId } = await triangle()
    await lose(machineId, [4])
    await expect(ask({ problemId, machineId, start: { embeddingId, work: 'shorten' } })).rejects.toMatchObject({
      kind: 'not acceptable',
      code: 'embedding.start-broken',
      message: expect.stringMatching(/qubit 4.*Repair it first/),
    })
  })
})

describe('chains edited by hand', () => {
  const save = (input: Parameters<typeof importEmbedding>[2]) => importEmbedding(test.app, test.actor, input)
  const EDITED = { ...CHAINS, b: [1, 2] }

  it('are saved as an embedding of their own, with the one they were edited from', async () => {
    const { problemId, machineId, embeddingId } = await triangle()
    const { id } = await save({ problemId, machineId, editedFrom: embeddingId, chains: EDITED })
    expect(await embeddingView(test.app, test.actor, id)).toMatchObject({
      status: 'found',
      method: 'edited',
      methodUsed: 'edited',
      chains: EDITED,
      calibration: 1,
      calibrationInForce: 1,
      start: { id: embeddingId, work: 'edited', changed: 1, frozen: [] },
    })
    expect((await embeddingView(test.app, test.actor, embeddingId)).chains).toEqual(CHAINS)
  })

  it('are refused with every broken rule, and nothing is saved', async () => {
    const { problemId, machineId, embeddingId } = await triangle()
    const before = (await problemView(test.app, test.actor, problemId)).embeddings.length
    const broken = save({ problemId, machineId, editedFrom: embeddingId, chains: { ...CHAINS, b: [1, 8], c: [3] } })
    await expect(broken).rejects.toMatchObject({
      kind: 'not acceptable',
      code: 'embedding.invalid',
      issues: [
        { path: 'chains.b', message: expect.stringContaining('falls apart') },
        { path: 'chains.b', message: expect.stringContaining('No coupler joins the chains of b and c') },
      ],
    })
    expect((await problemView(test.app, test.actor, problemId)).embeddings).toHaveLength(before)
  })

  it('are checked against the calibration in force', async () => {
    const { problemId, machineId, embeddingId } = await triangle()
    await lose(machineId, [2])
    await expect(save({ problemId, machineId, editedFrom: embeddingId, chains: EDITED })).rejects.toMatchObject({
      code: 'embedding.invalid',
      message: expect.stringMatching(/qubit 2, which is missing/),
    })
    const { id } = await save({ problemId, machineId, editedFrom: embeddingId, chains: CHAINS })
    expect(await embeddingView(test.app, test.actor, id)).toMatchObject({ calibration: 2, start: { changed: 0 } })
    expect(await embeddingView(test.app, test.actor, embeddingId)).toMatchObject({
      calibration: 1,
      calibrationInForce: 2,
    })
  })

  it('come from an embedding of the same problem on the same machine', async () => {
    const { problemId, machineId, embeddingId } = await triangle()
    const otherProblem = await test.problem(TRIANGLE)
    const otherMachine = await test.machine({ kind: 'square', width: 3, height: 3 })
    const asked = { machineId, problemId, editedFrom: embeddingId, chains: CHAINS }
    const refused = { kind: 'not acceptable', code: 'embedding.edited-from' }
    await expect(save({ ...asked, problemId: otherProblem })).rejects.toMatchObject(refused)
    await expect(save({ ...asked, machineId: otherMachine })).rejects.toMatchObject(refused)
    await expect(save({ ...asked, editedFrom: 'nowhere' })).rejects.toMatchObject({ kind: 'not found' })
  })
})

describe('the chosen embedding', () => {
  const choose = (id: string, chosen = true) => chooseEmbedding(test.app, test.actor, id, chosen)
  const chosenOf = async (problemId: string) =>
    (await problemView(test.app, test.actor, problemId)).embeddings.filter(({ chosen }) => chosen).map(({ id }) => id)

  it('is one at most of a problem on a machine', async () => {
    const { app, actor } = test
    const { problemId, machineId, embeddingId } = await triangle()
    const { id: second } = await importEmbedding(app, actor, { problemId, machineId, chains: CHAINS })
    const otherMachine = await test.machine({ kind: 'square', width: 3, height: 3 })
    const { id: elsewhere } = await importEmbedding(app, actor, { problemId, machineId: otherMachine, chains: CHAINS })
    await choose(elsewhere)
    await choose(embeddingId)
    await choose(second)
    expect((await chosenOf(problemId)).sort()).toEqual([elsewhere, second].sort())
    await Promise.all([choose(embeddingId), choose(second), choose(embeddingId)])
    expect(await chosenOf(problemId)).toHaveLength(2)
    await choose(elsewhere, false)
    expect(await chosenOf(problemId)).toHaveLength(1)
    const { items } = await libraryPage(app, actor, libraryQuerySchema.parse({ limit: 1 }))
    expect(items[0]!.embedding!.id).toBe((await chosenOf(problemId))[0])
  })

  it('was found', async () => {
    const { problemId, machineId } = await triangle()
    const { id } = await ask({ problemId, machineId, method: 'search', tries: 1000, timeLimitSeconds: 2 })
    await expect(choose(id)).rejects.toMatchObject({ kind: 'wrong state' })
  })
})

it('tells what stood in the way where none was found', async () => {
  // A cycle of nine on a 3 × 3 grid would visit every qubit once; a grid with an odd number of qubits has no such cycle.
  const problemId = await test.problem(Array.from({ length: 9 }, (_, i) => `v${i} v${(i + 1) % 9} 1`).join('\n'))
  const machineId = await test.machine({ kind: 'square', width: 3, height: 3 })
  const { job, view } = await embedded({ problemId, machineId, tries: 3, timeLimitSeconds: 60 })
  expect(job).toMatchObject({ status: 'done', message: expect.stringMatching(/^None found in 3 tries\. The closest/) })
  expect(view).toMatchObject({
    status: 'none found',
    valid: false,
    chains: {},
    stats: null,
    methodUsed: null,
    tryNumber: null,
    reason: job.message,
    unmet: { proved: false, message: job.message },
  })
  const { overlap, overlappedQubits, variables, unmetInteractions, partialChains } = view.unmet!
  const uses = Object.values(partialChains).flat()
  expect(overlap).toBe(uses.length - new Set(uses).size)
  const shared = overlappedQubits.filter((qubit) => uses.filter((use) => use === qubit).length > 1)
  expect(shared).toEqual(overlappedQubits)
  expect(variables.every((label) => partialChains[label]!.some((qubit) => shared.includes(qubit)))).toBe(true)
  expect(overlap + unmetInteractions).toBeGreaterThan(0)
  expect(view.unmet!.neededQubits).toBeGreaterThanOrEqual(9)
  const { advice } = view.unmet!
  expect(advice.length).toBeGreaterThan(1)
  const named = advice.flatMap((item) => [...item.variables, ...item.interactions.flat()])
  expect(named.every((label) => label in partialChains)).toBe(true)
  for (const [a, b] of advice.flatMap((item) => item.interactions))
    expect([1, 8]).toContain(Math.abs(Number(a.slice(1)) - Number(b.slice(1))))
})

it('lists embeddings with how they were made and what they use', async () => {
  const { problemId, machineId } = await triangle()
  const { view } = await embedded({ problemId, machineId, seed: 5, tries: 2, objective: 'total qubits' })
  const [made, imported] = (await problemView(test.app, test.actor, problemId)).embeddings
  // As many tries of each method that fits.
  expect(view.triesPlanned! % 2).toBe(0)
  expect(view.triesPlanned).toBeGreaterThanOrEqual(view.tryNumber!)
  expect(made).toMatchObject({
    id: view.id,
    machineId,
    method: 'auto',
    methodUsed: view.methodUsed,
    seed: 5,
    seconds: view.seconds,
    objective: 'total qubits',
    chosen: false,
    stats: { qubitsUsed: 4, chainLength: { max: 2, mean: 4 / 3, min: 1 }, unusedShare: 5 / 9 },
  })
  expect(imported).toMatchObject({ method: 'imported', methodUsed: 'imported', objective: 'longest chain' })
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
  const { qubitsUsed, chainLength } = onTwo.stats!
  const target = { longestChain: chainLength.max, totalQubits: qubitsUsed }
  const onTwoWithTarget = await outcome(target)
  expect(onTwoWithTarget.tryNumber).toBe(onTwo.tryNumber)
  test = await test.restarted(1)
  expect(await outcome({})).toEqual(onTwo)
  expect(await outcome(target)).toEqual(onTwoWithTarget)
})
