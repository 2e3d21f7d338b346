import { describe, expect, it } from 'vitest'
import { calibrateSchema } from '../../../../shared/schemas/machines'
import { sheetBody, sheetDraftOf, sheetProblems, SHEET_START } from '../../../../utils/machine/sheet'
import { issuesInForm, refusedFields } from '../../../../utils/machine/sheet-issues'

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

describe('what the form and the server refuse', () => {
  const draft = (change: Partial<typeof SHEET_START>) => ({
    ...SHEET_START,
    hasCouplingSum: true,
    sumLow: -1,
    sumHigh: 1,
    ...change,
  })
  const bothWays = (change: Partial<typeof SHEET_START>) => {
    const answered = calibrateSchema.safeParse(sheetBody(draft(change)))
    const issues = (answered.error?.issues ?? []).map(({ path, message }) => ({ path: path.join('.'), message }))
    return [Object.keys(sheetProblems(draft(change))), Object.keys(refusedFields(issues))]
  }

  it.each([
    ['hLow', { hLow: 0.5 }],
    ['hHigh', { hHigh: -1 }],
    ['JLow', { JLow: 1 }],
    ['JHigh', { JHigh: 0 }],
    ['sumLow', { sumLow: 2 }],
    ['sumHigh', { sumHigh: -2 }],
    ['sigmaH', { sigmaH: -0.1 }],
    ['sigmaJ', { sigmaJ: 10.5 }],
    ['programming', { programming: -1 }],
    ['readout', { readout: 2e9 }],
    ['delay', { delay: -0.5 }],
    ['annealMax', { annealMin: 5, annealMax: 4 }],
    ['slopeMax', { slopeMax: 0 }],
    ['schedulePoints', { schedulePoints: 1 }],
    ['schedulePoints', { schedulePoints: 2.5 }],
    ['temperature', { temperature: 0 }],
    ['price', { price: -1, currency: 'EUR' }],
    ['currency', { price: 1, currency: 'euro' }],
    ['currency', { price: 1 }],
  ])('is the same: %s', (field, change) => {
    expect(bothWays(change)).toEqual([[field], [field]])
  })

  it('keeps what is beyond all numbers and a table with a gap in the form', () => {
    expect(sheetProblems(draft({ readout: Infinity })).readout).toMatch(/beyond/)
    expect(sheetProblems(draft({ energyTable: '0,9,0\n0.9,0,12' })).energyTable).toMatch(/1 wrong line/)
    const issues = calibrateSchema.safeParse({ energyTable: { s: [0, 0.9], A: [9, 0], B: [0, 12] } }).error!.issues
    expect(issues.map(({ path, message }) => `${path.join('.')} ${message}`)).toEqual([
      'energyTable.s.1 row 2: the last row must be s = 1, not 0.9',
    ])
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
      slopeMax: 0.5,
      schedulePoints: 12,
      energyTable: 's,A (GHz),B (GHz)\n0,9,0\n1,0,12',
      price: 0.8,
      currency: 'EUR',
    }
    const body = calibrateSchema.parse(sheetBody(draft))
    expect(body.defects).toEqual({ qubits: [3, 17], couplers: [[4, 9]] })
    expect(body.ranges!.couplingSum).toEqual([-18, 15])
    expect(body.energyTable).toEqual({ s: [0, 1], A: [9, 0], B: [0, 12] })
    expect(body.price).toEqual({ perSecond: 0.8, currency: 'EUR' })
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
        { path: 'ranges.h.1', message: 'too low' },
        { path: 'energyTable.A.3', message: 'row 4: too high' },
        { path: 'name', message: 'taken' },
      ],
      '1 2\n# none\n\n9999, 5-6',
    )
    expect(issues).toEqual([
      { line: 4, message: 'no such qubit' },
      { line: 4, message: 'no such coupler' },
      { path: 'Shortest anneal', message: 'too long' },
      { path: 'Highest h', message: 'too low' },
      { path: 'Energy table', message: 'row 4: too high' },
      { path: 'name', message: 'taken' },
    ])
  })
})
