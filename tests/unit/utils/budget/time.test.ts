import { describe, expect, it } from 'vitest'
import type { BudgetUse } from '../../../../shared/schemas/budget'
import { budgetFacts, machineTime, monthName, monthSeries, monthsOf, useRows } from '../../../../utils/budget/time'
import { MINUS, THIN_SPACE } from '../../../../utils/format'

const alder = { id: 'a', name: 'Alder' }
const rowan = { id: 'r', name: 'Rowan' }
const berths = { id: 'p1', number: 1, name: 'Berths' }
const decks = { id: 'p2', number: 2, name: 'Decks' }
const spent: BudgetUse[] = [
  { month: '2027-01', machine: alder, problem: berths, seconds: 3 },
  { month: '2026-11', machine: alder, problem: decks, seconds: 1 },
  { month: '2026-11', machine: rowan, problem: decks, seconds: 4 },
]

describe('what was spent', () => {
  it('is shown for every month from the first to the last, over the turn of the year', () => {
    expect(monthsOf(spent)).toEqual(['2026-11', '2026-12', '2027-01'])
    expect(monthsOf([])).toEqual([])
    expect(monthName('2026-12')).toBe('Dec 2026')
    const series = monthSeries(spent).map(({ name, points }) => [name, points.map(({ y }) => y)])
    expect(series).toEqual([
      ['Alder', [1, 0, 3]],
      ['Rowan', [4, 0, 0]],
    ])
  })

  it('is added up by machine and by problem, the most first, with its share', () => {
    expect(useRows(spent, 'machine').map(({ name, seconds, share }) => [name, seconds, share])).toEqual([
      ['Alder', 4, 0.5],
      ['Rowan', 4, 0.5],
    ])
    expect(useRows(spent, 'problem').map(({ name, to, seconds }) => [name, to, seconds])).toEqual([
      ['P-2 Decks', '/problems/p2', 5],
      ['P-1 Berths', '/problems/p1', 3],
    ])
  })
})

it('writes machine time in a fitting unit, and with a minus where more was spent than granted', () => {
  expect(machineTime(0.2302)).toBe(`230.2${THIN_SPACE}ms`)
  expect(machineTime(-0.002)).toBe(`${MINUS}2${THIN_SPACE}ms`)
  expect(machineTime(3725)).toBe(`1${THIN_SPACE}h 2${THIN_SPACE}min`)
})

it('does not round away that something is spent or held', () => {
  const total = { grantedSeconds: 1000, spentSeconds: 1, reservedSeconds: 1, availableSeconds: 998 }
  const notes = budgetFacts(total, 1).map(({ note }) => note)
  expect(notes.at(-1)).toBe(`over 99${THIN_SPACE}% of it`)
})

it('says when the budget is overspent', () => {
  const total = { grantedSeconds: 1, spentSeconds: 1.5, reservedSeconds: 0, availableSeconds: -0.5 }
  expect(budgetFacts(total, 0).map(({ note }) => note)).toEqual([
    undefined,
    `150${THIN_SPACE}% of it`,
    'for nothing',
    'overspent',
  ])
})
