import { afterAll, beforeAll, expect, it } from 'vitest'
import type { Actor } from '../../server/app'
import { grantTime } from '../../server/services/budget'
import { importEmbedding } from '../../server/services/embedding-import'
import { handOver } from '../../server/services/review'
import { reviewQueue } from '../../server/services/review-queue'
import { createRunSheet, editRunSheet } from '../../server/services/run-sheets'
import { createRunSheetSchema } from '../../shared/schemas/run-sheets'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { newMember } from '../support/people'

let test: TestApp
let reviewer: Actor
let embeddingId: string
beforeAll(async () => {
  test = await startTestApp(1)
  reviewer = await newMember(test.app, test.actor, 'Rita', ['reviewer'])
  const problemId = await test.problem('a b 1\nb c 1\na c 1\n')
  const machineId = await test.machine({ kind: 'king', width: 3, height: 3 })
  const chains = { a: [0], b: [1], c: [3] }
  embeddingId = (await importEmbedding(test.app, test.actor, { problemId, machineId, chains })).id
})
afterAll(() => test?.close())

const queue = async (actor = reviewer) => (await reviewQueue(test.app, actor, { limit: 10 })).items
async function submitted(by: Actor, name: string): Promise<string> {
  const { id } = await createRunSheet(test.app, by, createRunSheetSchema.parse({ embeddingId, name, reads: 100 }))
  await handOver(test.app, by, id, 'submit', `about ${name}`)
  return id
}

it('shows what waits, the longest waiting first, with what was written to the reviewer', async () => {
  await submitted(test.actor, 'first')
  await submitted(reviewer, 'second')
  const items = await queue()
  expect(items.map(({ name, remark, isOwn, changes }) => ({ name, remark, isOwn, changes }))).toEqual([
    { name: 'first', remark: 'about first', isOwn: false, changes: null },
    { name: 'second', remark: 'about second', isOwn: true, changes: null },
  ])
  expect(items[0]).toMatchObject({ budget: null, machineTimeMilliseconds: 24, preparedBy: { name: 'Developer' } })
  expect(items[0]!.checks.cautions).toContain('Not rehearsed')
})

it('shows what is left of the budget', async () => {
  await grantTime(test.app, reviewer, { seconds: 0.01, machineId: null, remark: '' })
  const [first] = await queue()
  expect(first!.budget).toEqual({ leftSeconds: 0.01, heldSeconds: 0 })
  expect(first!.checks.cautions).toContain('The budget is too small: it cannot be approved')
})

it('shows what was changed since it was sent back, and goes on without what is decided', async () => {
  const { id } = (await queue())[0]!
  await handOver(test.app, reviewer, id, 'sendBack', 'Too many reads.')
  expect((await queue()).map(({ name }) => name)).toEqual(['second'])
  await editRunSheet(test.app, test.actor, id, { reads: 20 })
  await handOver(test.app, test.actor, id, 'submit', 'Fewer.')
  const again = (await queue()).find((item) => item.id === id)!
  expect(again.changes).toEqual([{ setting: 'reads', before: '100', after: '20' }])
  expect(again.remark).toBe('Fewer.')
})

it('shows another workspace nothing', async () => {
  expect(await queue({ ...reviewer, workspaceId: 'elsewhere' })).toEqual([])
})
