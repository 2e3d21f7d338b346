import { describe, expect, it } from 'vitest'
import type { MachineBreaks, PartRate } from '../../../../shared/schemas/machine-use'
import {
  heatLayerOf,
  heatWords,
  ratioCases,
  rateCases,
  rowsOf,
  suspectsOf,
  suspicionOf,
} from '../../../../utils/machine/breaks'
import { HEAT_CLASSES } from '../../../../utils/lattice/scene-heat'
import { explain } from '../../../../utils/help/registry'

const rate = (count: number, given: Partial<PartRate> = {}): PartRate => ({
  count,
  total: 3000,
  rate: count / 3000,
  low: 0,
  high: 1,
  neighbours: 12,
  neighbourRate: 0.05,
  ratio: count / 150,
  q: 0.5,
  suspect: false,
  ...given,
})

const breaks: MachineBreaks = {
  calibration: 2,
  rehearsals: false,
  returns: [],
  leftOut: 0,
  embeddings: 3,
  reads: 3000,
  qubits: [
    { id: 9, ...rate(600, { q: 0.004, suspect: true }) },
    { id: 5, ...rate(0) },
  ],
  couplers: [
    { a: 17, b: 42, ...rate(360, { ratio: 2.3, q: 0.001, suspect: true }) },
    { a: 5, b: 9, ...rate(30, { neighbours: 0, neighbourRate: null, ratio: null, q: null }) },
  ],
  judged: { qubits: { tested: 2, spread: 0.1 }, couplers: { tested: 1, spread: 0.8 } },
}

describe('suspicions', () => {
  it('name couplers, then qubits, with what they rest on', () => {
    const [coupler, qubit] = suspectsOf(breaks)
    expect([coupler!.row.key, qubit!.row.key]).toEqual(['17-42', '9'])
    expect(suspicionOf(coupler!.row).replace(/\s/g, ' ')).toBe(
      'breaks 2.3 times as often as its neighbours (12 % of 3 000 reads against 5 %, q = 0.001)',
    )
  })

  it('say so where the neighbours never broke', () => {
    const row = { ...rowsOf(breaks, 'couplers')[0]!, ratio: null, neighbourRate: 0, q: 1e-9 }
    expect(suspicionOf(row)).toMatch(/^breaks while its neighbours never did .* q below 0\.000001\)$/)
  })
})

describe('explanations', () => {
  it('are given for every rate, and for ratios that there are', () => {
    const rows = rowsOf(breaks, 'couplers')
    expect(rateCases(rows, 'couplers', false).map(({ help }) => explain(help).result)).toHaveLength(2)
    const [only, ...others] = ratioCases(rows, 'couplers', breaks)
    expect(others).toEqual([])
    expect(explain(only!.help).result).toBe('2.3')
  })
})

describe('the layer of the lattice', () => {
  it('finds parts by their published numbers, palest first, and leaves out what is not there', () => {
    const data = { ids: Uint32Array.of(5, 9, 17), ends: Uint32Array.of(0, 1, 1, 2) }
    const heat = heatLayerOf(breaks, data)
    expect([...heat.qubits]).toEqual([0, 1])
    expect([...heat.couplers]).toEqual([0])
    expect([...heat.couplerRates]).toEqual([0.01])
  })

  it('has words for every class', () => {
    expect(heatWords).toHaveLength(HEAT_CLASSES)
  })
})
