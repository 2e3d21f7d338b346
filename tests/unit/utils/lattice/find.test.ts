import { describe, expect, it } from 'vitest'
import { exactQubit, findThings, qubitWords } from '../../../../utils/lattice/find'
import type { Findable } from '../../../../utils/lattice/find'

const IDS = Uint32Array.of(3, 17, 170, 171, 42, 1)
const MACHINE: Findable = {
  data: { ids: IDS, usable: Uint8Array.of(1, 1, 0, 1, 1, 1) },
  labels: ['dun.10', 'dun.2', 'Dunlin', 'sandun', '17'],
  owner: Int32Array.of(-1, 1, -1, -1, 0, -1),
}
const find = (words: string, most?: number) =>
  findThings(words, MACHINE, most).map((found) =>
    found.kind === 'chain' ? MACHINE.labels[found.variable] : `qubit ${IDS[found.qubit]}`,
  )

describe('findThings', () => {
  it('finds chains by any part of the label, in natural order, whatever the case', () => {
    expect(find('DUN')).toEqual(['dun.2', 'dun.10', 'Dunlin', 'sandun'])
    expect(find('dunlin')).toEqual(['Dunlin'])
    expect(find('x')).toEqual([])
    expect(find('  ')).toEqual([])
  })

  it('finds qubits by number, the very one first', () => {
    expect(find('17')).toEqual(['17', 'qubit 17', 'qubit 170', 'qubit 171'])
    expect(find('1')).toEqual(['17', 'dun.10', 'qubit 1', 'qubit 17', 'qubit 170', 'qubit 171'])
    expect(find('qubit 17', 2)).toEqual(['qubit 17', 'qubit 170'])
    expect(find('q42')).toEqual(['qubit 42'])
  })

  it('keeps room for a qubit where many labels match', () => {
    const crowd = { ...MACHINE, labels: Array.from({ length: 30 }, (_, i) => `17.${i}`) }
    expect(findThings('17', crowd, 5).map(({ kind }) => kind)).toEqual(['chain', 'chain', 'chain', 'chain', 'qubit'])
  })
})

describe('qubits', () => {
  it('are free, missing, or in a chain', () => {
    expect(qubitWords(0, MACHINE)).toBe('free')
    expect(qubitWords(1, MACHINE)).toBe('in the chain of dun.2')
    expect(qubitWords(2, MACHINE)).toBe('missing')
    expect(qubitWords(2, { ...MACHINE, owner: new Int32Array(6).fill(0) })).toBe('missing, in the chain of dun.10')
  })

  it('are read from a number', () => {
    expect(exactQubit(' qubit 42 ', IDS)).toBe(4)
    expect(exactQubit('43', IDS)).toBe(null)
    expect(exactQubit('dun', IDS)).toBe(null)
  })
})
