import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { readSamples } from '../../shared/engine/readout/files'
import { spinOf } from '../../shared/engine/sampling/samples'

/*
 * Samples written by NumPy 2.4 and what they hold according to it (tests/fixtures/numpy/samples/make.py): types of either
 * order of bytes, C and Fortran order, archives with and without compression, and files that must be refused.
 */

const folder = join(import.meta.dirname, '../fixtures/numpy/samples')
interface Expected {
  rows?: number[][]
  refused?: string
  counts?: number[]
  energies?: number[]
  gauges?: number[]
  seconds?: number
}
const { numpy, qubits, files } = JSON.parse(readFileSync(join(folder, 'expected.json'), 'utf8')) as {
  numpy: string
  qubits: number[]
  files: Record<string, Expected>
}

function* cut(bytes: Uint8Array, size: number): Generator<Uint8Array> {
  for (let at = 0; at < bytes.length; at += size) yield bytes.slice(at, at + size)
}

describe(`samples of NumPy ${numpy}`, () => {
  it.each(Object.entries(files))('%s', (name, expected) => {
    const bytes = new Uint8Array(readFileSync(join(folder, name)))
    const reading = readSamples(bytes, { qubitIds: qubits, order: null })
    expect(readSamples(cut(bytes, 17), { qubitIds: qubits, order: null })).toEqual(reading)
    if (expected.refused !== undefined) {
      expect(reading.rows).toBeNull()
      expect(reading.issues.map(({ message }) => message).join('; ')).toContain(expected.refused)
      return
    }
    expect(reading.issues).toEqual([])
    const rows = reading.rows!
    expect(
      expected.rows!.map((row, r) => row.map((_, c) => spinOf(rows, r, c))),
      'spins',
    ).toEqual(expected.rows)
    expect(rows.rows).toBe(expected.rows!.length)
    expect([...rows.counts]).toEqual(expected.counts ?? expected.rows!.map(() => 1))
    expect(rows.energies && [...rows.energies]).toEqual(expected.energies ?? null)
    expect(rows.gauges && [...rows.gauges]).toEqual(expected.gauges ?? null)
    expect(reading.machineTimeSeconds).toBe(expected.seconds ?? null)
  })

  it('puts columns where an order that was given says', () => {
    const bytes = new Uint8Array(readFileSync(join(folder, 'i1.npy')))
    const order = [...qubits].reverse()
    const { rows, columnsFrom } = readSamples(bytes, { qubitIds: qubits, order })
    expect(columnsFrom).toBe('given')
    expect(qubits.map((_, c) => spinOf(rows!, 0, c))).toEqual([...files['i1.npy']!.rows![0]!].reverse())
  })

  it('names an order that does not fit', () => {
    const bytes = new Uint8Array(readFileSync(join(folder, 'i1.npy')))
    const { issues } = readSamples(bytes, { qubitIds: qubits, order: [...qubits.slice(1), 999] })
    expect(issues[0]!.message).toMatch(/order of qubits that was given .* does not use: 999/)
  })
})
