import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { JOB_KINDS } from '../../server/jobs/kinds'
import { deleteFor, restore } from '../../server/services/deletions'
import { importEmbedding } from '../../server/services/embedding-import'
import { startEmbedding } from '../../server/services/embeddings'
import { cancelJob, jobOf } from '../../server/services/jobs'
import { handOver } from '../../server/services/review'
import { spinsOf } from '../../server/services/spins'
import { updateRunSheet } from '../../server/database/repositories/run-sheets'
import { startReference } from '../../server/services/reference-start'
import { startRehearsal } from '../../server/services/rehearsals'
import { returnView } from '../../server/services/return-view'
import { createRunSheet, editRunSheet, runSheetRow, runSheetView } from '../../server/services/run-sheets'
import { scansOf, scanView, startScan } from '../../server/services/scans'
import { unpackArrays } from '../../shared/packed-arrays'
import { unpackChainRows } from '../../utils/run-sheet/chains'
import { packedChains } from '../../server/services/run-sheet-chains'
import { createRandom } from '../../shared/engine/random'
import { createEmbeddingSchema } from '../../shared/schemas/embeddings'
import { startReferenceSchema } from '../../shared/schemas/reference'
import { createRunSheetSchema, rehearseSchema } from '../../shared/schemas/run-sheets'
import { scanSchema } from '../../shared/schemas/scans'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { until } from '../support/server'

let test: TestApp
beforeAll(async () => {
  test = await startTestApp(2)
})
afterAll(() => test.close())

/** Twelve variables, all interacting: chains of several qubits on a small machine. */
function denseProblem(sense: 'min' | 'max'): string {
  const random = createRandom(8)
  const lines = [`# form: ising`, `# sense: ${sense}`]
  for (let i = 0; i < 12; i++)
    for (let j = i + 1; j < 12; j++) lines.push(`v${i} v${j} ${(2 * random.below(2) - 1) * (1 + random.below(3))}`)
  return lines.join('\n')
}

const embeddings = new Map<string, Promise<{ problemId: string; embeddingId: string }>>()

async function embed(sense: 'min' | 'max') {
  const problemId = await test.problem(denseProblem(sense))
  const machineId = await test.machine({ kind: 'chimera', m: 4, t: 4 })
  const search = createEmbeddingSchema.parse({ problemId, machineId, seed: 1, tries: 2, timeLimitSeconds: 20 })
  const { id, jobId } = await startEmbedding(test.app, test.actor, search)
  await test.finished(jobId)
  return { problemId, embeddingId: id }
}

async function runSheet(sense: 'min' | 'max' = 'min', settings: Record<string, unknown> = {}) {
  const embedded = embeddings.get(sense) ?? embed(sense)
  embeddings.set(sense, embedded)
  const { problemId, embeddingId } = await embedded
  const sheet = await createRunSheet(test.app, test.actor, createRunSheetSchema.parse({ embeddingId, ...settings }))
  return { problemId, embeddingId, sheetId: sheet.id }
}

const start = (sheetId: string, input: Record<string, unknown>) =>
  startScan(test.app, test.actor, sheetId, scanSchema.parse(input))

async function scanned(sheetId: string, input: Record<string, unknown>) {
  const { id, jobId } = await start(sheetId, input)
  const job = await test.finished(jobId)
  return { job, view: await scanView(test.app, test.actor, id) }
}

describe('a scan over chain strengths', () => {
  it('measures each strength as a rehearsal with it would, and finds the knee between weak and strong', async () => {
    const { problemId, embeddingId, sheetId } = await runSheet()
    const reference = await startReference(test.app, test.actor, problemId, startReferenceSchema.parse({}))
    await test.finished(reference.jobId)
    const scan = { strengths: [16, 1, 4, 8], reads: 300, sweeps: 100, controlError: false, seed: 5 }
    const { job, view } = await scanned(sheetId, scan)
    expect(job.status).toBe('done')
    expect(view.points.map(({ strength }) => strength)).toEqual([1, 4, 8, 16])
    const broken = view.points.map(({ brokenChains }) => brokenChains.mean)
    expect(broken[0]).toBeGreaterThan(0.2)
    expect(broken[3]).toBeLessThan(0.05)
    for (const { brokenChains, success, energy } of view.points) {
      expect(brokenChains.low).toBeLessThanOrEqual(brokenChains.mean)
      expect(brokenChains.high).toBeGreaterThanOrEqual(brokenChains.mean)
      expect(success!.total).toBe(300)
      expect(energy.best).toBeLessThanOrEqual(energy.mean)
    }
    expect(view.knee!.strength).toBeGreaterThan(1)

    const asEntered = createRunSheetSchema.parse({
      embeddingId,
      strength: { rule: 'manual', value: 4 },
    })
    const other = await createRunSheet(test.app, test.actor, asEntered)
    const rehearsal = rehearseSchema.parse({ reads: 300, sweeps: 100, seed: 5 })
    const { returnId, jobId } = await startRehearsal(test.app, test.actor, other.id, rehearsal)
    await test.finished(jobId)
    const rehearsed = await returnView(test.app, test.actor, returnId, 'majority', false)
    expect(view.points[1]!.readsWithBreak.count).toBe(rehearsed.breaks!.readsWithBreak.count)
    expect(view.points[1]!.success!.count).toBe(rehearsed.reference!.success.count)
  })

  it('gives the same twice, whatever the order and the number of threads', async () => {
    const { sheetId } = await runSheet('min', { gauges: 3 })
    const scan = { reads: 90, sweeps: 40, seed: 2 }
    const one = await scanned(sheetId, { ...scan, strengths: [2, 6] })
    const other = await scanned(sheetId, { ...scan, strengths: [6, 3, 2] })
    const figures = ({ view }: typeof one, strength: number) => {
      const { seconds: _, ...point } = view.points.find((point) => point.strength === strength)!
      return point
    }
    for (const strength of [2, 6]) expect(figures(one, strength)).toEqual(figures(other, strength))
  })

  it('shows a maximised problem in its own sense', async () => {
    const [least, most] = [await runSheet('min'), await runSheet('max')]
    const scan = { strengths: [3, 12], reads: 100, sweeps: 60, controlError: false }
    const { view } = await scanned(most.sheetId, scan)
    for (const { energy } of view.points) expect(energy.best).toBeGreaterThanOrEqual(energy.mean)
    expect((await scanned(least.sheetId, scan)).view.points[0]!.energy.mean).toBeLessThan(0)
  })

  it('keeps the points it has when it is cancelled', async () => {
    const { sheetId } = await runSheet()
    const { id, jobId } = await start(sheetId, { strengths: [2, 4, 8], reads: 20_000, sweeps: 2000 })
    await until(async () => (await jobOf(test.app, test.actor, jobId)).status === 'running', 20, 'the start')
    await cancelJob(test.app, test.actor, jobId, JOB_KINDS)
    const job = await test.finished(jobId)
    expect(job.status).toBe('cancelled')
    const view = await scanView(test.app, test.actor, id)
    expect(['ready', 'cancelled']).toContain(view.status)
    expect(view.points.length).toBeLessThan(3)
    expect(view.reason).toMatch(/cancelled/i)
  })

  it('refuses strengths that cannot be programmed, doubled or not positive', async () => {
    const { sheetId } = await runSheet('min', { strength: { rule: 'manual', value: 1 }, scale: 0.2 })
    await expect(start(sheetId, { strengths: [1, 50] })).rejects.toThrow(/Strength 50 cannot be tried/)
    expect(scanSchema.safeParse({ strengths: [2, 2] }).success).toBe(false)
    expect(scanSchema.safeParse({ strengths: [0, 2] }).success).toBe(false)
    expect(scanSchema.safeParse({ strengths: [1] }).success).toBe(false)
  })

  it('is of a run sheet that opens even where its chosen scale no longer fits', async () => {
    const { sheetId } = await runSheet('min', { strength: { rule: 'manual', value: 1 }, scale: 0.2 })
    const row = await runSheetRow(test.app, test.actor, sheetId)
    // As when a repair moves a run sheet to an embedding whose values are larger.
    await updateRunSheet(test.app.db, sheetId, ['draft'], { settings: { ...row.settings, scale: 50 } })
    const view = await runSheetView(test.app, test.actor, sheetId)
    expect(view.checks[0]).toMatchObject({ verdict: 'refused', what: expect.stringContaining('chosen scale 50') })
    expect(view.scale).toBeLessThan(1)
    await expect(handOver(test.app, test.actor, sheetId, 'submit', '')).rejects.toThrow(/chosen scale 50 leaves/)
    await expect(editRunSheet(test.app, test.actor, sheetId, { scale: 40 })).rejects.toThrow(/leave the machine/)
    await editRunSheet(test.app, test.actor, sheetId, { scale: null })
    expect((await runSheetView(test.app, test.actor, sheetId)).checks[0]!.verdict).toBe('passed')
  })

  it('goes with its run sheet, and comes back with it', async () => {
    const { sheetId } = await runSheet()
    const { view } = await scanned(sheetId, { strengths: [2, 8], reads: 20, sweeps: 10 })
    expect((await scansOf(test.app, test.actor, sheetId, { limit: 50 })).items.map(({ id }) => id)).toEqual([view.id])
    await deleteFor(test.app, 'run sheet', sheetId)
    await expect(scanView(test.app, test.actor, view.id)).rejects.toThrow(/no such scan/)
    await restore(test.app, test.actor, 'run sheet', sheetId)
    expect((await scanView(test.app, test.actor, view.id)).number).toBe(1)
  })
})

describe('the spins of a spectrum', () => {
  it('are the variables times the scale, or the qubits of chains as programmed', async () => {
    const { sheetId } = await runSheet('min', { strength: { rule: 'manual', value: 5 } })
    const { scale } = await runSheetView(test.app, test.actor, sheetId)
    const chains = unpackChainRows(unpackArrays(await packedChains(test.app, test.actor, sheetId)))
    const logical = await spinsOf(test.app, test.actor, sheetId, { variables: null, outside: 'left out' })
    expect(logical.names).toHaveLength(12)
    expect(logical.J).toHaveLength(66)
    expect(Math.max(...logical.J.map(Math.abs))).toBeCloseTo(3 * scale, 12)
    const [first] = chains
    const chain = await spinsOf(test.app, test.actor, sheetId, { variables: [first!.label], outside: 'left out' })
    expect(chain.names).toHaveLength(first!.qubits)
    expect(chain.names[0]).toMatch(new RegExp(`^${first!.label} at qubit \\d+$`))
    for (const J of chain.J) expect(J).toBeCloseTo(-5 * scale, 12)
  })

  it('of chains hold the others at the best state that is known, and say which', async () => {
    const problemId = await test.problem('# form: ising\na b 1\nb c -2\nc a 1.5\nc d 1')
    const machineId = await test.machine({ kind: 'chimera', m: 2, t: 4 })
    const chains = { a: [0], b: [4], c: [1, 5], d: [6] }
    const { id: embeddingId } = await importEmbedding(test.app, test.actor, {
      problemId,
      machineId,
      chains,
    })
    const strength = { rule: 'manual', value: 3 }
    const sheet = await createRunSheet(test.app, test.actor, createRunSheetSchema.parse({ embeddingId, strength }))
    const held = { variables: ['c'], outside: 'held' as const }
    await expect(spinsOf(test.app, test.actor, sheet.id, held)).rejects.toThrow(/No state of this problem is known/)

    const rehearsal = await startRehearsal(test.app, test.actor, sheet.id, rehearseSchema.parse({ reads: 50 }))
    await test.finished(rehearsal.jobId)
    const sampled = await spinsOf(test.app, test.actor, sheet.id, held)
    // b and c alike, a against both, d against c: −1 − 2 − 1.5 − 1.
    expect(sampled.held).toEqual({ from: 'the best sample of rehearsal 1', energy: -5.5 })

    const reference = await startReference(test.app, test.actor, problemId, startReferenceSchema.parse({}))
    await test.finished(reference.jobId)
    const known = await spinsOf(test.app, test.actor, sheet.id, held)
    expect(known.held).toEqual({ from: 'the reference optimum, proved', energy: -5.5 })
    const { scale } = await runSheetView(test.app, test.actor, sheet.id)
    // With s_c the spin of c, its neighbours pull with 1.5 s_a − 2 s_b + s_d = −4.5 s_c in all.
    const pull = Math.abs(known.h.reduce((sum, field) => sum + field, 0))
    expect(pull).toBeCloseTo(4.5 * scale, 12)
    const alone = await spinsOf(test.app, test.actor, sheet.id, { variables: ['c'], outside: 'left out' })
    expect(alone.h).toEqual([0, 0])
    expect(alone.held).toBeNull()
  })

  it('are few, and of variables that exist', async () => {
    const { sheetId } = await runSheet()
    const all = Array.from({ length: 12 }, (_, i) => `v${i}`)
    await expect(spinsOf(test.app, test.actor, sheetId, { variables: all, outside: 'left out' })).rejects.toThrow(
      /at most 14/,
    )
    await expect(
      spinsOf(test.app, test.actor, sheetId, { variables: ['v1', 'w'], outside: 'left out' }),
    ).rejects.toThrow(/no variable w/)
  })
})
