import { describe, expect, it } from 'vitest'
import type { ProblemItem } from '../../../../shared/schemas/problems'
import type { RunSheetItem } from '../../../../shared/schemas/run-sheets'
import { filterProblems, libraryFacts, sortProblems } from '../../../../utils/problem/library'

const item = (number: number, name: string, rest: Partial<ProblemItem> = {}): ProblemItem => ({
  id: `p${number}`,
  number,
  name,
  form: 'qubo',
  sense: 'min',
  variables: 10 * number,
  interactions: 5,
  density: 0.1,
  embedding: null,
  runSheet: null,
  best: null,
  changedAt: `2026-12-0${number}T00:00:00Z`,
  ...rest,
})

const berths = item(1, 'Berths against arrivals', {
  embedding: { id: 'e', number: 4, status: 'found', machine: 'Alder', longestChain: 5 },
  runSheet: { id: 'r', number: 7, state: 'returned' },
  best: -188,
})
const radio = item(2, 'Deck radio channels', { best: 24 })
const crews = item(3, 'Two crews', {
  form: 'ising',
  embedding: { id: 'f', number: 1, status: 'none found', machine: 'Juniper', longestChain: null },
})
const all = [berths, radio, crews]
const numbers = (items: ProblemItem[]) => items.map(({ number }) => number)

describe('sortProblems', () => {
  it('sorts both ways without touching what it was given', () => {
    expect(numbers(sortProblems(all, { field: 'name', direction: 'ascending' }))).toEqual([1, 2, 3])
    expect(numbers(sortProblems(all, { field: 'changedAt', direction: 'descending' }))).toEqual([3, 2, 1])
    expect(numbers(all)).toEqual([1, 2, 3])
  })

  it.each(['ascending', 'descending'] as const)('keeps those without a value last, %s', (direction) => {
    expect(numbers(sortProblems(all, { field: 'best', direction })).at(-1)).toBe(3)
  })

  it('puts equals in the order of their numbers', () => {
    expect(numbers(sortProblems([crews, radio, berths], { field: 'interactions', direction: 'descending' }))).toEqual([
      1, 2, 3,
    ])
  })
})

describe('filterProblems', () => {
  it.each([
    ['', [1, 2, 3]],
    ['P-2', [2]],
    ['deck CHANNELS', [2]],
    ['alder', [1]],
    ['rs-7', [1]],
    ['returned', [1]],
    ['ising', [3]],
    ['deck alder', []],
  ])('"%s" leaves %j', (typed, expected) => {
    expect(numbers(filterProblems(all, typed))).toEqual(expected)
  })
})

describe('libraryFacts', () => {
  it('counts what was never embedded, and names the first run sheet of a state', () => {
    const sheets = [
      { number: 9, state: 'in review' },
      { number: 8, state: 'in review' },
      { number: 7, state: 'returned' },
    ] as RunSheetItem[]
    expect(libraryFacts(7, all, sheets)).toEqual([
      { label: 'Problems', value: 7 },
      { label: 'Not embedded yet', value: 1 },
      { label: 'With a run sheet', value: 1 },
      { label: 'Waiting for a reviewer', value: 2, note: 'RS-9 and more' },
      { label: 'Approved, not issued', value: 0, note: undefined },
      { label: 'Returned', value: 1, note: 'RS-7' },
    ])
  })
})
