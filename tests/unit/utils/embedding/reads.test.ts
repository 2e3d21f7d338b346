import { describe, expect, it } from 'vitest'
import { packArrays } from '../../../../shared/packed-arrays'
import { brokenChains, readLayer, readRows } from '../../../../utils/embedding/reads'

// Chains {10, 20} and {30} on a machine of four qubits; the columns of the file stand in another order.
const lattice = { ids: Uint32Array.of(10, 20, 30, 40) }
const chains = { offsets: Uint32Array.of(0, 2, 3), qubits: Uint32Array.of(0, 1, 2) }
/** Two rows over qubits 30, 10 and 20: + − − three times, − + − once. */
const packed = (qubits: number[]): Uint8Array =>
  packArrays(
    { bytes: Uint8Array.of(0b001, 0b010), counts: Uint32Array.of(3, 1), qubits: Uint32Array.from(qubits) },
    { rows: 2 },
  )
const all = packed([30, 10, 20])

describe('readRows', () => {
  it('puts every spin on its qubit', () => {
    const rows = readRows(all, lattice)!
    expect([...readLayer(rows, 0, lattice).spins]).toEqual([-1, -1, 1, 0])
    expect([...readLayer(rows, 1, lattice).spins]).toEqual([1, -1, -1, 0])
    expect([...rows.samples.counts]).toEqual([3, 1])
  })

  it('refuses samples of qubits that the machine does not have', () => {
    expect(readRows(packed([30, 10, 25]), lattice)).toBeNull()
  })
})

describe('brokenChains', () => {
  it('names the chains whose qubits disagree', () => {
    const rows = readRows(all, lattice)!
    expect(brokenChains(chains, readLayer(rows, 0, lattice))).toEqual([])
    expect(brokenChains(chains, readLayer(rows, 1, lattice))).toEqual([0])
  })
})
