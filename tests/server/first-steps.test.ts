import { afterAll, beforeAll, expect, it } from 'vitest'
import { setFact } from '../../server/database/repositories/people'
import { startEmbedding } from '../../server/services/embeddings'
import { firstStepsOf, SEEDED_AT } from '../../server/services/first-steps'
import { startRehearsal } from '../../server/services/rehearsals'
import { handOver } from '../../server/services/review'
import { createRunSheet, removeRunSheet } from '../../server/services/run-sheets'
import { createEmbeddingSchema } from '../../shared/schemas/embeddings'
import { createRunSheetSchema, rehearseSchema } from '../../shared/schemas/run-sheets'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { newMember } from '../support/people'

let test: TestApp
beforeAll(async () => {
  test = await startTestApp(1)
})
afterAll(() => test.close())

const doneNow = async () => {
  const { done } = await firstStepsOf(test.app, test.actor)
  return Object.entries(done).flatMap(([step, made]) => (made ? [step] : []))
}

it('are ticked one by one, by what the person made', async () => {
  const { app, actor } = test
  expect(await doneNow()).toEqual([])

  const problemId = await test.problem('a b 1\nb c 1\na c 1\n')
  expect((await firstStepsOf(app, actor)).done.problem).toEqual({ id: problemId, number: 1, name: 'Test' })

  const machineId = await test.machine({ kind: 'king', width: 3, height: 3 })
  const { id, jobId } = await startEmbedding(app, actor, createEmbeddingSchema.parse({ problemId, machineId }))
  await test.finished(jobId)
  expect(await doneNow()).toEqual(['problem', 'embedding'])

  const sheet = await createRunSheet(app, actor, createRunSheetSchema.parse({ embeddingId: id, reads: 10 }))
  expect(await doneNow()).toEqual(['problem', 'embedding', 'runSheet'])

  const rehearsal = await startRehearsal(app, actor, sheet.id, rehearseSchema.parse({ reads: 10, sweeps: 10 }))
  await test.finished(rehearsal.jobId)
  expect((await firstStepsOf(app, actor)).done.rehearsal).toEqual({ id: rehearsal.returnId, number: 1, runSheet: 1 })

  await handOver(app, actor, sheet.id, 'submit', '')
  expect(await doneNow()).toEqual(['problem', 'embedding', 'runSheet', 'rehearsal', 'submission'])
  const reviewer = await newMember(app, actor, 'Rita', ['reviewer'])
  await handOver(app, reviewer, sheet.id, 'sendBack', 'Fewer reads.')
  expect((await firstStepsOf(app, actor)).done.submission).toEqual({ id: sheet.id, number: 1 })

  await removeRunSheet(app, actor, sheet.id)
  expect(await doneNow()).toEqual(['problem', 'embedding'])
})

it('leave out what others made, and what the demo came with', async () => {
  const { app, actor } = test
  const other = await firstStepsOf(app, { ...actor, userId: 'somebody else' })
  expect(Object.values(other.done)).toEqual([null, null, null, null, null])

  await setFact(app.db, SEEDED_AT, app.now().toISOString())
  const demo = { ...app, demo: true }
  expect((await firstStepsOf(app, actor)).done.problem).not.toBeNull()
  expect(await firstStepsOf(demo, actor)).toMatchObject({ demo: true, done: { problem: null, embedding: null } })
  const id = await test.problem('a b 2\n')
  expect((await firstStepsOf(demo, actor)).done.problem).toMatchObject({ id })
})
