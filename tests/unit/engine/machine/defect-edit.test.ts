import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { DefectPart } from '../../../../shared/engine/machine/defect-edit'
import { withPart } from '../../../../shared/engine/machine/defect-edit'
import { parseDefectText } from '../../../../shared/engine/machine/defect-text'

describe('withPart', () => {
  it('adds to the last line, or below a comment or a long line', () => {
    expect(withPart('', [17], true)).toBe('17')
    expect(withPart('3, 4-9', [17, 42], true)).toBe('3, 4-9, 17-42')
    expect(withPart('3\n', [17], true)).toBe('3\n17')
    expect(withPart('3 # left edge', [17], true)).toBe('3 # left edge\n17')
    const long = Array.from({ length: 40 }, (_, k) => 100 + k).join(', ')
    expect(withPart(long, [17], true)).toBe(`${long}\n17`)
  })

  it('takes out every mention, comments and all else as they were', () => {
    expect(withPart('17, 17-42 17 # amplifier 17\n3;17;4\n17', [17], false)).toBe('17-42 # amplifier 17\n3;4')
    expect(withPart('42 \u2013 17, 8', [17, 42], false)).toBe('8')
    expect(withPart('117, 17-1, 170', [17], false)).toBe('117, 17-1, 170')
    expect(withPart('17 # only this\n8', [17], false)).toBe('# only this\n8')
  })

  it('changes what the list says in that part alone', () => {
    const number = fc.nat(30)
    const dash = fc.constantFrom('-', ' - ', '\u2013', '\u2212')
    const entry = fc.oneof(
      number.map(String),
      fc.tuple(number, dash, number).map((parts) => parts.join('')),
      fc.constantFrom('x', '1-2-3', '# 4 note\n'),
    )
    const text = fc
      .array(fc.tuple(entry, fc.constantFrom(', ', ' ', ';', '\n', ',,', '\r\n')), { maxLength: 30 })
      .map((pieces) => pieces.flat().join(''))
    const part = fc.oneof(
      number.map((q): DefectPart => [q]),
      fc.tuple(number, number).filter(([a, b]) => a !== b) as fc.Arbitrary<DefectPart>,
    )
    const nameOf = (pair: readonly number[]) => [...pair].sort((a, b) => a - b).join('-')
    /** Everything that the list says, in order, without the part. */
    const others = (list: string, left: DefectPart) => {
      const { qubits, couplers, rejected } = parseDefectText(list)
      const names = [...qubits.map(String), ...couplers.map(nameOf)].filter((name) => name !== nameOf(left))
      return { names, rejected: rejected.map(({ text: entry }) => entry) }
    }
    const says = (list: string, wanted: DefectPart) => {
      const { qubits, couplers } = parseDefectText(list)
      return [...qubits.map(String), ...couplers.map(nameOf)].includes(nameOf(wanted))
    }
    fc.assert(
      fc.property(text, part, fc.boolean(), (list, changed, isMissing) => {
        const after = withPart(list, changed, isMissing)
        expect(says(after, changed)).toBe(isMissing)
        expect(others(after, changed)).toEqual(others(list, changed))
      }),
      { numRuns: 400 },
    )
  })
})
