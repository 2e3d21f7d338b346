import { describe, expect, it } from 'vitest'
import { drawnChange, isCoupled, listedDefects, refusalOf } from '../../../../utils/machine/drawn-defects'

/* Qubits 10, 20, 30, 40 in a ring; 40 is missing, and so is the coupler 10-20. */
const machine = {
  ids: Uint32Array.of(10, 20, 30, 40),
  usable: Uint8Array.of(1, 1, 1, 0),
  ends: Uint32Array.of(1, 2),
  missingCouplers: Uint32Array.of(0, 1),
  couplersOfMissing: Uint32Array.of(2, 3, 3, 0),
}
const change = (text: string) => drawnChange(machine, listedDefects(text))
const refusal = (text: string, part: readonly [number] | readonly [number, number]) =>
  refusalOf(machine, listedDefects(text), part)

describe('isCoupled', () => {
  it('knows couplers that work, that are missing, and those of missing qubits', () => {
    const pairs = [
      [1, 2],
      [1, 0],
      [3, 2],
      [0, 2],
    ] as const
    expect(pairs.map(([a, b]) => isCoupled(machine, a, b))).toEqual([true, true, true, false])
  })
})

describe('drawnChange', () => {
  it('is nothing while the list says what the machine is', () => {
    const nothing = { qubitsLost: [], qubitsRegained: [], couplersLost: [], couplersRegained: [] }
    expect(change('40, 20-10')).toEqual(nothing)
    expect(change('40\n10-20, 30-40')).toEqual(nothing)
  })

  it('names what the list adds and takes back', () => {
    expect(change('20 30-40')).toEqual({
      qubitsLost: [20],
      qubitsRegained: [40],
      couplersLost: [[30, 40]],
      couplersRegained: [],
    })
    expect(change('40').couplersRegained).toEqual([[10, 20]])
  })
})

describe('refusalOf', () => {
  it('says why a part cannot be switched', () => {
    expect(refusal('40', [20])).toBeNull()
    expect(refusal('40', [20, 30])).toBeNull()
    expect(refusal('40', [99])).toBe('This machine has no qubit 99.')
    expect(refusal('40', [20, 99])).toBe('This machine has no qubit 99.')
    expect(refusal('40', [10, 30])).toBe('There is no coupler between qubits 10 and 30.')
    expect(refusal('40', [20, 20])).toBe('There is no coupler between qubits 20 and 20.')
    expect(refusal('40', [30, 40])).toMatch(/missing with qubit 40/)
    expect(refusal('', [30, 40])).toBeNull()
  })
})
