import { describe, expect, it } from 'vitest'
import type { ComparedSheet } from '../../../shared/run-sheet-comparison'
import { comparisonOf } from '../../../shared/run-sheet-comparison'
import type { RunSheetView } from '../../../shared/schemas/run-sheets'
import { runSheetSettingsSchema } from '../../../shared/schemas/run-sheets'
import { comparedText, differencesIn } from '../../../utils/run-sheet/comparison'

function sheet(number: number, change: Partial<ComparedSheet> = {}): ComparedSheet {
  return {
    id: `id-${number}`,
    number,
    name: `Sheet ${number}`,
    state: 'draft',
    problem: { id: 'p', number: 1, name: 'Berths' },
    ofVersion: { version: 1, current: 1 },
    embedding: { id: 'e', number: 2 },
    machine: { id: 'm', name: 'Alder' },
    calibration: 3,
    fingerprints: { problem: 'p', embedding: 'e', programmed: 'ab'.repeat(32) },
    settings: runSheetSettingsSchema.parse({}),
    rules: [{ title: 'Root-mean-square', value: 1, selected: true }],
    strengths: [
      { label: 'x', strength: 2 },
      { label: 'y', strength: 3 },
    ],
    scale: 0.5,
    limitedBy: 'J',
    precision: { fieldsUnderTwoSigma: null, couplingsUnderTwoSigma: 0.25, energyNoise: 1.5 },
    machineTime: { parts: [{ part: 'Anneal', reckoning: '', milliseconds: 20 }], totalMilliseconds: 20, price: null },
    checks: [{ about: 'ranges', verdict: 'passed', what: 'Fits', figure: '', at: '#origin' }],
    ...change,
  } as unknown as ComparedSheet
}

const differing = (a: ComparedSheet, b: ComparedSheet) =>
  comparisonOf(a, b).groups.flatMap(({ fields }) => fields.filter(({ differs }) => differs).map(({ field }) => field))

describe('two run sheets compared', () => {
  it('differ in nothing but number and name where one copies the other', () => {
    const comparison = comparisonOf(sheet(1), sheet(2))
    expect(differencesIn(comparison)).toEqual({ fields: 0, checks: 0, strengths: 0 })
    expect(comparison.strengths.same).toBe(2)
    expect([comparison.a.number, comparison.b.number]).toEqual([1, 2])
  })

  it('say every field that differs, with both values', () => {
    const settings = runSheetSettingsSchema.parse({
      reads: 500,
      schedule: [
        { microseconds: 0, s: 0 },
        { microseconds: 8, s: 1 },
      ],
    })
    const other = sheet(2, { settings, scale: 0.4, machineTime: { ...sheet(2).machineTime, totalMilliseconds: 12 } })
    expect(differing(sheet(1), other)).toEqual(['Reads', 'Schedule', 'Scale', 'Estimate'])
    const fields = comparisonOf(sheet(1), other).groups.flatMap((group) => group.fields)
    expect(fields.find(({ field }) => field === 'Schedule')).toMatchObject({
      a: 'straight ramp',
      b: 's 0 at 0 µs, s 1 at 8 µs',
    })
    expect(differing(other, sheet(1))).toEqual(differing(sheet(1), other))
  })

  it('list strengths by label, and chains that only one of them has', () => {
    const strengths = [
      { label: 'y', strength: 4 },
      { label: 'z', strength: 1 },
    ]
    expect(comparisonOf(sheet(1), sheet(2, { strengths })).strengths).toEqual({
      same: 0,
      differing: [
        { label: 'x', a: 2, b: null },
        { label: 'y', a: 3, b: 4 },
        { label: 'z', a: null, b: 1 },
      ],
    })
  })

  it('hold checks of one subject beside each other', () => {
    const checks = [
      { about: 'ranges', verdict: 'refused', what: 'Leaves', figure: '', at: '' },
      { about: 'price', verdict: 'passed', what: 'About 1 EUR', figure: '', at: '' },
    ] as RunSheetView['checks']
    expect(comparisonOf(sheet(1), sheet(2, { checks })).checks).toEqual([
      {
        about: 'ranges',
        a: { verdict: 'passed', what: 'Fits' },
        b: { verdict: 'refused', what: 'Leaves' },
        differs: true,
      },
      { about: 'price', a: null, b: { verdict: 'passed', what: 'About 1 EUR' }, differs: true },
    ])
  })

  it.each([
    ['', null, '–'],
    ['', 'straight ramp', 'straight ramp'],
    ['share', 0.25, '25 %'],
    ['J', 0.123456789, '0.12346'],
    ['', 1000, '1 000'],
  ])('write a value of %o down', (unit, value, text) => {
    expect(comparedText({ unit }, value).replaceAll(/\s/g, ' ')).toBe(text)
  })

  it('write fingerprints short', () => {
    expect(comparedText({ unit: '' }, 'ab'.repeat(32)).length).toBeLessThan(12)
  })
})
