import type { H3Event } from 'h3'
import { afterAll, beforeAll, expect, it } from 'vitest'
import type { Actor } from '../../server/app'
import { activityOfProblem, activityOfRunSheet } from '../../server/services/activity'
import { revokeAnswer, shareAnswer } from '../../server/services/answer-sheets'
import { sweepDeletions } from '../../server/services/deletions'
import { importEmbedding } from '../../server/services/embedding-import'
import { chooseEmbedding, removeEmbedding } from '../../server/services/embeddings'
import { calibrateMachine } from '../../server/services/machines'
import { duplicateProblem } from '../../server/services/problem-copies'
import { editProblem } from '../../server/services/problems'
import { uploadReturn } from '../../server/services/returns'
import { handOver } from '../../server/services/review'
import { duplicateRunSheet } from '../../server/services/run-sheet-copies'
import { addRemark } from '../../server/services/run-sheet-remarks'
import { createRunSheet, editRunSheet } from '../../server/services/run-sheets'
import { asStoredFile } from '../../server/services/stored-files'
import { uploadVersion } from '../../server/services/version-upload'
import { audited } from '../../server/utils/audited'
import { shareAnswerSchema } from '../../shared/schemas/answers'
import { uploadVersionSchema } from '../../shared/schemas/problem-versions'
import { uploadReturnSchema } from '../../shared/schemas/returns'
import { createRunSheetSchema } from '../../shared/schemas/run-sheets'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { newMember } from '../support/people'

let test: TestApp
let reviewer: Actor
let problemId: string
let machineId: string
let sheetId: string
const CHAINS = { a: [0], b: [1], c: [3] }

/** Does something the way that a route does, with its entry in the audit trail. */
function done<T>(by: Actor, route: string, id: string | null, work: () => Promise<T>): Promise<T> {
  const [method, path] = route.split(' ')
  const node = { req: { headers: {}, socket: { remoteAddress: '192.0.2.7' } } }
  const context = { matchedRoute: { path }, params: id === null ? {} : { id } }
  const event = { method, context, node } as unknown as H3Event
  return audited(event, { app: test.app, tokenId: null, ...by }, work)
}
const all = { limit: 100 }
const ofProblem = async (id = problemId) => (await activityOfProblem(test.app, test.actor, id, all)).items
const ofSheet = async (id = sheetId) => (await activityOfRunSheet(test.app, test.actor, id, all)).items
type Items = Awaited<ReturnType<typeof ofProblem>>
/** `Rita sent back RS-1`, the oldest first. */
const told = (items: Items) =>
  items.map(({ by, what, thing }) => `${by?.name ?? 'bridge'} ${what} ${thing.label}`).reverse()

const imported = () =>
  done(test.actor, 'POST /api/embeddings/import', null, () =>
    importEmbedding(test.app, test.actor, { problemId, machineId, chains: CHAINS }),
  )

beforeAll(async () => {
  test = await startTestApp(1)
  reviewer = await newMember(test.app, test.actor, 'Rita', ['reviewer'])
  problemId = (
    await done(test.actor, 'POST /api/problems', null, async () => ({
      id: await test.problem('a b 1\nb c 1\na c 1\n'),
    }))
  ).id
  machineId = await test.machine({ kind: 'king', width: 3, height: 3 })
})
afterAll(() => test?.close())

it('tells of versions and embeddings from their own records, and of the rest from the trail, each once', async () => {
  const { app, actor } = test
  await done(actor, 'PATCH /api/problems/:id', problemId, () => editProblem(app, actor, problemId, { name: 'Deck' }))
  const { id } = await imported()
  await done(actor, 'PATCH /api/embeddings/:id', id, () => chooseEmbedding(app, actor, id, true))
  expect(told(await ofProblem())).toEqual([
    'Developer uploaded P-1',
    'Developer changed P-1',
    'Developer imported E-1',
    'Developer changed E-1',
  ])
  expect((await ofProblem())[1]).toMatchObject({
    kind: 'embedding',
    thing: { id, label: 'E-1', isGone: false },
    detail: expect.stringMatching(/^on Machine \S+, longest chain 1, 3 qubits$/),
    for: null,
    token: null,
  })
})

it('tells what happened to a run sheet, on its own and among that of its problem', async () => {
  const { app, actor } = test
  const embeddingId = (await ofProblem()).find(({ what }) => what === 'imported')!.thing.id
  const input = createRunSheetSchema.parse({ embeddingId, name: 'first', reads: 100 })
  sheetId = (await done(actor, 'POST /api/run-sheets', null, () => createRunSheet(app, actor, input))).id
  for (const reads of [20, 30, 40])
    await done(actor, 'PATCH /api/run-sheets/:id', sheetId, () => editRunSheet(app, actor, sheetId, { reads }))
  await done(actor, 'POST /api/run-sheets/:id/submit', sheetId, () => handOver(app, actor, sheetId, 'submit', ''))
  await done(reviewer, 'POST /api/run-sheets/:id/remarks', sheetId, () => addRemark(app, reviewer, sheetId, 'Why 40?'))
  await done(reviewer, 'POST /api/run-sheets/:id/approve', sheetId, () =>
    handOver(app, reviewer, sheetId, 'approve', ''),
  )
  const events = [
    'Developer prepared RS-1',
    'Developer changed RS-1',
    'Developer submitted RS-1',
    'Rita wrote a remark on RS-1',
    'Rita approved RS-1',
  ]
  expect(told(await ofSheet())).toEqual(events)
  expect(told(await ofProblem()).slice(-events.length)).toEqual(events)
})

it('tells of samples and of what was handed on of them', async () => {
  const { app, actor } = test
  await done(actor, 'POST /api/run-sheets/:id/issue', sheetId, () => handOver(app, actor, sheetId, 'issue', ''))
  const bytes = Buffer.from('0,1,3\n1,-1,1\n-1,1,-1\n')
  const { id } = await done(actor, 'POST /api/run-sheets/:id/returns', sheetId, () =>
    asStoredFile('samples.csv', bytes, (file) =>
      uploadReturn(app, actor, sheetId, file, uploadReturnSchema.parse({ gauges: 'undone' })),
    ),
  )
  const link = shareAnswerSchema.parse({ decode: 'majority', assignments: 1 })
  await done(actor, 'POST /api/returns/:id/answer-sheet', id, () => shareAnswer(app, actor, id, link))
  await done(reviewer, 'DELETE /api/returns/:id/answer-sheet', id, () => revokeAnswer(app, reviewer, id))
  const items = await ofSheet()
  expect(told(items).slice(-4)).toEqual([
    'Developer issued RS-1',
    'Developer loaded samples RS-1/1',
    'Developer made an answer link of RS-1/1',
    'Rita took back the answer link of RS-1/1',
  ])
  expect(items[2]).toMatchObject({ detail: '2 reads, 0 with a break', kind: 'samples', thing: { id } })
})

it('tells of a calibration that breaks an embedding', async () => {
  const steward = await newMember(test.app, test.actor, 'Stella', ['steward'])
  await calibrateMachine(test.app, steward, machineId, { defects: { qubits: [3], couplers: [] }, remark: '' })
  expect((await ofProblem())[0]).toMatchObject({
    by: { name: 'Stella' },
    what: expect.stringMatching(/^calibrated Machine \S+, which breaks$/),
    thing: { label: 'E-1' },
    detail: 'calibration 2, 1 of 3 chains',
  })
  await calibrateMachine(test.app, steward, machineId, { defects: { qubits: [], couplers: [] }, remark: '' })
})

it('tells of the run sheets made from one, and of what became of these on their own', async () => {
  const copy = await done(test.actor, 'POST /api/run-sheets/:id/duplicate', sheetId, () =>
    duplicateRunSheet(test.app, test.actor, sheetId),
  )
  const change = () => editRunSheet(test.app, test.actor, copy.id, { reads: 7 })
  await done(test.actor, 'PATCH /api/run-sheets/:id', copy.id, change)
  const [newest] = await ofSheet()
  expect(newest).toMatchObject({ what: 'prepared', thing: { label: 'RS-2', id: copy.id } })
  expect(newest!.detail).toContain('from RS-1')
  expect(told(await ofSheet(copy.id))).toEqual(['Developer prepared RS-2', 'Developer changed RS-2'])
})

it('still tells of what was deleted for good', async () => {
  const { id } = await imported()
  await done(test.actor, 'DELETE /api/embeddings/:id', id, () => removeEmbedding(test.app, test.actor, id))
  expect((await ofProblem())[1]).toMatchObject({ what: 'imported', thing: { id, isGone: true } })
  const later = new Date(test.app.now().getTime() + 120_000)
  await sweepDeletions({ ...test.app, now: () => later })
  const [newest, before] = await ofProblem()
  expect(newest).toMatchObject({ what: 'deleted', kind: 'embedding', thing: { id, label: 'E-2', isGone: true } })
  expect(before!.thing.id).not.toBe(id)
})

it('tells of copies and versions of a problem', async () => {
  const copy = await done(test.actor, 'POST /api/problems/:id/duplicate', problemId, () =>
    duplicateProblem(test.app, test.actor, problemId, {}),
  )
  const file = { name: 'again.txt', bytes: Buffer.from('a b 2\n') }
  const upload = () =>
    uploadVersion(test.app, test.actor, copy.id, file, uploadVersionSchema.parse({ remark: 'twice as strong' }))
  await done(test.actor, 'POST /api/problems/:id/versions', copy.id, upload)
  expect((await ofProblem())[0]).toMatchObject({ what: 'copied', thing: { label: 'P-1' } })
  expect(told(await ofProblem(copy.id))).toEqual(['Developer made P-2', 'Developer uploaded a version of P-2'])
  expect((await ofProblem(copy.id)).map(({ detail }) => detail)).toEqual([
    'version 2, twice as strong',
    'copied from P-1, version 1',
  ])
})

it('comes in pages, newest first', async () => {
  const whole = await ofProblem()
  const pages: Items = []
  let cursor: string | undefined
  do {
    const page = await activityOfProblem(test.app, test.actor, problemId, { limit: 2, cursor })
    pages.push(...page.items)
    cursor = page.nextCursor ?? undefined
  } while (cursor)
  expect(pages).toEqual(whole)
  const times = whole.map(({ at }) => at)
  expect(times).toEqual([...times].sort().reverse())
  expect(new Set(whole.map(({ id }) => id)).size).toBe(whole.length)
})

it('is not told to another workspace', async () => {
  const stranger = { ...test.actor, workspaceId: 'elsewhere' }
  await expect(activityOfProblem(test.app, stranger, problemId, all)).rejects.toThrow()
  await expect(activityOfRunSheet(test.app, stranger, sheetId, all)).rejects.toThrow()
})
