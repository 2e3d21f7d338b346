import { describe, expect, it } from 'vitest'
import type { ReturnView } from '../../../../shared/schemas/returns'
import type { ProgrammedView, RunSheetView } from '../../../../shared/schemas/run-sheets'
import { breakLayer, ledgerRows, loadLayer } from '../../../../utils/embedding/layers'
import type { EmbeddingChains } from '../../../../utils/embedding/layers'

// Four qubits in a row, published as 10, 20, 30, 40; chains a = {10, 20} and b = {30}; the last qubit is free.
const lattice = { ids: Uint32Array.of(10, 20, 30, 40), ends: Uint32Array.of(0, 1, 1, 2, 2, 3) }
const chains: EmbeddingChains = {
  labels: ['a', 'b'],
  offsets: Uint32Array.of(0, 2, 3),
  qubits: Uint32Array.of(0, 1, 2),
  neighbours: Uint32Array.of(0, 1),
  couplers: Uint32Array.of(1, 1),
  ranges: { h: [-4, 4], J: [-2, 1], couplingSum: [-18, 15] },
}
const programmed: ProgrammedView = {
  h: { 10: -0.5, 20: 0.25, 30: 3 },
  J: [
    [10, 20, -1.8],
    [20, 30, 0.6],
  ],
  scale: 1,
  chainStrength: { a: 1.8, b: 1.8 },
  offset: 0,
}
const proportion = { count: 5, total: 100, rate: 0.05, low: 0.02, high: 0.11 }
const samples = {
  reads: 100,
  breaks: {
    chains: [{ variable: 0, label: 'a', length: 2, strength: 1.5, cutBound: 2.5, ...proportion }],
    couplers: [{ a: 20, b: 10, label: 'a', ...proportion }],
  },
} as unknown as ReturnView
const runSheet = {
  chains: [
    { variable: 0, label: 'a', qubits: 2, couplers: 1, strength: 1.8, cutBound: 2, cutBoundExact: true },
    { variable: 1, label: 'b', qubits: 1, couplers: 1, strength: 1.8, cutBound: 0, cutBoundExact: false },
  ],
} as unknown as RunSheetView

describe('loadLayer', () => {
  it('measures each coupling sum against the range on its side', () => {
    // Sums −1.8, −1.2 and 0.6 against −18 and 15.
    const { qubitLoad } = loadLayer(lattice, programmed, chains.ranges)!
    expect([...qubitLoad].map((load) => Number(load.toFixed(6)))).toEqual([0.1, 0.066667, 0.04, 0])
  })

  it('is absent where the machine bounds no sum', () => {
    expect(loadLayer(lattice, programmed, { ...chains.ranges, couplingSum: null })).toBeNull()
  })
})

describe('breakLayer', () => {
  it('finds the coupler by its qubit numbers, whichever way round', () => {
    const layer = breakLayer(lattice, samples)!
    expect(layer.couplerRate).toEqual(new Map([[0, 0.05]]))
    expect(layer.reads).toBe(100)
  })
})

describe('ledgerRows', () => {
  it('shows lengths and couplers without a run sheet', () => {
    const [a, b] = ledgerRows(lattice, chains, null)
    expect(a).toMatchObject({ label: 'a', qubits: 2, couplers: 1, strength: null, bound: null, load: null })
    expect(b).toMatchObject({ label: 'b', qubits: 1 })
  })

  it('takes the strength the samples were taken with, and the largest programmed values', () => {
    const [a, b] = ledgerRows(lattice, chains, { runSheet, chains: [], samples, programmed })
    expect(a).toMatchObject({ strength: 1.5, bound: 2.5, breaks: { rate: 0.05, count: 5, reads: 100 } })
    expect(a!.load).toMatchObject({ field: 0.5, coupling: -1.8 })
    expect(a!.load!.sum).toBeCloseTo(0.1, 6)
    // A single qubit is held by no coupler.
    expect(b).toMatchObject({ strength: null, bound: null, breaks: undefined })
    expect(b!.load).toMatchObject({ field: 3, coupling: 0.6 })
  })
})
