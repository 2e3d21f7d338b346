import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { readDefectFile } from '../../../../shared/engine/machine/defect-file'
import { parseDefectText } from '../../../../shared/engine/machine/defect-text'

const partsOf = (contents: string, columns?: 'couplers' | 'qubits') => {
  const { qubits, couplers } = parseDefectText(readDefectFile(contents, columns).text!)
  return { qubits, couplers }
}

describe('readDefectFile', () => {
  it('takes a list as it is typed, line for line', () => {
    const read = readDefectFile('\ufeff# found in November\n3, 17\n4-9\n')
    expect(read).toEqual({ text: '# found in November\n3, 17\n4-9', issues: [], kind: 'list' })
  })

  it('takes two columns as couplers, with a header or not, unless told that they are qubits', () => {
    for (const text of ['4,9\n5;6 # weak', '"a","b"\n4 9\r\n"5","6"']) {
      expect(readDefectFile(text).kind).toBe('couplers')
      expect(partsOf(text)).toEqual({
        qubits: [],
        couplers: [
          [4, 9],
          [5, 6],
        ],
      })
    }
    expect(partsOf('4,9\n5,6', 'qubits')).toEqual({ qubits: [4, 9, 5, 6], couplers: [] })
    expect(partsOf('4,9\n5,6,7')).toEqual({ qubits: [4, 9, 5, 6, 7], couplers: [] })
  })

  it('takes JSON with qubits, couplers or both', () => {
    expect(partsOf('{"qubits":[3,17],"couplers":[[4,9]]}')).toEqual({ qubits: [3, 17], couplers: [[4, 9]] })
    expect(partsOf(' {"couplers": [[9, 4]]}').couplers).toEqual([[9, 4]])
  })

  it('names what is wrong by line or by place', () => {
    const lines = readDefectFile('3\nx7, 5-5\n1-2-3').issues
    expect(lines.map(({ line, message }) => `${line}: ${message}`)).toEqual([
      '2: “x7”: neither a qubit number nor a coupler such as 17-42',
      '2: “5-5”: a coupler joins two different qubits',
      '3: “1-2-3”: a coupler joins two qubits; ranges of qubits are not understood',
    ])
    const json = readDefectFile('{"qubits": [3, -1, "4"], "couplers": [[1], [2, 2], 7]}')
    expect(json.text).toBeNull()
    expect(json.issues.map(({ path }) => path)).toEqual([
      'qubits[1]',
      'qubits[2]',
      'couplers[0]',
      'couplers[1]',
      'couplers[2]',
    ])
    expect(readDefectFile('{"qubits": 3}').issues).toEqual([{ path: 'qubits', message: 'must be a list' }])
    expect(readDefectFile('[1, 2]').issues[0]!.message).toContain('must hold')
    const broken = readDefectFile('{\n "qubits": [1,\n 2 3]\n}')
    expect(broken.text).toBeNull()
    expect(broken.issues[0]!.message).toContain('not valid JSON')
  })

  it('never fails, and what it takes reads as it says', () => {
    const contents = fc.oneof(
      fc.string(),
      fc.json(),
      fc.array(fc.constantFrom('1', '22', ',', '-', '\n', ' ', '#', '{', '[', '"')).map((pieces) => pieces.join('')),
    )
    fc.assert(
      fc.property(contents, (text) => {
        const read = readDefectFile(text)
        if (read.text === null) expect(read.issues.length).toBeGreaterThan(0)
        else expect(parseDefectText(read.text).rejected.length > 0).toBe(read.issues.length > 0)
      }),
    )
  })
})
