import { describe, expect, it } from 'vitest'
import { listText, sheetChanges } from '../../../../utils/machine/changes'
import { sheetBody, SHEET_START } from '../../../../utils/machine/sheet'

const sheet = (change: Partial<typeof SHEET_START>) => sheetBody({ ...SHEET_START, ...change })

describe('sheetChanges', () => {
  it('finds nothing between equal sheets', () => {
    expect(sheetChanges(sheet({ defects: '1, 2-3' }), sheet({ defects: '1, 2-3' }))).toEqual({
      qubitsLost: [],
      qubitsBack: [],
      couplersLost: [],
      couplersBack: [],
      figures: [],
    })
  })

  it('names parts lost and back, and each figure that moved', () => {
    const changes = sheetChanges(
      sheet({ defects: '1 2 7-8', sigmaH: 0.021 }),
      sheet({ defects: '2 139 7-9', sigmaH: 0.02, temperature: 13.1, hLow: -2 }),
    )
    expect(changes.qubitsLost).toEqual([139])
    expect(changes.qubitsBack).toEqual([1])
    expect(changes.couplersLost).toEqual(['7–9'])
    expect(changes.couplersBack).toEqual(['7–8'])
    expect(changes.figures).toEqual([
      { label: 'h', from: '±1', to: '−2 to 1', unit: '' },
      { label: 'σ of h', from: '0.021', to: '0.020', unit: '' },
      { label: 'Temperature', from: 'not measured', to: '13.1', unit: 'mK' },
    ])
  })
})

describe('listText', () => {
  it('cuts long lists and says how many are left out', () => {
    expect(listText([1, 2])).toBe('1, 2')
    expect(listText([1, 2, 3, 4], 2)).toBe('1, 2 and 2 more')
  })
})
