import { describe, expect, it } from 'vitest'
import { formatDefectText, parseDefectText } from '../../../../shared/engine/machine/defects'

describe('parseDefectText', () => {
  it('reads qubits and couplers however they are set apart', () => {
    expect(parseDefectText('17, 42 103-110;9\r\n\t5–6 7 — 8,\n12 −13\n\n0')).toEqual({
      qubits: [17, 42, 9, 0],
      couplers: [
        [103, 110],
        [5, 6],
        [7, 8],
        [12, 13],
      ],
      rejected: [],
    })
  })

  it('skips comments, and keeps order and repeats', () => {
    expect(parseDefectText('# since 2 Dec, 07:30\n8 3 8 # 4\n2-1 1-2')).toEqual({
      qubits: [8, 3, 8],
      couplers: [
        [2, 1],
        [1, 2],
      ],
      rejected: [],
    })
  })

  it('rejects the rest with line, text and reason', () => {
    expect(parseDefectText('1 q17\n3-3\n-4, 1-2-3\n4294967296 1.5 5-').rejected).toEqual([
      { line: 1, text: 'q17', reason: 'neither a qubit number nor a coupler such as 17-42' },
      { line: 2, text: '3-3', reason: 'a coupler joins two different qubits' },
      { line: 3, text: '-4', reason: 'neither a qubit number nor a coupler such as 17-42' },
      { line: 3, text: '1-2-3', reason: 'a coupler joins two qubits; ranges of qubits are not understood' },
      { line: 4, text: '4294967296', reason: 'qubit numbers end at 4294967295' },
      { line: 4, text: '1.5', reason: 'neither a qubit number nor a coupler such as 17-42' },
      { line: 4, text: '5-', reason: 'neither a qubit number nor a coupler such as 17-42' },
    ])
  })

  it('takes an empty text for an empty list', () => {
    expect(parseDefectText(' \n')).toEqual({ qubits: [], couplers: [], rejected: [] })
  })
})

describe('formatDefectText', () => {
  it('writes what the reader reads back', () => {
    const qubits = Array.from({ length: 30 }, (_, k) => 7 * k)
    const couplers = Array.from({ length: 13 }, (_, k): [number, number] => [k, 3 * k + 1])
    const text = formatDefectText({ qubits, couplers })
    expect(parseDefectText(text)).toEqual({ qubits, couplers, rejected: [] })
    expect(text.split('\n').map((line) => line.split(', ').length)).toEqual([12, 12, 6, 12, 1])
  })

  it('writes qubits before couplers', () => {
    expect(formatDefectText({ qubits: [17, 42], couplers: [[103, 110]] })).toBe('17, 42\n103-110')
    expect(formatDefectText({ qubits: [], couplers: [] })).toBe('')
  })
})
