import { afterAll, beforeAll, expect, it } from 'vitest'
import { machineCapacity } from '../../server/services/machine-capacity'
import { calibrateMachine } from '../../server/services/machines'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'

let test: TestApp
beforeAll(async () => {
  test = await startTestApp(2)
})
afterAll(() => test.close())

it('is worked out once for each calibration of a machine', async () => {
  const { app, actor } = test
  const machineId = await test.machine({ kind: 'chimera', m: 4 })
  const [first, same] = await Promise.all([
    machineCapacity(app, actor, machineId),
    machineCapacity(app, actor, machineId, 1),
  ])
  // C(4) has treewidth 16, so K_17 is the largest complete graph, with chains of at least five qubits.
  expect(first).toEqual({
    calibration: 1,
    treewidth: 16,
    complete: { order: 17, chainLength: expect.any(Number) },
    seed: 1,
    tries: 6,
    stoppedEarly: false,
  })
  expect(first.complete!.chainLength).toBeGreaterThanOrEqual(5)
  expect(same).toBe(first)
  await calibrateMachine(app, actor, machineId, { defects: { qubits: [0, 9, 50], couplers: [] }, remark: '' })
  const second = await machineCapacity(app, actor, machineId)
  expect(second.calibration).toBe(2)
  expect(second.complete!.order).toBeLessThanOrEqual(second.treewidth + 1)
  expect(await machineCapacity(app, actor, machineId, 1)).toBe(first)
})

it('names no complete graph where no template fits, and nothing of other workspaces', async () => {
  const { app, actor } = test
  const machineId = await test.machine({ kind: 'square', width: 3, height: 3 })
  expect(await machineCapacity(app, actor, machineId)).toMatchObject({ treewidth: 3, complete: null })
  await expect(machineCapacity(app, { ...actor, workspaceId: 'elsewhere' }, machineId)).rejects.toMatchObject({
    kind: 'not found',
  })
  await expect(machineCapacity(app, actor, machineId, 2)).rejects.toMatchObject({ code: 'calibration.unknown' })
})
