import { describe, expect, it } from 'vitest'
import { chainClasses, chainsOfClasses } from '../../../../utils/lattice/kinds'

/** Chains of the given lengths on consecutive qubits. */
function chainsOf(lengths: readonly number[]) {
  const offsets = new Uint32Array(lengths.length + 1)
  lengths.forEach((length, i) => (offsets[i + 1] = offsets[i]! + length))
  return {
    labels: lengths.map((_, i) => `v${i}`),
    offsets,
    qubits: Uint32Array.from({ length: offsets[lengths.length]! }, (_, q) => q),
  }
}
const read = (classes: ReturnType<typeof chainClasses>) => classes.map(({ words, variables }) => [words, ...variables])

describe('chainClasses', () => {
  it('parts lengths into classes of about the same number of chains, each length in one class', () => {
    expect(read(chainClasses({ lens: 'occupancy', chains: chainsOf([1, 2, 2, 3, 5, 5, 8, 8]) }))).toEqual([
      ['1–2 qubits', 0, 1, 2],
      ['3 qubits', 3],
      ['4–5 qubits', 4, 5],
      ['6–8 qubits', 6, 7],
    ])
    expect(read(chainClasses({ lens: 'occupancy', chains: chainsOf([1, 1]) }))).toEqual([['1 qubit', 0, 1]])
    expect(chainClasses({ lens: 'occupancy', chains: chainsOf([]) })).toEqual([])
  })

  it('takes the fullest qubit of a chain in the load lens', () => {
    const load = { qubitLoad: Float32Array.of(0.2, 0.95, 0.7, 0.5, 0.8) }
    expect(read(chainClasses({ lens: 'load', chains: chainsOf([2, 1, 2]), load }))).toEqual([
      ['up to 70 %', 1],
      ['to 90 %', 2],
      ['over 90 %', 0],
    ])
  })

  it('parts chains by break rate, and goes by length where the lens has no data', () => {
    const breaks = { chainRate: Float64Array.of(0, 0.02, 0.021, 0.3), couplerRate: new Map(), reads: 100 }
    const chains = chainsOf([1, 1, 1, 1])
    expect(read(chainClasses({ lens: 'breaks', chains, breaks }))).toEqual([
      ['never broken', 0],
      ['up to 2 %', 1],
      ['to 10 %', 2],
      ['over 10 %', 3],
    ])
    expect(read(chainClasses({ lens: 'breaks', chains }))).toEqual([['1 qubit', 0, 1, 2, 3]])
  })
})

describe('chainsOfClasses', () => {
  it('gives the chains of the named classes', () => {
    const classes = chainClasses({ lens: 'occupancy', chains: chainsOf([1, 4, 4, 9]) })
    const keys = new Set([classes[0]!.key, classes.at(-1)!.key, 'unknown'])
    expect([...chainsOfClasses(classes, keys)].sort()).toEqual([0, 3])
    expect(chainsOfClasses(classes, new Set()).size).toBe(0)
  })
})
