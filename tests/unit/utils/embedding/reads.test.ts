import { describe, expect, it } from 'vitest'
import { brokenChains, readLayer, readRows } from '../../../../utils/embedding/reads'

// Chains {10, 20} and {30} on a machine of four qubits; the columns of the file stand in another order.
const lattice = { ids: Uint32Array.of(10, 20, 30, 40) }
const chains = { offsets: Uint32Array.of(0, 2, 3), qubits: Uint32Array.of(0, 1, 2) }
const csv = '30,10,20,count\n1,-1,-1,3\n-1,1,-1,1\n'

describe('readRows', () => {
  it('puts every spin on its qubit', () => {
    const rows = readRows(csv, [20, 10, 30], lattice)!
    expect([...readLayer(rows, 0, lattice).spins]).toEqual([-1, -1, 1, 0])
    expect([...readLayer(rows, 1, lattice).spins]).toEqual([1, -1, -1, 0])
    expect([...rows.samples.counts]).toEqual([3, 1])
  })

  it('refuses samples of other qubits', () => {
    expect(readRows(csv, [10, 20], lattice)).toBeNull()
  })
})

describe('brokenChains', () => {
  it('names the chains whose qubits disagree', () => {
    const rows = readRows(csv, [10, 20, 30], lattice)!
    expect(brokenChains(chains, readLayer(rows, 0, lattice))).toEqual([])
    expect(brokenChains(chains, readLayer(rows, 1, lattice))).toEqual([0])
  })
})
