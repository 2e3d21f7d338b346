import { describe, expect, it } from 'vitest'
import { sheetDifference } from '../../../../shared/sheet-difference'
import { energyTexts, figureText, isUnchanged, listText, partChanges } from '../../../../utils/machine/changes'
import { sheetBody, SHEET_START } from '../../../../utils/machine/sheet'

const sheet = (change: Partial<typeof SHEET_START>) => sheetBody({ ...SHEET_START, ...change })

describe('the words of a change', () => {
  it('are none between equal sheets', () => {
    const change = sheetDifference(sheet({ defects: '1, 2-3' }), sheet({ defects: '1, 2-3' }))
    expect(isUnchanged(change)).toBe(true)
    expect(partChanges(change)).toEqual([])
  })

  it('name parts lost and regained, and each figure that moved', () => {
    const change = sheetDifference(
      sheet({ defects: '1 2 7-8', sigmaH: 0.021 }),
      sheet({ defects: '2 139 7-9', sigmaH: 0.02, temperature: 13.1, hLow: -2, price: 1, currency: 'eur' }),
    )
    expect(isUnchanged(change)).toBe(false)
    expect(partChanges(change)).toEqual([
      { what: '1 qubit lost', names: [139] },
      { what: '1 qubit regained', names: [1] },
      { what: '1 coupler lost', names: ['7–9'] },
      { what: '1 coupler regained', names: ['7–8'] },
    ])
    expect(change.figures.map(figureText)).toEqual([
      { label: 'h', from: '±1', to: '−2 to 1', unit: '' },
      { label: 'σ of h', from: '0.021', to: '0.020', unit: '' },
      { label: 'Temperature', from: 'not measured', to: '13.1', unit: 'mK' },
      { label: 'Price of a second', from: 'not stated', to: '1', unit: '' },
      { label: 'Currency', from: 'not stated', to: 'EUR', unit: '' },
    ])
  })

  it('say what the energies did', () => {
    const plain = sheet({ energyTable: '0,9,0\n1,0,12' })
    const bent = sheet({ energyTable: '0,9,0\n0.5,2,6\n1,0,12' })
    expect(energyTexts(sheetDifference(plain, bent).energies)).toEqual(['A differs most at s = 0.5: 4.5 → 2 GHz'])
    expect(energyTexts(sheetDifference(sheet({}), bent).energies)).toEqual(['Energy table given'])
    expect(energyTexts(sheetDifference(bent, sheet({})).energies)).toEqual(['Energy table withdrawn'])
    expect(energyTexts(sheetDifference(bent, bent).energies)).toEqual([])
  })
})

describe('listText', () => {
  it('cuts long lists and says how many are left out', () => {
    expect(listText([1, 2])).toBe('1, 2')
    expect(listText([1, 2, 3, 4], 2)).toBe('1, 2 and 2 more')
  })
})
