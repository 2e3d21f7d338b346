import { describe, expect, it } from 'vitest'
import { packChains } from '../../../../shared/engine/embedding/embedding'
import { verifyEmbedding } from '../../../../shared/engine/embedding/verify'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import { cycleGraph, gridGraph } from '../../../fixtures/graphs'

// A triangle on a 3 × 2 grid: 0 1 2 / 3 4 5.
const problem = cycleGraph(3)
const machine = gridGraph(3, 2)
const usable = new Uint8Array(6).fill(1)
const rulesOf = (chains: number[][], mask = usable): string[] =>
  verifyEmbedding(problem, machine, mask, chains).map(
    ({ rule, variables, qubits }) => `${rule} ${variables} @ ${qubits}`,
  )

describe('verifyEmbedding', () => {
  it('accepts a valid embedding, as lists or packed', () => {
    const chains = [[0, 3], [1], [4]]
    expect(rulesOf(chains)).toEqual([])
    expect(verifyEmbedding(problem, machine, usable, packChains(chains))).toEqual([])
    expect(verifyEmbedding(graphFromEdges(0, []), machine, usable, [])).toEqual([])
  })

  it('names each broken rule', () => {
    expect(rulesOf([[0, 3], [1], []])).toEqual(['empty chain 2 @ ', 'missing coupler 0,2 @ ', 'missing coupler 1,2 @ '])
    expect(rulesOf([[0, 3], [1], [4, 6]])).toEqual(['unknown qubit 2 @ 6'])
    expect(rulesOf([[0, 3], [1], [4, 4.5]])).toEqual(['unknown qubit 2 @ 4.5'])
    expect(rulesOf([[0, 3], [1], [4, -1]])).toEqual(['unknown qubit 2 @ -1'])
    expect(rulesOf([[0, 3, 0], [1], [4]])).toEqual(['repeated qubit 0 @ 0'])
    expect(rulesOf([[0, 3], [1, 4], [4]])).toEqual(['shared qubit 1,2 @ 4'])
    expect(rulesOf([[0, 3], [1], [4, 2]])).toEqual(['disconnected chain 2 @ 2'])
    expect(rulesOf([[0, 3], [1], [5]])).toEqual(['missing coupler 0,2 @ ', 'missing coupler 1,2 @ '])
  })

  it('does not count qubits that are missing on the machine, nor their couplers', () => {
    const mask = Uint8Array.of(1, 1, 1, 0, 1, 1)
    expect(rulesOf([[0, 3], [1], [4]], mask)).toEqual(['missing qubit 0 @ 3', 'missing coupler 0,2 @ '])
  })

  it('takes absent chains at the end as empty and refuses more chains than variables', () => {
    expect(rulesOf([[0, 3], [1]])[0]).toBe('empty chain 2 @ ')
    expect(() => rulesOf([[0], [1], [2], [3]])).toThrow(RangeError)
  })

  it('speaks in the names it is given', () => {
    const naming = { label: (i: number) => `berth ${'abc'[i]}`, qubitName: (q: number) => String(100 + q) }
    const [violation] = verifyEmbedding(problem, machine, usable, [[0, 3], [1, 4], [4]], naming)
    expect(violation!.message).toBe('Qubit 104 is in the chains of berth b, berth c; it can serve only one.')
  })
})
