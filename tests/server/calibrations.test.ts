import { afterAll, beforeAll, expect, it } from 'vitest'
import { compareCalibrations, comparisonFile } from '../../server/services/calibrations'
import { calibrateMachine, machineView } from '../../server/services/machines'
import { latticeOf } from '../../server/services/machine-files'
import { unpackArrays } from '../../shared/packed-arrays'
import { calibrateSchema } from '../../shared/schemas/machines'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'

let test: TestApp
beforeAll(async () => {
  test = await startTestApp(1)
})
afterAll(() => test.close())

const change = (body: object) => calibrateSchema.parse(body)
const energyTable = { s: [0, 0.5, 1], A: [9, 2, 0], B: [0, 5, 12] }

/** A king's graph of 4 × 3 with three calibrations. */
async function threeCalibrations() {
  const { app, actor } = test
  const id = await test.machine({ kind: 'king', width: 4, height: 3 })
  await calibrateMachine(
    app,
    actor,
    id,
    change({ defects: { qubits: [5], couplers: [[0, 1]] }, energyTable, remark: 'A cold finger came loose.' }),
  )
  await calibrateMachine(
    app,
    actor,
    id,
    change({
      defects: { qubits: [11], couplers: [[2, 1]] },
      energyTable: { ...energyTable, A: [9, 1, 0] },
      ranges: { h: [-4, 3], J: [-2, 1], couplingSum: null },
    }),
  )
  return id
}

it('compares any two calibrations, in either order', async () => {
  const { app, actor } = test
  const id = await threeCalibrations()
  const { from, to, difference } = await compareCalibrations(app, actor, id, { from: 2, to: 3 })
  expect(difference).toMatchObject({
    qubitsLost: [11],
    qubitsRegained: [5],
    couplersLost: [[1, 2]],
    couplersRegained: [[0, 1]],
    energies: { kind: 'changed', A: { s: 0.5, from: 2, to: 1 }, B: null },
  })
  expect(difference.figures.map(({ field, to: value }) => [field, value])).toEqual([
    ['ranges.h', [-4, 3]],
    ['ranges.J', [-2, 1]],
  ])
  // 29 couplers are made; qubit 5 has 8, qubit 11 has 3, and one coupler is missing beside them.
  expect([from.qubits, from.couplers, to.qubits, to.couplers]).toEqual([11, 20, 11, 25])
  expect(from).toMatchObject({ number: 2, remark: 'A cold finger came loose.', energyTable })

  const back = await compareCalibrations(app, actor, id, { from: 3, to: 1 })
  expect(back.difference).toMatchObject({ qubitsLost: [], qubitsRegained: [11], energies: { kind: 'withdrawn' } })
  expect(comparisonFile(back).text).toContain('qubit,11,missing,working,\n')
  const same = await compareCalibrations(app, actor, id, { from: 2, to: 2 })
  expect(same.difference.figures).toEqual([])
  await expect(compareCalibrations(app, actor, id, { from: 1, to: 4 })).rejects.toThrow('no calibration 4')
  await expect(
    compareCalibrations(app, { ...actor, workspaceId: 'elsewhere' }, id, { from: 1, to: 2 }),
  ).rejects.toMatchObject({ kind: 'not found' })
})

it('shows a machine as it was, and lists calibrations without their sheets', async () => {
  const { app, actor } = test
  const id = await threeCalibrations()
  const [now, before] = [await machineView(app, actor, id), await machineView(app, actor, id, 2)]
  expect(now).toMatchObject({ calibration: 3, shown: 3, qubits: 11, changes: { qubitsLost: [11] } })
  expect(before).toMatchObject({ calibration: 3, shown: 2, couplers: 20, changes: { qubitsLost: [5] } })
  expect(before.sheet.energyTable).toEqual(energyTable)
  expect((await machineView(app, actor, id, 1)).changes).toBeNull()
  expect(before.calibrations.map(({ number, remark, missingQubits }) => [number, remark, missingQubits])).toEqual([
    [3, '', 1],
    [2, 'A cold finger came loose.', 1],
    [1, '', 0],
  ])
  expect(before.calibrations[1]).toMatchObject({ controlError: { h: 0, J: 0 }, temperatureMillikelvin: null })
  expect(Object.keys(before.calibrations[1]!)).not.toContain('sheet')

  const { arrays } = unpackArrays(await latticeOf(app, actor, id, 2))
  expect(arrays.missingCouplers).toEqual(Uint32Array.of(0, 1))
  expect(arrays.couplersOfMissing).toHaveLength(16)
})

it('refuses parts that the machine does not have, naming each entry', async () => {
  const { app, actor } = test
  const id = await test.machine({ kind: 'king', width: 4, height: 3 })
  const defects = {
    qubits: [3, 99],
    couplers: [
      [0, 1],
      [5, 5],
      [0, 11],
      [1, 77],
    ],
  }
  await expect(calibrateMachine(app, actor, id, change({ defects }))).rejects.toMatchObject({
    kind: 'not acceptable',
    issues: [
      { path: 'defects.qubits.1', message: expect.stringContaining('no qubit 99') },
      { path: 'defects.couplers.1', message: expect.stringContaining('two different qubits') },
      { path: 'defects.couplers.2', message: expect.stringContaining('no coupler 0-11') },
      { path: 'defects.couplers.3', message: expect.stringContaining('no qubit 77') },
    ],
  })
  expect(await machineView(app, actor, id)).toMatchObject({ calibration: 1, qubits: 12 })
})
