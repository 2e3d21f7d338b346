import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { findReturnOfJob } from '../../server/database/repositories/run-sheets'
import { JOB_KINDS } from '../../server/jobs/kinds'
import { capacityCard, measureCapacity } from '../../server/services/capacity-measurements'
import { startEmbedding } from '../../server/services/embeddings'
import { cancelJob, jobOf } from '../../server/services/jobs'
import { breaksCsv, machineBreaks } from '../../server/services/machine-breaks'
import { machineUse } from '../../server/services/machine-use'
import { calibrateMachine } from '../../server/services/machines'
import { programmeBench, requireProgrammed } from '../../server/services/programming'
import { startRehearsal } from '../../server/services/rehearsals'
import { returnView } from '../../server/services/return-view'
import { uploadReturn } from '../../server/services/returns'
import { asStoredFile } from '../../server/services/stored-files'
import { benchOf, createRunSheet, runSheetRow } from '../../server/services/run-sheets'
import { writeSamplesCsv } from '../../shared/engine/readout/files/write-csv'
import { createEmbeddingSchema } from '../../shared/schemas/embeddings'
import { measureCapacitySchema } from '../../shared/schemas/machine-use'

import { uploadReturnSchema } from '../../shared/schemas/returns'
import { createRunSheetSchema, rehearseSchema } from '../../shared/schemas/run-sheets'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { until } from '../support/server'

let test: TestApp
beforeAll(async () => {
  test = await startTestApp(2)
})
afterAll(() => test.close())

const terms = Array.from({ length: 8 }, (_, i) =>
  Array.from({ length: 8 - i }, (_, k) => `${i} ${i + k} ${((3 * i + 5 * k) % 7) - 3 || 1}`),
).flat()

/** A complete problem on a small machine with samples of weak chains, uploaded. */
async function returnedOn(machineId: string) {
  const { app, actor } = test
  const problemId = await test.problem(terms.join('\n'))
  const search = createEmbeddingSchema.parse({ problemId, machineId, seed: 3, tries: 1, timeLimitSeconds: 20 })
  const { id: embeddingId, jobId } = await startEmbedding(app, actor, search)
  await test.finished(jobId)
  const settings = { embeddingId, strength: { rule: 'manual', value: 1 }, reads: 200 }
  const sheet = await createRunSheet(app, actor, createRunSheetSchema.parse(settings))
  const row = await runSheetRow(app, actor, sheet.id)
  const bench = await benchOf(app, actor, row)
  const programmed = requireProgrammed(programmeBench(bench, row.settings))
  const samples = await app.compute.run('rehearse', {
    programmed,
    gauge: null,
    error: null,
    sweeps: 8,
    method: { model: 'simulated annealing', temperature: 1.5, arithmetic: '64-bit' },
    firstRead: 0,
    reads: 200,
    seed: 1,
  })
  const csv = writeSamplesCsv(
    samples,
    Array.from(programmed.qubits, (q) => bench.machine.fabric.ids[q]!),
  )
  const bytes = Buffer.from(csv)
  const returned = await asStoredFile('samples.csv', bytes, (file) =>
    uploadReturn(app, actor, sheet.id, file, uploadReturnSchema.parse({})),
  )
  return { embeddingId, sheetId: sheet.id, returnId: returned.id }
}

describe('breaks by part', () => {
  it('agree with those of the return, are kept with it, and leave rehearsals out unless asked', async () => {
    const { app, actor } = test
    const machineId = await test.machine({ kind: 'chimera', m: 4 })
    const { returnId, sheetId, embeddingId } = await returnedOn(machineId)
    const breaks = await machineBreaks(app, actor, machineId, { rehearsals: false })
    expect(breaks).toMatchObject({ calibration: 1, embeddings: 1, reads: 200, leftOut: 0 })
    expect(breaks.returns).toMatchObject([{ id: returnId, embedding: { id: embeddingId }, source: 'upload' }])
    const view = await returnView(app, actor, returnId, 'majority', false)
    const broken = breaks.couplers.filter(({ count }) => count > 0)
    expect(broken.length).toBeGreaterThan(0)
    const counts = (rows: readonly { a: number; b: number; count: number }[]) =>
      rows.map(({ a, b, count }) => `${a}-${b} ${count}`).sort()
    expect(counts(broken)).toEqual(counts(view.breaks!.couplers))
    const kept = await findReturnOfJob(app.db, returnId)
    expect(kept!.breaksBlobId).not.toBeNull()
    expect(await machineBreaks(app, actor, machineId, { rehearsals: false })).toEqual(breaks)

    const { jobId } = await startRehearsal(app, actor, sheetId, rehearseSchema.parse({ reads: 50 }))
    await test.finished(jobId)
    expect(await machineBreaks(app, actor, machineId, { rehearsals: false })).toEqual(breaks)
    expect(await machineBreaks(app, actor, machineId, { rehearsals: true })).toMatchObject({
      reads: 250,
      embeddings: 1,
    })

    const lines = breaksCsv(breaks).trim().split('\n')
    expect(lines).toHaveLength(1 + breaks.qubits.length + breaks.couplers.length)
    expect(new Set(lines.map((line) => line.split(',').length)).size).toBe(1)
  })

  it('are of one calibration, and of one workspace', async () => {
    const { app, actor } = test
    const machineId = await test.machine({ kind: 'chimera', m: 4 })
    await calibrateMachine(app, actor, machineId, { remark: 'another' })
    const none = await machineBreaks(app, actor, machineId, { rehearsals: true })
    expect(none).toMatchObject({ calibration: 2, returns: [], qubits: [], couplers: [], reads: 0 })
    const elsewhere = { ...actor, workspaceId: 'elsewhere' }
    await expect(machineBreaks(app, elsewhere, machineId, { rehearsals: false })).rejects.toMatchObject({
      kind: 'not found',
    })
  })
})

describe('use', () => {
  it('lists what stands on a machine, and from when it no longer does', async () => {
    const { app, actor } = test
    const machineId = await test.machine({ kind: 'chimera', m: 4 })
    const { embeddingId } = await returnedOn(machineId)
    const use = await machineUse(app, actor, machineId, { limit: 50 })
    expect(use).toMatchObject({ calibration: 1, workingQubits: 128 })
    expect(use.items).toMatchObject([
      { id: embeddingId, calibration: 1, brokenSince: null, returns: 1, reads: 200, openRunSheets: [{ number: 2 }] },
    ])
    expect(use.items[0]!.share).toBeCloseTo(use.items[0]!.qubitsUsed / 128, 12)
    const { qubits } = await machineBreaks(app, actor, machineId, { rehearsals: false })
    const defects = { qubits: [qubits[0]!.id], couplers: [] }
    await calibrateMachine(app, actor, machineId, { defects, remark: '' })
    expect((await machineUse(app, actor, machineId, { limit: 50 })).items[0]).toMatchObject({ brokenSince: 2 })
    expect((await machineUse(app, actor, machineId, { calibration: 1, limit: 50 })).items[0]).toMatchObject({
      brokenSince: null,
    })
  })
})

describe('measured capacity', () => {
  const measure = (machineId: string, settings: Record<string, unknown>) =>
    measureCapacity(test.app, test.actor, machineId, measureCapacitySchema.parse(settings))

  it('climbs at each density until none is found, and says how it was made', async () => {
    const { app, actor } = test
    const machineId = await test.machine({ kind: 'chimera', m: 2 })
    const before = await capacityCard(app, actor, machineId)
    expect(before).toMatchObject({ measured: null, newest: null, qubits: { working: 32, made: 32 } })
    expect(before.degrees).toEqual([{ degree: 5, qubits: 32 }])
    const { id, jobId } = await measure(machineId, { problems: 2, timeLimitSeconds: 2, seed: 5 })
    await expect(measure(machineId, {})).rejects.toMatchObject({ code: 'capacity.running' })
    expect((await test.finished(jobId)).status).toBe('done')
    const { measured } = await capacityCard(app, actor, machineId)
    expect(measured).toMatchObject({
      id,
      calibration: 1,
      status: 'measured',
      settings: { problems: 2, timeLimitSeconds: 2, seed: 5 },
      complete: { complete: { order: 9 } },
      reason: null,
    })
    const complete = measured!.points.filter(({ density }) => density === 1)
    // C(2) has treewidth 8: K_9 is the largest complete graph.
    for (const point of complete) expect(point.found > 0).toBe(point.variables <= 9)
    for (const { found, longestChain, problems } of measured!.points) {
      expect(problems).toBe(2)
      expect(longestChain === null).toBe(found === 0)
      if (longestChain) expect(longestChain.least).toBeLessThanOrEqual(longestChain.most)
    }
    await calibrateMachine(app, actor, machineId, { remark: 'later' })
    expect((await capacityCard(app, actor, machineId)).measured).toMatchObject({ calibration: 1 })
  })

  it('keeps its points when it is cancelled, and goes on from them after a restart', async () => {
    const { app, actor } = test
    const machineId = await test.machine({ kind: 'pegasus', m: 4 })
    const { jobId } = await measure(machineId, { problems: 2, timeLimitSeconds: 20 })
    const pointsOf = async () => (await capacityCard(app, actor, machineId)).newest?.points.length
    await until(async () => ((await pointsOf()) ?? 0) >= 2, 60, 'two points')
    await cancelJob(app, actor, jobId, JOB_KINDS)
    expect((await test.finished(jobId)).status).toBe('cancelled')
    const { measured } = await capacityCard(app, actor, machineId)
    expect(measured!.points.length).toBeGreaterThanOrEqual(2)
    expect(measured!.reason).toMatch(/Stopped/)

    const again = await measure(machineId, { problems: 2, timeLimitSeconds: 20, seed: 2 })
    const newest = async () => (await capacityCard(test.app, actor, machineId)).newest
    await until(async () => ((await newest())?.points.length ?? 0) >= 2, 60, 'two points')
    const kept = (await newest())!.points.slice(0, 2)
    test = await test.restarted(2)
    await until(async () => ((await newest())?.points.length ?? 0) >= 3, 60, 'a third point')
    expect((await newest())!.points.slice(0, 2)).toEqual(kept)
    await cancelJob(test.app, actor, again.jobId, JOB_KINDS)
    await test.finished(again.jobId)
    expect((await jobOf(test.app, actor, again.jobId)).status).toBe('cancelled')
  })
})
