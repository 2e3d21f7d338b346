import { afterAll, beforeAll, expect, it } from 'vitest'
import { sparsityPicture, structureDetailsOf } from '../../server/services/problem-structure'
import { cellOf } from '../../shared/engine/problem/sparsity'
import { unpackArrays } from '../../shared/packed-arrays'
import type { SparsityMeta } from '../../shared/schemas/structure'
import { SPARSITY_LIMITS, sparsityQuerySchema } from '../../shared/schemas/structure'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'

let test: TestApp
beforeAll(async () => {
  test = await startTestApp(1)
})
afterAll(() => test.close())

async function picture(id: string, query: Record<string, string> = {}) {
  const bytes = await sparsityPicture(test.app, test.actor, id, sparsityQuerySchema.parse(query))
  const { meta, arrays } = unpackArrays(bytes)
  return { bytes, arrays, meta: meta as unknown as SparsityMeta }
}

it('shows each coefficient of a small problem in its own sense, in either form and order', async () => {
  const id = await test.problem('# sense: max\na b 4\nc a -8\nb b 2\n')
  const { arrays, meta } = await picture(id)
  expect(meta).toMatchObject({ variables: 3, interactions: 2, form: 'qubo', labels: ['a', 'b', 'c'], bins: 3 })
  expect(Array.from(arrays.rows!, (row, k) => [row, arrays.cols![k], arrays.values![k]])).toEqual([
    [0, 1, 4],
    [0, 2, -8],
  ])
  expect([...arrays.linear!]).toEqual([0, 2, 0])
  const banded = await picture(id, { order: 'banded', form: 'ising' })
  expect(banded.meta).toMatchObject({ bandwidth: 1, givenBandwidth: 2, form: 'ising' })
  const named = Array.from(banded.arrays.rows!, (row, k) => [
    [banded.meta.labels![row], banded.meta.labels![banded.arrays.cols![k]!]].sort().join(''),
    banded.arrays.values![k],
  ])
  expect(Object.fromEntries(named)).toEqual({ ab: 1, ac: -2 })
})

it('counts a large problem in bins, in at most 200 kB', async () => {
  const n = 3000
  const id = await test.problem(Array.from({ length: n - 1 }, (_, k) => `v${k} v${k + 1} 1`).join('\n'))
  const { bytes, arrays, meta } = await picture(id)
  expect(bytes.byteLength).toBeLessThanOrEqual(200_000)
  expect(meta).toMatchObject({ variables: n, bins: SPARSITY_LIMITS.bins, labels: null, bandwidth: 1 })
  expect(Object.keys(arrays)).toEqual(['counts'])
  // Runs of five variables: four interactions inside each, one to the next.
  expect(arrays.counts![cellOf(meta.bins, 7, 7)]).toBe(4)
  expect(arrays.counts![cellOf(meta.bins, 7, 8)]).toBe(1)
  expect(arrays.counts![cellOf(meta.bins, 7, 9)]).toBe(0)
})

it('takes no more bins than there may be', () => {
  expect(sparsityQuerySchema.safeParse({ bins: '601' }).success).toBe(false)
  expect(sparsityQuerySchema.safeParse({ order: 'random' }).success).toBe(false)
})

it('works the slower figures out when asked, beside every machine of the workspace', async () => {
  const { app, actor } = test
  const id = await test.problem('# form: ising\n# sense: max\na b 2\nb c 2\na c 0.01\nd d 1\n')
  const machineId = await test.machine({ kind: 'king', width: 3, height: 3 })
  const details = await structureDetailsOf(app, actor, id)
  expect(details).toMatchObject({
    variables: 4,
    treewidthLowerBound: 2,
    componentSizes: [
      { variables: 3, count: 1 },
      { variables: 1, count: 1 },
    ],
    couplings: { negative: 0, zero: 0, positive: 3 },
    fields: { negative: 0, zero: 3, positive: 1 },
    balanced: true,
    triangles: { count: 1, frustrated: 0 },
    version: app.version,
  })
  expect(details.machines).toEqual([
    expect.objectContaining({
      machineId,
      calibration: 1,
      scale: 0.5,
      coefficients: 4,
      fieldsUnder: 0,
      interactionsUnder: 0,
    }),
  ])
})

it('are not told to other workspaces', async () => {
  const id = await test.problem('a b 1\n')
  const stranger = { ...test.actor, workspaceId: test.actor.userId }
  await expect(structureDetailsOf(test.app, stranger, id)).rejects.toMatchObject({ kind: 'not found' })
  await expect(sparsityPicture(test.app, stranger, id, sparsityQuerySchema.parse({}))).rejects.toMatchObject({
    kind: 'not found',
  })
})
