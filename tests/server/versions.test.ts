import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { blobs as blobTable, problems, problemVersions } from '../../server/database/schema'
import { restore, sweepDeletions } from '../../server/services/deletions'
import { importEmbedding } from '../../server/services/embedding-import'
import { embeddingView } from '../../server/services/embedding-view'
import { startEmbedding } from '../../server/services/embeddings'
import { libraryPage } from '../../server/services/library'
import { duplicateProblem } from '../../server/services/problem-copies'
import { problemGraphOf } from '../../server/services/problem-graph'
import { renameVariables } from '../../server/services/problem-labels'
import { compareVersions, versionsOf } from '../../server/services/problem-versions'
import { problemView } from '../../server/services/problem-view'
import { editProblem, energiesOf, removeProblem, termsOf } from '../../server/services/problems'
import { returnView } from '../../server/services/return-view'
import { uploadReturn } from '../../server/services/returns'
import { asStoredFile } from '../../server/services/stored-files'
import { createRunSheet, runSheetView } from '../../server/services/run-sheets'
import { uploadVersion } from '../../server/services/version-upload'
import { createEmbeddingSchema } from '../../shared/schemas/embeddings'
import { libraryQuerySchema } from '../../shared/schemas/library'
import { uploadVersionSchema } from '../../shared/schemas/problem-versions'
import { uploadReturnSchema } from '../../shared/schemas/returns'
import { createRunSheetSchema } from '../../shared/schemas/run-sheets'
import { unpackArrays } from '../../shared/packed-arrays'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'

/** A path of three, its middle heavier; then the same with other weights, with a chord, and without an end. */
const PATH = 'a a 1\na b -1\nb c -2\n'
const REWEIGHED = 'a a 1\na b -3\nb c -2\n'
const TRIANGLE = 'a a 1\na b -3\nb c -2\na c 4\n'
const CHAINS = { a: [0], b: [1], c: [2] }

let test: TestApp
let machineId: string
beforeAll(async () => {
  test = await startTestApp(1)
  machineId = await test.machine({ kind: 'king', width: 3, height: 2 })
})
afterAll(() => test.close())

const upload = (id: string, text: string, options: Record<string, unknown> = {}) =>
  uploadVersion(
    test.app,
    test.actor,
    id,
    { name: 'next.txt', bytes: Buffer.from(text) },
    uploadVersionSchema.parse(options),
  )
const view = (id: string, version?: number) => problemView(test.app, test.actor, id, version)
const versions = async (id: string) => (await versionsOf(test.app, test.actor, id, { limit: 50 })).items

async function runSheetOn(embeddingId: string): Promise<string> {
  const sheet = createRunSheetSchema.parse({ embeddingId, strength: { rule: 'fixed', value: 2 }, reads: 1 })
  return (await createRunSheet(test.app, test.actor, sheet)).id
}

describe('a new version', () => {
  it('takes the next number and says what changed; the earlier one stays readable', async () => {
    const id = await test.problem(PATH)
    const preview = await upload(id, REWEIGHED, { dryRun: true })
    expect(preview).toMatchObject({ id: null, version: null, before: 1, isSame: false })
    expect(preview.difference.changes).toEqual([{ labels: ['a', 'b'], before: -1, after: -3 }])
    expect(await versions(id)).toHaveLength(1)

    const saved = await upload(id, REWEIGHED, { remark: 'heavier' })
    expect(saved).toMatchObject({ id, version: 2, before: 1, name: 'Test' })
    expect(await versions(id)).toMatchObject([
      {
        version: 2,
        remark: 'heavier',
        source: { fileName: 'next.txt' },
        change: { interactionsChanged: 1, graph: 'same' },
      },
      { version: 1, remark: '', change: null },
    ])
    const [now, before] = [await view(id), await view(id, 1)]
    expect(now).toMatchObject({ version: 2, currentVersion: 2, superseded: null, remark: 'heavier' })
    expect(before).toMatchObject({ version: 1, currentVersion: 2, superseded: { by: { name: 'Developer' } } })
    expect(before.fingerprint).not.toBe(now.fingerprint)

    const { app, actor } = test
    const values = async (version?: number) =>
      (await termsOf(app, actor, id, { part: 'interactions', start: 0, limit: 9, version })).interactions.map(
        ({ qubo }) => qubo,
      )
    expect([await values(1), await values()]).toEqual([
      [-1, -2],
      [-3, -2],
    ])
    const ones = { form: 'qubo' as const, states: [[1, 1, 1]] }
    expect(await energiesOf(app, actor, id, ones, 1)).toEqual([-2])
    expect(await energiesOf(app, actor, id, ones)).toEqual([-4])
    const graph = unpackArrays(await problemGraphOf(app, actor, id, 1))
    expect([...(graph.arrays.quboValues as Float64Array)]).toEqual([-1, -2])
    await expect(view(id, 3)).rejects.toMatchObject({ code: 'problem.version' })
  })

  it('of the same content is refused, naming the version that holds it', async () => {
    const id = await test.problem(PATH)
    await upload(id, REWEIGHED)
    expect(await upload(id, REWEIGHED, { dryRun: true })).toMatchObject({ isSame: true })
    const refused = { kind: 'wrong state', code: 'problem.same-version', message: expect.stringMatching(/version 2/) }
    await expect(upload(id, `# otherwise written\n${REWEIGHED}`)).rejects.toMatchObject(refused)
    expect(await versions(id)).toHaveLength(2)
    // What an earlier version held is a change again.
    expect(await upload(id, PATH)).toMatchObject({ version: 3 })
  })

  it('that cannot be read leaves nothing behind', async () => {
    const id = await test.problem(PATH)
    await expect(upload(id, 'a b c d e\n')).rejects.toMatchObject({ kind: 'not acceptable' })
    await expect(upload(id, `${REWEIGHED}b c nothing\n`)).rejects.toMatchObject({ code: 'problem.rejected-lines' })
    expect(await versions(id)).toHaveLength(1)
    expect(await upload(id, `${REWEIGHED}b c nothing\n`, { skipRejected: 'true' })).toMatchObject({ version: 2 })
  })

  it('is read in the form of the one before where the file does not say', async () => {
    const id = await test.problem('# form: ising\na b -1\nb c -2\n')
    expect((await view(id)).form).toBe('ising')
    const { form, reading, difference } = await upload(id, 'a b -1\nb c -3\n')
    expect([form, difference.formChanged, difference.interactionsChanged]).toEqual(['ising', false, 1])
    expect(reading.formSource).toBe('default')
    expect(await upload(id, 'a b -1\nb c -3\n', { form: 'qubo' })).toMatchObject({ difference: { formChanged: true } })
  })

  it('of several at once all are kept, each under its own number', async () => {
    const id = await test.problem(PATH)
    const texts = [3, 4, 5, 6].map((weight) => `a a 1\na b -${weight}\nb c -2\n`)
    const saved = await Promise.all(texts.map((text) => upload(id, text, { remark: text.slice(6, 12) })))
    expect(saved.map(({ version }) => version).sort()).toEqual([2, 3, 4, 5])
    const rows = await test.app.db.select().from(problemVersions).where(eq(problemVersions.problemId, id))
    expect(rows.map(({ version }) => version).sort()).toEqual([1, 2, 3, 4, 5])
    for (const { version, remark } of saved.map((one, k) => ({
      version: one.version!,
      remark: texts[k]!.slice(6, 12),
    })))
      expect(await view(id, version)).toMatchObject({ remark })
    // Each is told against the one before it, whichever that came to be.
    for (const { change, version } of await versions(id)) expect(change?.interactionsChanged ?? 1, `${version}`).toBe(1)
  })

  it('is compared with any other', async () => {
    const id = await test.problem(PATH)
    await upload(id, REWEIGHED)
    await upload(id, TRIANGLE)
    const compare = (from: number, to: number) => compareVersions(test.app, test.actor, id, { from, to })
    expect(await compare(1, 3)).toMatchObject({ interactionsAdded: 1, interactionsChanged: 1, graph: 'changed' })
    expect(await compare(3, 1)).toMatchObject({ interactionsRemoved: 1, interactionsChanged: 1, graph: 'fewer' })
    await expect(compare(1, 9)).rejects.toMatchObject({ kind: 'not found' })
  })
})

describe('what was built on an earlier version', () => {
  it('says so, programs that version, and is carried over by repair', async () => {
    const { app, actor } = test
    const id = await test.problem(PATH)
    const { id: first } = await importEmbedding(app, actor, { problemId: id, machineId, chains: CHAINS })
    const sheet = await runSheetOn(first)
    expect((await runSheetView(app, actor, sheet)).ofVersion).toEqual({ version: 1, current: 1, graph: null })

    await upload(id, REWEIGHED)
    const earlier = { version: 1, current: 2, graph: 'same' }
    expect((await embeddingView(app, actor, first)).ofVersion).toEqual(earlier)
    expect((await view(id)).embeddings[0]!.ofVersion).toEqual(earlier)
    const shown = await runSheetView(app, actor, sheet)
    expect(shown.ofVersion).toEqual(earlier)
    expect(shown.checks).toContainEqual(
      expect.objectContaining({
        verdict: 'caution',
        what: expect.stringMatching(/version 1/),
        figure: 'version 2 is current',
      }),
    )
    expect(shown.fingerprints.problem).toBe((await view(id, 1)).fingerprint)
    const again = await runSheetView(app, actor, await runSheetOn(first))
    expect(again).toMatchObject({ ofVersion: earlier, maxAbsJ: 0.5 })

    await upload(id, TRIANGLE)
    expect((await embeddingView(app, actor, first)).ofVersion).toEqual({ version: 1, current: 3, graph: 'changed' })
    const start = { embeddingId: first, work: 'repair' as const }
    const { id: carried, jobId } = await startEmbedding(
      app,
      actor,
      createEmbeddingSchema.parse({ problemId: id, machineId, start }),
    )
    expect((await test.finished(jobId)).status).toBe('done')
    const made = await embeddingView(app, actor, carried)
    expect(made).toMatchObject({ status: 'found', ofVersion: { version: 3, current: 3, graph: null } })
    expect((await runSheetView(app, actor, await runSheetOn(carried))).maxAbsJ).toBe(1)
  })

  it('keeps its samples to the version that was programmed', async () => {
    const { app, actor } = test
    const id = await test.problem(PATH)
    const { id: embedding } = await importEmbedding(app, actor, { problemId: id, machineId, chains: CHAINS })
    const sheet = await runSheetOn(embedding)
    const bytes = Buffer.from('0,1,2\n1,1,1\n')
    const { id: samples } = await asStoredFile('samples.csv', bytes, (file) =>
      uploadReturn(app, actor, sheet, file, uploadReturnSchema.parse({})),
    )
    expect((await view(id)).best).toBe(-2)
    await upload(id, REWEIGHED)
    const returned = await returnView(app, actor, samples, 'majority', false)
    expect(returned).toMatchObject({ ofVersion: { version: 1, current: 2, graph: 'same' }, best: { energy: -2 } })
    // The best of one version says nothing of another.
    expect([(await view(id)).best, (await view(id, 1)).best]).toEqual([null, -2])
    const query = libraryQuerySchema.parse({ state: 'to carry over' })
    const { items } = await libraryPage(app, actor, query)
    expect(items.find((item) => item.id === id)).toMatchObject({ embedding: { ofVersion: 1 }, currentVersion: 2 })
  })
})

describe('labels', () => {
  const rename = (id: string, renames: [string, string][], version?: number) =>
    renameVariables(test.app, test.actor, id, { version, renames: renames.map(([from, to]) => ({ from, to })) })

  it('are edited in a new version that groups and embeddings hold for', async () => {
    const { app, actor } = test
    const id = await test.problem(PATH)
    const groups = [{ name: 'ends', kind: 'exactly' as const, k: 1, members: [0, 2], source: 'entered' as const }]
    await app.db.update(problemVersions).set({ groups }).where(eq(problemVersions.problemId, id))
    const { id: embedding } = await importEmbedding(app, actor, { problemId: id, machineId, chains: CHAINS })
    expect(await rename(id, [['b', 'berth 2']])).toEqual({ version: 2 })
    expect(await versions(id)).toMatchObject([
      {
        version: 2,
        remark: 'renamed b to berth 2',
        source: { relabelled: 1 },
        change: { variablesRenamed: 1, graph: 'same' },
      },
      { version: 1 },
    ])
    const rows = await app.db.select().from(problemVersions).where(eq(problemVersions.problemId, id))
    expect(rows.map((row) => row.groups)).toEqual([groups, groups])
    const { linear } = await termsOf(app, actor, id, { part: 'linear', start: 0, limit: 9 })
    expect(linear.map(({ label }) => label)).toEqual(['a', 'berth 2', 'c'])
    expect((await embeddingView(app, actor, embedding)).ofVersion.graph).toBe('same')

    const start = { embeddingId: embedding, work: 'repair' as const }
    const asked = createEmbeddingSchema.parse({ problemId: id, machineId, start })
    const { id: carried, jobId } = await startEmbedding(app, actor, asked)
    await test.finished(jobId)
    expect(await embeddingView(app, actor, carried)).toMatchObject({
      start: { changed: 0 },
      chains: { a: [0], 'berth 2': [1], c: [2] },
    })
  })

  it('of a version that is no longer the current one are refused', async () => {
    const id = await test.problem(PATH)
    await rename(id, [['a', 'x']], 1)
    await expect(rename(id, [['b', 'y']], 1)).rejects.toMatchObject({
      kind: 'wrong state',
      code: 'problem.version-moved',
    })
    await expect(rename(id, [['a', 'y']])).rejects.toMatchObject({ code: 'problem.labels' })
    const both = await Promise.allSettled([rename(id, [['b', 'y']], 2), rename(id, [['b', 'z']], 2)])
    expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected'])
    expect(await versions(id)).toHaveLength(3)
  })
})

describe('a copy', () => {
  it('is a problem of its own with note, tags and groups, and says what it was copied from', async () => {
    const { app, actor } = test
    const id = await test.problem(PATH)
    const groups = [{ name: 'ends', kind: 'at most' as const, k: 1, members: [0, 2], source: 'entered' as const }]
    await app.db.update(problemVersions).set({ groups }).where(eq(problemVersions.problemId, id))
    await editProblem(app, actor, id, { note: 'of the night boats', tags: { add: ['trial'], remove: [] } })
    await upload(id, TRIANGLE)
    const { number } = await view(id)
    const copy = await duplicateProblem(app, actor, id, { version: 1 })
    const [was, is] = [await view(id, 1), await view(copy.id)]
    expect(is).toMatchObject({
      name: 'Test, copy',
      note: 'of the night boats',
      tags: ['trial'],
      version: 1,
      fingerprint: was.fingerprint,
      source: { copyOf: { id, number, version: 1 } },
      embeddings: [],
    })
    expect(copy.number).toBeGreaterThan(number)
    const [row] = await app.db.select().from(problemVersions).where(eq(problemVersions.problemId, copy.id))
    expect(row!.groups).toEqual(groups)

    // It stands on its own once the other is gone for good.
    await removeProblem(app, actor, id)
    await app.db
      .update(problems)
      .set({ deletedAt: new Date(0) })
      .where(eq(problems.id, id))
    await sweepDeletions(app)
    expect((await view(copy.id)).source.copyOf).toBeUndefined()
    expect(await energiesOf(app, actor, copy.id, { form: 'qubo', states: [[1, 1, 1]] })).toEqual([-2])
  })
})

it('deletes all versions with their problem, brings all back, and takes all blobs away in the end', async () => {
  const { app, actor } = test
  const id = await test.problem(PATH)
  await upload(id, REWEIGHED)
  await upload(id, TRIANGLE)
  const rows = await app.db.select().from(problemVersions).where(eq(problemVersions.problemId, id))
  const blobIds = rows.map(({ dataBlobId }) => dataBlobId)
  expect(new Set(blobIds).size).toBe(3)
  await removeProblem(app, actor, id)
  await expect(view(id, 1)).rejects.toMatchObject({ kind: 'not found' })
  await expect(upload(id, PATH)).rejects.toMatchObject({ kind: 'not found' })
  await restore(app, actor, 'problem', id)
  expect(await versions(id)).toHaveLength(3)
  expect(await view(id, 2)).toMatchObject({ version: 2 })
  await removeProblem(app, actor, id)
  await app.db
    .update(problems)
    .set({ deletedAt: new Date(0) })
    .where(eq(problems.id, id))
  await sweepDeletions(app)
  expect(await app.db.select().from(problemVersions).where(eq(problemVersions.problemId, id))).toEqual([])
  const left = (await app.db.select({ id: blobTable.id }).from(blobTable)).map((row) => row.id)
  for (const blobId of blobIds) expect(left).not.toContain(blobId)
})
