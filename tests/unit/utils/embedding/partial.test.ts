import { describe, expect, it } from 'vitest'
import { partialLayer, sharersOf, withWhole } from '../../../../utils/embedding/partial'

const lattice = { ids: Uint32Array.from([10, 20, 30, 40]) }
const chains = { a: [10, 20], b: [20, 30], c: [40], d: [] }
const chainsOf = ({ offsets, qubits }: { offsets: Uint32Array; qubits: Uint32Array }) =>
  [...offsets.subarray(1)].map((end, i) => [...qubits.subarray(offsets[i], end)])

describe('the closest state of a search', () => {
  const layer = partialLayer(lattice, chains)

  it('keeps shared qubits in every chain that wants them', () => {
    expect(layer.labels).toEqual(['a', 'b', 'c', 'd'])
    expect(chainsOf(layer)).toEqual([[0, 1], [1, 2], [3], []])
    expect([...layer.wanted]).toEqual([1])
  })

  it('draws the chain in focus whole, and the others without its qubits', () => {
    expect(chainsOf(withWhole(layer, 0))).toEqual([[0, 1], [2], [3], []])
    expect(chainsOf(withWhole(layer, 1))).toEqual([[0], [1, 2], [3], []])
    expect(chainsOf(withWhole(layer, null))).toEqual(chainsOf(layer))
  })

  it('names whose chains share a qubit', () => {
    expect(sharersOf(chains, 'a')).toEqual(['b'])
    expect(sharersOf(chains, 'c')).toEqual([])
  })
})
