import { expect, test } from 'vitest'
import { energies } from '../../../../../server/workers/tasks/energies'
import { writeProblemFile } from '../../../../../server/workers/tasks/write-problem'
import { writeSamplesFile } from '../../../../../server/workers/tasks/write-samples'
import { readProblem } from '../../../../../shared/engine/formats'
import { packRows } from '../../../../../shared/engine/sampling/merge'

const control = { now: () => 0, cancelled: () => false, report: () => {} }
/** 3x₀ − 2x₁ + 5x₀x₁ + 1 */
const problem = {
  n: 2,
  linear: Float64Array.of(3, -2),
  rows: Uint32Array.of(0),
  cols: Uint32Array.of(1),
  values: Float64Array.of(5),
  offset: 1,
}

test('energies are the same in either alphabet', () => {
  const expected = [1, 4, -1, 7]
  const bits = Int8Array.of(0, 0, 1, 0, 0, 1, 1, 1)
  const spins = bits.map((x) => 2 * x - 1)
  expect([...energies({ problem, from: 'qubo', form: 'qubo', states: bits }, control)]).toEqual(expected)
  expect([...energies({ problem, from: 'qubo', form: 'ising', states: spins }, control)]).toEqual(expected)
})

const stored = { form: 'qubo' as const, labels: ['é', 'b'], problem }

test.each(['coefficients', 'dense-csv', 'json', 'npz'])('a file as %s reads back as the problem', (format) => {
  for (const gzip of [false, true]) {
    const written = writeProblemFile({ stored, form: 'qubo', format, sense: 'max', gzip }, control)
    if ('refusal' in written) throw new Error(written.refusal)
    const reading = readProblem(written.bytes)
    expect(reading).toMatchObject({ format, sense: 'max', labels: ['é', 'b'], container: gzip ? 'gzip' : null })
    expect(reading.problem).toEqual(problem)
  }
})

test('what a format cannot hold is a refusal with the reason', () => {
  const written = writeProblemFile({ stored, form: 'qubo', format: 'npy', sense: 'min', gzip: false }, control)
  expect(written).toEqual({ refusal: expect.stringContaining('would lose the offset 1, the labels') as string })
})

test('samples are written with the numbers of their qubits', () => {
  const samples = { ...packRows(2, [1, -1, -1, -1]), gauges: null, energies: null }
  const { bytes } = writeSamplesFile({ samples, qubitIds: [4, 9] }, control)
  expect(new TextDecoder().decode(bytes)).toBe('4,9,count\n1,-1,1\n-1,-1,1\n')
})
