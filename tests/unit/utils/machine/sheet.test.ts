import { describe, expect, it } from 'vitest'
import { calibrateSchema } from '../../../../shared/schemas/machines'
import { issuesInForm, sheetBody, sheetDraftOf, sheetProblems, SHEET_START } from '../../../../utils/machine/sheet'

describe('sheetProblems', () => {
  it('passes the values the form starts with', () => {
    expect(sheetProblems(SHEET_START)).toEqual({})
  })

  it('names figures that are empty, unreadable or beyond their bounds', () => {
    const problems = sheetProblems({ ...SHEET_START, hLow: 0, JHigh: null, sigmaH: Number.NaN, sigmaJ: 11, delay: -1 })
    expect(Object.keys(problems).sort()).toEqual(['JHigh', 'delay', 'hLow', 'sigmaH', 'sigmaJ'])
    expect(problems.hLow).toBe('Lowest h must be below 0.')
    expect(problems.sigmaJ).toBe('σ of J must be at most 10.')
  })

  it('asks for coupling sums only where the machine bounds them, and lets the temperature be empty', () => {
    expect(sheetProblems({ ...SHEET_START, temperature: null })).toEqual({})
    expect(Object.keys(sheetProblems({ ...SHEET_START, hasCouplingSum: true }))).toEqual(['sumLow', 'sumHigh'])
  })

  it('refuses a longest anneal below the shortest', () => {
    expect(sheetProblems({ ...SHEET_START, annealMin: 5, annealMax: 4 }).annealMax).toMatch(/shorter/)
  })
})

describe('sheetBody', () => {
  it('is what the server takes, and comes back as the same draft', () => {
    const draft = {
      ...SHEET_START,
      defects: '3, 17\n4-9',
      hasCouplingSum: true,
      sumLow: -18,
      sumHigh: 15,
      temperature: 13.1,
    }
    const body = calibrateSchema.parse(sheetBody(draft))
    expect(body.defects).toEqual({ qubits: [3, 17], couplers: [[4, 9]] })
    expect(body.ranges!.couplingSum).toEqual([-18, 15])
    expect(sheetDraftOf({ ...sheetBody(draft), remark: 'before' })).toEqual(draft)
  })
})

describe('issuesInForm', () => {
  it('gives entries of the defect list their line and figures their label', () => {
    const issues = issuesInForm(
      [
        { path: 'defects.qubits.2', message: 'no such qubit' },
        { path: 'defects.couplers.0', message: 'no such coupler' },
        { path: 'timing.annealMinMicroseconds', message: 'too long' },
        { path: 'name', message: 'taken' },
      ],
      '1 2\n# none\n\n9999, 5-6',
    )
    expect(issues).toEqual([
      { line: 4, message: 'no such qubit' },
      { line: 4, message: 'no such coupler' },
      { path: 'Shortest anneal', message: 'too long' },
      { path: 'name', message: 'taken' },
    ])
  })
})
