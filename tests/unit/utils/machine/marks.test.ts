import { describe, expect, it } from 'vitest'
import { changeMarks } from '../../../../utils/machine/marks'

const lattice = { ids: Uint32Array.of(10, 20, 30, 40) }
const words = { lost: 'lost', regained: 'regained' }
const NOTHING = { qubitsLost: [], qubitsRegained: [], couplersLost: [], couplersRegained: [] }

describe('changeMarks', () => {
  it('are dense indices of the parts that changed', () => {
    const marks = changeMarks(
      lattice,
      { qubitsLost: [30], qubitsRegained: [10, 20], couplersLost: [[20, 40]], couplersRegained: [[10, 30]] },
      words,
    )
    expect(marks).toEqual({
      qubits: Uint32Array.of(2),
      couplers: Uint32Array.of(1, 3),
      words: 'lost',
      regained: { qubits: Uint32Array.of(0, 1), couplers: Uint32Array.of(0, 2), words: 'regained' },
    })
  })

  it('are none without a change, and leave out parts that the machine does not have', () => {
    expect(changeMarks(lattice, NOTHING, words)).toBeNull()
    const marks = changeMarks(lattice, { ...NOTHING, qubitsLost: [99, 40], couplersLost: [[10, 99]] }, words)!
    expect([...marks.qubits, ...marks.couplers!]).toEqual([3])
  })
})
