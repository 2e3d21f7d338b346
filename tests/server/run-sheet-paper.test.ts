import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Actor } from '../../server/app'
import { insertReturn } from '../../server/database/repositories/run-sheets'
import { startEmbedding } from '../../server/services/embeddings'
import { outboxOf } from '../../server/services/mail'
import { createMachine } from '../../server/services/machine-creation'
import { createAccount } from '../../server/services/people'
import { startReference } from '../../server/services/reference-start'
import { startRehearsal } from '../../server/services/rehearsals'
import { handOver } from '../../server/services/review'
import { compareRunSheets } from '../../server/services/run-sheet-comparison'
import { createQuenches, duplicateRunSheet } from '../../server/services/run-sheet-copies'
import { addRemark } from '../../server/services/run-sheet-remarks'
import { createRunSheet, editRunSheet, runSheetRow, runSheetsOf, runSheetView } from '../../server/services/run-sheets'
import { pageQuerySchema } from '../../shared/schemas/common'
import { createEmbeddingSchema } from '../../shared/schemas/embeddings'
import { createMachineSchema } from '../../shared/schemas/machines'
import { outboxQuerySchema } from '../../shared/schemas/mail'
import { startReferenceSchema } from '../../shared/schemas/reference'
import type { CheckSubject } from '../../shared/schemas/run-sheets'
import { createRunSheetSchema, rehearseSchema } from '../../shared/schemas/run-sheets'
import type { TestApp } from '../support/app'
import { importEmbedding } from '../../server/services/embedding-import'
import { startTestApp } from '../support/app'

let test: TestApp
let reviewer: Actor
let other: Actor
let problemId: string
let embeddingId: string
let onPlain: string

const member = (name: string, roles: ('reviewer' | 'steward')[]): Promise<Actor> =>
  test.app.db.transaction(async (tx) => {
    const { workspaceId } = test.actor
    const account = { email: `${name}@test.example`, name, passwordHash: '-', workspaceId }
    return { workspaceId, userId: await createAccount(test.app, tx, { ...account, roles }) }
  })

async function embedded(machineId: string): Promise<string> {
  const search = createEmbeddingSchema.parse({ problemId, machineId, seed: 1, tries: 1, timeLimitSeconds: 20 })
  const { id, jobId } = await startEmbedding(test.app, test.actor, search)
  await test.finished(jobId)
  return id
}

beforeAll(async () => {
  test = await startTestApp(1)
  reviewer = await member('reviewer', ['reviewer'])
  other = await member('steward', ['steward'])
  const names = [...'abcdef']
  problemId = await test.problem(
    ['# form: ising', ...names.flatMap((a, i) => names.slice(0, i).map((b, j) => `${a} ${b} ${i - j - 2.5}`))].join(
      '\n',
    ),
  )
  const machine = createMachineSchema.parse({
    name: 'Priced',
    family: { kind: 'chimera', m: 3, t: 4 },
    timing: { annealMinMicroseconds: 0.5, slopeMaxPerMicrosecond: 2, schedulePointsMax: 4 },
    price: { perSecond: 2, currency: 'EUR' },
  })
  embeddingId = await embedded((await createMachine(test.app, test.actor, machine)).id)
  onPlain = await embedded(await test.machine({ kind: 'chimera', m: 3, t: 4 }))
})
afterAll(() => test.close())

async function sheet(settings: Record<string, unknown> = {}): Promise<string> {
  const input = createRunSheetSchema.parse({ embeddingId, name: 'Paper', ...settings })
  return (await createRunSheet(test.app, test.actor, input)).id
}
const view = (id: string) => runSheetView(test.app, test.actor, id)
const checkOf = async (id: string, about: CheckSubject) =>
  (await view(id)).checks.find((check) => check.about === about)
const allSheets = async () => (await runSheetsOf(test.app, test.actor, pageQuerySchema.parse({ limit: 200 }))).items
const letters = async () =>
  (await outboxOf(test.app, test.actor, outboxQuerySchema.parse({ limit: 100 }))).items.map(
    ({ kind, to, subject }) => `${kind}, ${to.name}: ${subject}`,
  )

describe('the checks of a run sheet', () => {
  it('say whether it was rehearsed as it stands, whatever its number of reads', async () => {
    const id = await sheet({ annealMicroseconds: 30 })
    expect(await checkOf(id, 'rehearsal')).toMatchObject({ verdict: 'caution', what: 'Not rehearsed', at: '#samples' })
    const { jobId } = await startRehearsal(test.app, test.actor, id, rehearseSchema.parse({ reads: 20, sweeps: 20 }))
    await test.finished(jobId)
    expect(await checkOf(id, 'rehearsal')).toMatchObject({
      verdict: 'passed',
      figure: expect.stringMatching(/^rehearsal 1: /),
    })
    await editRunSheet(test.app, test.actor, id, { reads: 77, strength: { rule: 'rms', value: 1 } })
    expect(await checkOf(id, 'rehearsal')).toMatchObject({ verdict: 'passed' })
    await editRunSheet(test.app, test.actor, id, { annealMicroseconds: 31 })
    expect(await checkOf(id, 'rehearsal')).toMatchObject({ verdict: 'caution', figure: 'rehearsal 1 had others' })
  })

  it('do not take uploaded samples for a rehearsal', async () => {
    const id = await sheet()
    const row = await runSheetRow(test.app, test.actor, id)
    await insertReturn(test.app.db, {
      id: crypto.randomUUID(),
      workspaceId: row.workspaceId,
      runSheetId: id,
      embeddingId,
      number: 1,
      source: 'upload',
      status: 'ready',
      made: {},
      settings: row.settings,
      reads: 10,
      readsWithBreak: 0,
      version: 'x',
      createdBy: row.preparedBy,
      createdAt: test.app.now(),
    })
    expect(await checkOf(id, 'rehearsal')).toMatchObject({ what: 'Not rehearsed' })
  })

  it('say how near the ranges a chosen scale is, where one is chosen', async () => {
    const id = await sheet()
    const { scale } = await view(id)
    expect(await checkOf(id, 'scale')).toBeUndefined()
    await editRunSheet(test.app, test.actor, id, { scale: scale * 0.9 })
    expect(await checkOf(id, 'scale')).toMatchObject({ verdict: 'passed' })
    await editRunSheet(test.app, test.actor, id, { scale: scale / 2 })
    expect(await checkOf(id, 'scale')).toMatchObject({
      verdict: 'caution',
      what: 'The chosen scale is 50 % of what fits',
    })
  })

  it('tell the price where the machine sheet has one, and its terms add up', async () => {
    const id = await sheet({ reads: 1000, gauges: 2, annealMicroseconds: 80 })
    const { machineTime } = await view(id)
    // 2 × 10 ms + 1000 × (80 + 100 + 20) µs = 220 ms, at 2 EUR a second
    expect(machineTime.parts.reduce((sum, { milliseconds }) => sum + milliseconds, 0)).toBeCloseTo(220, 10)
    expect(machineTime.price).toEqual({ perSecond: 2, currency: 'EUR', amount: 0.44 })
    expect(await checkOf(id, 'price')).toMatchObject({ what: 'About 0.44 EUR of machine time', at: '#machine-time' })
    expect(await checkOf(await sheet({ embeddingId: onPlain }), 'price')).toBeUndefined()
  })

  it('say whether a reference optimum is known', async () => {
    const id = await sheet()
    const before = await checkOf(id, 'reference')
    expect(before).toMatchObject({ verdict: 'caution', at: `/problems/${problemId}#optimum` })
    const { jobId } = await startReference(test.app, test.actor, problemId, startReferenceSchema.parse({}))
    await test.finished(jobId)
    expect(await checkOf(id, 'reference')).toMatchObject({ verdict: 'passed', what: 'The optimum is known and proved' })
  })
})

describe('remarks on a run sheet', () => {
  it('reach preparer and reviewer, never who wrote them', async () => {
    const id = await sheet({ name: 'Talked about' })
    const since = (await letters()).length
    const newest = async () => (await letters()).slice(0, (await letters()).length - since)
    await addRemark(test.app, test.actor, id, 'To myself.')
    expect(await newest()).toEqual([])
    await addRemark(test.app, other, id, 'Calibration 2 comes on Monday.')
    expect(await newest()).toEqual([
      expect.stringMatching(/^run sheet remark, Developer: steward on RS-\d+: Talked about$/),
    ])
    await handOver(test.app, test.actor, id, 'submit', '')
    await addRemark(test.app, test.actor, id, 'Please by Friday.')
    expect(await newest()).toContainEqual(expect.stringMatching(/^run sheet remark, reviewer: Developer on/))
    await handOver(test.app, reviewer, id, 'approve', '')
    await addRemark(test.app, reviewer, id, 'Approved as it is.')
    expect((await newest()).filter((letter) => letter.startsWith('run sheet remark, Developer'))).toHaveLength(2)
    const { remarks, state } = await view(id)
    expect(state).toBe('approved')
    expect(remarks.map(({ what, text, by }) => [what, text, by?.name])).toEqual([
      ['remark', 'To myself.', 'Developer'],
      ['remark', 'Calibration 2 comes on Monday.', 'steward'],
      ['submitted for review', '', 'Developer'],
      ['remark', 'Please by Friday.', 'Developer'],
      ['approved', '', 'reviewer'],
      ['remark', 'Approved as it is.', 'reviewer'],
    ])
  })

  it('need a run sheet of the workspace', async () => {
    await expect(addRemark(test.app, test.actor, 'nothing', 'x')).rejects.toMatchObject({ kind: 'not found' })
  })
})

describe('a duplicate', () => {
  it('is a draft with the same settings, from any state, and says what it was made from', async () => {
    const id = await sheet({ name: 'x'.repeat(118), reads: 321, strength: { rule: 'cut', value: 1.3 } })
    await handOver(test.app, test.actor, id, 'submit', '')
    const copy = await duplicateRunSheet(test.app, test.actor, id)
    const [first, second] = [await view(id), await view(copy.id)]
    expect(second).toMatchObject({ state: 'draft', madeFrom: { id, number: first.number }, settings: first.settings })
    expect(second.name).toMatch(/^x{113}…, copy$/)
    expect(first.copies).toMatchObject([{ id: copy.id, number: copy.number, lastPiece: null }])
    const { groups, checks, strengths } = await compareRunSheets(test.app, test.actor, { a: id, b: copy.id })
    expect([...groups.flatMap(({ fields }) => fields), ...checks].filter(({ differs }) => differs)).toEqual([])
    expect(strengths.differing).toEqual([])
  })

  it('compares with what it became', async () => {
    const id = await sheet()
    const copy = await duplicateRunSheet(test.app, test.actor, id)
    await editRunSheet(test.app, test.actor, copy.id, { reads: 50, strength: { rule: 'manual', value: 9 } })
    const { groups, strengths } = await compareRunSheets(test.app, test.actor, { a: id, b: copy.id })
    const fields = groups.flatMap((group) => group.fields).filter(({ differs }) => differs)
    expect(fields.map(({ field }) => field)).toEqual(
      expect.arrayContaining(['Strength rule', 'Reads', 'Estimate', 'Scale']),
    )
    expect(fields.find(({ field }) => field === 'Reads')).toMatchObject({ a: 1000, b: 50 })
    expect(strengths.differing.every(({ b }) => b === 9)).toBe(true)
    expect(strengths.differing.length + strengths.same).toBe(6)
  })

  it('holds no strength of single qubits against each other, which have none', async () => {
    const machineId = await test.machine({ kind: 'chimera', m: 1, t: 4 })
    const pair = await test.problem('# form: ising\na b 1\nb c 1')
    const chains = { a: [0], b: [4], c: [1, 5] }
    const { id } = await importEmbedding(test.app, test.actor, { problemId: pair, machineId, chains })
    const [a, b] = [await sheet({ embeddingId: id }), await sheet({ embeddingId: id, strength: { rule: 'cut' } })]
    const { strengths } = await compareRunSheets(test.app, test.actor, { a, b })
    expect([...strengths.differing.map(({ label }) => label), strengths.same]).toEqual(['c', 0])
  })
})

describe('a quench series', () => {
  it('makes a draft for each s, as steep as the machine takes', async () => {
    const id = await sheet({ name: 'Ramp', annealMicroseconds: 20 })
    const { items } = await createQuenches(test.app, test.actor, id, { points: [0.3, 0.55] })
    expect(items.map(({ s }) => s)).toEqual([0.3, 0.55])
    const second = await view(items[1]!.id)
    expect(second).toMatchObject({ name: 'Ramp, quench at s = 0.55', state: 'draft', madeFrom: { id } })
    expect(second.settings.schedule).toEqual([
      { microseconds: 0, s: 0 },
      { microseconds: 11, s: 0.55 },
      { microseconds: 11.225, s: 1 },
    ])
    expect(second.settings.annealMicroseconds).toBe(11.225)
    expect(second.checks.find(({ about }) => about === 'schedule')).toMatchObject({ verdict: 'passed' })
    const { copies } = await view(id)
    expect(copies.map(({ lastPiece }) => lastPiece!.s)).toEqual([0.3, 0.55])
    expect(copies[0]!.lastPiece!.microseconds).toBeCloseTo(0.35, 9)
  })

  it('is made whole or not at all, every refused s named', async () => {
    const id = await sheet({ annealMicroseconds: 1 })
    const before = (await allSheets()).length
    const series = { points: [0.9, 0.05, 0.1], quenchMicroseconds: 0.2 }
    await expect(createQuenches(test.app, test.actor, id, series)).rejects.toMatchObject({
      code: 'quenches.limits',
      issues: [
        { path: 'points.1', message: expect.stringContaining('s = 0.05') },
        { path: 'points.1' },
        { path: 'points.2', message: expect.stringContaining('s = 0.1') },
        { path: 'points.2' },
      ],
    })
    expect((await allSheets()).length).toBe(before)
  })

  it('needs a time where the machine states no steepest slope, and points where it takes none', async () => {
    const id = await sheet({ embeddingId: onPlain })
    const quench = (series: { points: number[]; quenchMicroseconds?: number }) =>
      createQuenches(test.app, test.actor, id, series)
    await expect(quench({ points: [0.5] })).rejects.toMatchObject({ code: 'quenches.time' })
    await expect(quench({ points: [0.5], quenchMicroseconds: 1 })).rejects.toMatchObject({
      message: expect.stringContaining('takes no other schedule'),
    })
  })
})
