import { describe, expect, it } from 'vitest'
import { readSamples } from '../../../../../shared/engine/readout/files'
import { spinOf } from '../../../../../shared/engine/sampling/samples'

const qubitIds = [4, 7, 30]
const document = {
  kind: 'espalier.samples',
  version: 1,
  qubits: [30, 4, 7],
  samples: [
    [1, -1, 1],
    [-1, -1, 1],
  ],
}
const read = (value: unknown) =>
  readSamples(new TextEncoder().encode(typeof value === 'string' ? value : JSON.stringify(value)), {
    qubitIds,
    order: null,
  })

describe('a document of samples', () => {
  it('is read with all that stands beside the spins', () => {
    const beside = { counts: [3, 1], energies: [-2.5, 1], gauges: [0, 1], machineTimeSeconds: 0.125 }
    const reading = read({ ...document, ...beside })
    expect(reading).toMatchObject({ format: 'json', issues: [], hasCounts: true, columnsFrom: 'file' })
    expect(reading.machineTimeSeconds).toBe(0.125)
    const rows = reading.rows!
    expect([0, 1].map((r) => [0, 1, 2].map((c) => spinOf(rows, r, c)))).toEqual([
      [-1, 1, 1],
      [-1, 1, -1],
    ])
    expect([[...rows.counts], [...rows.energies!], [...rows.gauges!]]).toEqual([
      [3, 1],
      [-2.5, 1],
      [0, 1],
    ])
  })

  it('is taken in the order of the bundle where it does not name its qubits', () => {
    const { qubits: _qubits, ...nameless } = document
    const { rows, columnsFrom } = read(nameless)
    expect(columnsFrom).toBe('bundle')
    expect([0, 1, 2].map((c) => spinOf(rows!, 0, c))).toEqual([1, -1, 1])
  })

  it.each([
    ['no JSON', '{"kind": ', /not valid JSON/],
    ['another kind', { ...document, kind: 'espalier.problem' }, /kind is "espalier.problem"/],
    ['another version', { ...document, version: 2 }, /version is 2/],
    ['an unknown member', { ...document, spins: [] }, /not known: spins/],
    ['no samples', { ...document, samples: 3 }, /samples is not a list/],
    ['a row that is none', { ...document, samples: [1] }, /samples\[0\] is 1, not a list/],
    ['a short row', { ...document, samples: [[1, 1]] }, /samples\[0\] has 2 of 3/],
    ['a value outside the set', { ...document, samples: [[1, 1, 2]] }, /samples\[0\]\[2\] is 2/],
    ['a text', { ...document, samples: [[1, 1, '1']] }, /samples\[0\]\[2\] is "1"/],
    ['both sets', { ...document, samples: [[1, 0, -1]] }, /all as 0\/1/],
    ['no row', { ...document, samples: [] }, /no row/],
    ['unknown qubits', { ...document, qubits: [4, 7, 31] }, /does not use: 31/],
    ['qubits that are none', { ...document, qubits: ['a', 7, 30] }, /not a list of qubit numbers/],
    ['counts of another length', { ...document, counts: [1] }, /counts has 1 values for 2 rows/],
    ['a count of 0', { ...document, counts: [0, 1] }, /counts\[0\] is 0/],
    ['an energy that is none', { ...document, energies: [null, 1] }, /energies\[0\] is null/],
    ['a gauge below 0', { ...document, gauges: [-1, 1] }, /gauges\[0\] is -1/],
    ['no time', { ...document, machineTimeSeconds: 0 }, /machineTimeSeconds is 0/],
  ])('is refused for %s', (_name, value, message) => {
    const { rows, issues } = read(value)
    expect(rows).toBeNull()
    expect(issues[0]!.message).toMatch(message)
  })
})
