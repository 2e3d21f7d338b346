import { describe, expect, it } from 'vitest'
import { familySchema } from '../../../../shared/schemas/machines'
import { FAMILIES, FAMILY_START, readFamily } from '../../../../utils/machine/family'

describe('readFamily', () => {
  it('counts the family that is chosen', () => {
    // Zephyr Z(15,4) has 7 440 qubits and 71 736 couplers (Zephyr topology report, 2021).
    const { figures } = readFamily({ ...FAMILY_START, kind: 'zephyr', m: 15, t: 4 })
    expect(figures).toEqual({ name: 'Z(15,4)', qubits: 7440, couplers: 71_736 })
  })

  it('says which size is missing', () => {
    const { figures, problems } = readFamily({ ...FAMILY_START, kind: 'king', width: null })
    expect(figures).toBeNull()
    expect(problems.join()).toMatch(/^Width must be a whole number/)
    expect(problems.join()).not.toMatch(/NaN/)
  })

  it('offers families that the server takes', () => {
    for (const { kind } of FAMILIES) {
      const { family } = readFamily({ ...FAMILY_START, kind })
      expect(familySchema.parse(family)).toEqual(family)
    }
  })
})
