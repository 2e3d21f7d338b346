import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { returns } from '../../server/database/schema'
import { startEmbedding } from '../../server/services/embeddings'
import { startReference } from '../../server/services/reference-start'
import { startRehearsal } from '../../server/services/rehearsals'
import { analysisView } from '../../server/services/return-analysis'
import { returnsCompared, returnsComparedFile } from '../../server/services/return-comparison'
import { samplesFile } from '../../server/services/return-files'
import { returnView } from '../../server/services/return-view'
import { uploadReturn } from '../../server/services/returns'
import { createRunSheet } from '../../server/services/run-sheets'
import { asStoredFile } from '../../server/services/stored-files'
import { uploadVersion } from '../../server/services/version-upload'
import { createEmbeddingSchema } from '../../shared/schemas/embeddings'
import { uploadVersionSchema } from '../../shared/schemas/problem-versions'
import { startReferenceSchema } from '../../shared/schemas/reference'
import { analysisQuerySchema } from '../../shared/schemas/return-analysis'
import { returnComparisonQuerySchema } from '../../shared/schemas/return-comparison'
import { uploadReturnSchema } from '../../shared/schemas/returns'
import { createRunSheetSchema, rehearseSchema } from '../../shared/schemas/run-sheets'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'

/** All of six variables, to be maximised: chains of two qubits and more on a small Chimera graph. */
const PROBLEM = [
  '# form: ising',
  '# sense: max',
  ...[0, 1, 2, 3, 4, 5].flatMap((i) =>
    [0, 1, 2, 3, 4, 5].slice(i + 1).map((j) => `v${i} v${j} ${((i + j) % 3) - 1.5}`),
  ),
].join('\n')

let test: TestApp
let problemId = ''
const made: Record<'weak' | 'strong' | 'returned', string> = { weak: '', strong: '', returned: '' }

const compared = (query: Record<string, unknown> = {}, id = problemId) =>
  returnsCompared(test.app, test.actor, id, returnComparisonQuerySchema.parse(query))

async function runSheet(embeddingId: string, strength: number) {
  const settings = { strength: { rule: 'fixed', value: strength }, gauges: 2, reads: 200 }
  const input = createRunSheetSchema.parse({ embeddingId, name: `k "${strength}"`, ...settings })
  return (await createRunSheet(test.app, test.actor, input)).id
}

async function rehearsed(sheetId: string): Promise<string> {
  const input = rehearseSchema.parse({ reads: 200, sweeps: 60, temperature: 0.2, seed: 3 })
  const { returnId, jobId } = await startRehearsal(test.app, test.actor, sheetId, input)
  await test.finished(jobId)
  return returnId
}

async function embedded(seed: number): Promise<string> {
  const machineId = await test.machine({ kind: 'chimera', m: 3, t: 4 })
  const search = createEmbeddingSchema.parse({ problemId, machineId, method: 'search', seed, tries: 1 })
  const { id, jobId } = await startEmbedding(test.app, test.actor, search)
  await test.finished(jobId)
  return id
}

beforeAll(async () => {
  test = await startTestApp(1)
  problemId = await test.problem(PROBLEM)
  const { jobId } = await startReference(test.app, test.actor, problemId, startReferenceSchema.parse({}))
  if (jobId) await test.finished(jobId)
  const [one, other] = [await embedded(1), await embedded(2)]
  made.weak = await rehearsed(await runSheet(one, 0.4))
  const strong = await runSheet(other, 2)
  made.strong = await rehearsed(strong)
  // What the machine returned: the same reads once more, in a second each.
  const { bytes } = await samplesFile(test.app, test.actor, made.strong)
  const options = uploadReturnSchema.parse({ machineTimeSeconds: 200 })
  made.returned = await asStoredFile(
    'samples.csv',
    Buffer.from(bytes),
    async (file) => (await uploadReturn(test.app, test.actor, strong, file, options)).id,
  )
})
afterAll(() => test?.close())

it('holds what each set of samples says by itself', async () => {
  const { items, counts, nextCursor, sense } = await compared({ gap: 1 })
  expect([counts, nextCursor, sense]).toEqual([{ returned: 1, rehearsals: 2 }, null, 'max'])
  expect(items.map(({ id }) => id)).toEqual([made.returned, made.strong, made.weak])
  for (const item of items) {
    const view = await returnView(test.app, test.actor, item.id, 'majority', false)
    const analysis = await analysisView(test.app, test.actor, item.id, analysisQuerySchema.parse({ gap: 1 }))
    const { success, temperature } = analysis
    expect(item.readsWithBreak).toEqual(view.breaks!.readsWithBreak)
    expect(item.chainReads).toEqual(view.breaks!.chainReads)
    expect([item.best, item.mean]).toEqual([view.energies!.best, view.energies!.mean])
    expect(item.gapOfBest).toBeCloseTo(view.reference!.gap!, 12)
    expect(item).toMatchObject({ r99: success!.r99, milliseconds: success!.milliseconds })
    expect(item.success).toMatchObject({ count: success!.count, total: 200, low: success!.low })
    expect(item.scale).toBe(analysis.scale.value)
    expect(item.temperature).toEqual(temperature)
  }
  const [returned, strong, weak] = items
  expect(weak!.chainReads.rate).toBeGreaterThan(strong!.chainReads.rate)
  expect(strong!.strength!.mean).toBeGreaterThan(weak!.strength!.mean)
  expect([returned!.isTimeMeasured, returned!.millisecondsPerRead]).toEqual([true, 1000])
  expect(strong!.isTimeMeasured).toBe(false)
  expect(weak!.machine.id).not.toBe(strong!.machine.id)
})

it('counts reads that the decoding leaves out as no success', async () => {
  const weak = async (decode: string) => (await compared({ decode, gap: 1 })).items.find(({ id }) => id === made.weak)!
  const [majority, discard] = [await weak('majority'), await weak('discard')]
  expect(majority.readsWithBreak.count).toBeGreaterThan(0)
  expect(discard.success!.total).toBe(200)
  expect(discard.success!.count).toBeLessThan(majority.success!.count)
})

it('works out once what does not change', async () => {
  const kept = async () =>
    (await test.app.db.select({ measures: returns.measures }).from(returns).where(eq(returns.id, made.weak)))[0]!
      .measures
  await test.app.db.update(returns).set({ measures: null }).where(eq(returns.id, made.weak))
  const { temperature } = (await compared()).items.find(({ id }) => id === made.weak)!
  expect((await kept())!.temperature).toEqual(temperature)
  const other = { ...(await kept())!, scale: 0.125 }
  await test.app.db.update(returns).set({ measures: other }).where(eq(returns.id, made.weak))
  expect((await compared()).items.find(({ id }) => id === made.weak)!.scale).toBe(0.125)
})

it('comes in pages, and as a file with numbers in full', async () => {
  const first = await compared({ limit: 2 })
  const second = await compared({ limit: 2, cursor: first.nextCursor! })
  expect([...first.items, ...second.items].map(({ id }) => id)).toEqual([made.returned, made.strong, made.weak])
  expect(second.nextCursor).toBeNull()
  const query = returnComparisonQuerySchema.parse({ format: 'csv' })
  const { fileName, text } = await returnsComparedFile(test.app, test.actor, problemId, query)
  const [head, ...lines] = text.trimEnd().split('\n')
  expect([fileName, lines.length]).toEqual(['P-1-samples.csv', 3])
  const named = (line: string) => line.replace(/"(?:[^"]|"")*"/g, 'quoted').split(',')
  for (const line of lines) expect(named(line)).toHaveLength(named(head!).length)
  expect(lines[0]).toContain('"k ""2"""')
  const inverse = named(lines[2]!)[named(head!).indexOf('inverse temperature')]
  expect(Number(inverse)).toBe(second.items[0]!.temperature!.inverseTemperature)
})

it('keeps the samples of an earlier version, held against the reference of that version', async () => {
  const id = await test.problem('a b 1\na c 1\nb c 1')
  const file = { name: 'next.txt', bytes: Buffer.from('a b 2\na c 1\nb c 1') }
  await uploadVersion(test.app, test.actor, problemId, file, uploadVersionSchema.parse({}))
  const { items, currentVersion, sense } = await compared()
  expect([currentVersion, sense]).toEqual([2, 'min'])
  expect(items.map(({ version }) => version)).toEqual([1, 1, 1])
  expect(items[0]!.gapOfBest).not.toBeNull()
  expect(await compared({}, id)).toMatchObject({ items: [], counts: { returned: 0, rehearsals: 0 } })
})

it('is closed to other workspaces and to what is no decoding', async () => {
  const stranger = { ...test.actor, workspaceId: 'another' }
  const query = returnComparisonQuerySchema.parse({})
  await expect(returnsCompared(test.app, stranger, problemId, query)).rejects.toThrow(/no such problem/)
  expect(() => returnComparisonQuerySchema.parse({ decode: 'vote' })).toThrow()
  expect(() => returnComparisonQuerySchema.parse({ gap: -1 })).toThrow()
})
