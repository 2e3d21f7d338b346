import { afterAll, beforeAll, expect, it } from 'vitest'
import { problemGraphOf } from '../../server/services/problem-graph'
import { termsOf } from '../../server/services/problems'
import { unpackArrays } from '../../shared/packed-arrays'
import { PROBLEM_GRAPH_LIMITS } from '../../shared/problem-graph'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'

let test: TestApp
beforeAll(async () => {
  test = await startTestApp(1)
})
afterAll(() => test.close())

it('holds what the rows of both forms hold, in the sense of the problem', async () => {
  const { app, actor } = test
  const id = await test.problem('# sense: max\na b 3\nb c -5\na a 2\nc c -1.5\n')
  const { meta, arrays } = unpackArrays(await problemGraphOf(app, actor, id))
  const linear = await termsOf(app, actor, id, { part: 'linear', start: 0, limit: 100 })
  const interactions = await termsOf(app, actor, id, { part: 'interactions', start: 0, limit: 100 })
  expect(meta).toMatchObject({
    labels: ['a', 'b', 'c'],
    form: 'qubo',
    fingerprint: expect.stringMatching(/^[\da-f]+$/),
  })
  expect([...arrays.quboLinear!]).toEqual(linear.linear.map(({ qubo }) => qubo))
  expect([...arrays.isingLinear!]).toEqual(linear.linear.map(({ ising }) => ising))
  expect([...arrays.quboValues!]).toEqual(interactions.interactions.map(({ qubo }) => qubo))
  expect([...arrays.isingValues!]).toEqual(interactions.interactions.map(({ ising }) => ising))
  const places = interactions.interactions.map(({ places: [i, j] }) => [i - 1, j - 1])
  expect(Array.from(arrays.rows!, (row, k) => [row, arrays.cols![k]])).toEqual(places)
})

it('is refused where lines would cover each other, and to other workspaces', async () => {
  const { app, actor } = test
  const size = PROBLEM_GRAPH_LIMITS.variables + 1
  const id = await test.problem(Array.from({ length: size - 1 }, (_, k) => `${k} ${k + 1} 1`).join('\n'))
  await expect(problemGraphOf(app, actor, id)).rejects.toMatchObject({ kind: 'too large', code: 'graph.size' })
  const stranger = { ...actor, workspaceId: actor.userId }
  await expect(problemGraphOf(app, stranger, id)).rejects.toMatchObject({ kind: 'not found' })
})
