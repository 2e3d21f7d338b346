import { describe, expect, it } from 'vitest'
import type { RunSheetItem } from '../../../../shared/schemas/run-sheets'
import {
  isNarrowed,
  libraryAddress,
  libraryFacts,
  libraryQuery,
  libraryView,
  rowsWords,
  soughtWords,
  stateChoices,
  tagChoices,
} from '../../../../utils/problem/library'

const PLAIN = libraryView({})
const summary = {
  total: 1234,
  states: { 'not embedded': 1000, embedded: 200, 'in review': 4, returned: 30 },
  tags: [
    { tag: 'Deck', count: 1 },
    { tag: 'winter', count: 1500 },
  ],
}

describe('the address of the library', () => {
  it('without anything shows what changed last', () => {
    expect(PLAIN).toEqual({
      q: '',
      tag: [],
      form: null,
      state: null,
      sort: 'changedAt',
      direction: 'descending',
      cursor: null,
    })
    expect(libraryQuery(PLAIN)).toEqual({})
    expect(libraryAddress(PLAIN)).toBe('/api/problems?limit=100')
    expect(isNarrowed(PLAIN)).toBe(false)
  })

  it('keeps search, filters, order and page', () => {
    const query = {
      q: 'berth 3',
      tag: ['winter', 'crew plan'],
      form: 'ising',
      state: 'to carry over',
      sort: 'best',
      direction: 'descending',
      cursor: 'MTAw',
    }
    const view = libraryView(query)
    expect(libraryQuery(view)).toEqual(query)
    expect(libraryView(libraryQuery(view) as never)).toEqual(view)
    const address = new URL(libraryAddress(view), 'http://x')
    expect(address.searchParams.getAll('tag')).toEqual(['winter', 'crew plan'])
    expect(Object.fromEntries(address.searchParams)).toMatchObject({
      q: 'berth 3',
      state: 'to carry over',
      limit: '100',
    })
    expect(isNarrowed(view)).toBe(true)
  })

  it('leaves out what goes without saying, by the field sorted by', () => {
    expect(libraryQuery(libraryView({ sort: 'name', direction: 'ascending' }))).toEqual({ sort: 'name' })
    expect(libraryQuery(libraryView({ sort: 'changedAt', direction: 'ascending' }))).toEqual({ direction: 'ascending' })
  })

  it('passes over what means nothing', () => {
    expect(libraryView({ sort: 'colour', direction: 'up', state: 'lost', form: 'sudoku', q: null, tag: null })).toEqual(
      PLAIN,
    )
  })
})

describe('words about it', () => {
  it('say what was sought', () => {
    expect(soughtWords({ ...PLAIN, q: 'berth' })).toBe('hold “berth”')
    expect(soughtWords({ ...PLAIN, q: 'berth', tag: ['winter', 'Deck'], form: 'ising', state: 'embedded' })).toBe(
      'hold “berth”, are tagged winter, Deck, are in Ising form and are “embedded”',
    )
  })

  it('say which rows are shown', () => {
    expect(rowsWords(0, 3, 3)).toBe('3 problems')
    expect(rowsWords(0, 1, 1)).toBe('1 problem')
    expect(rowsWords(100, 100, 10_000)).toBe('101 to 200 of 10\u202f000 problems')
  })

  it('offer every state with its count, and the tags not sought yet', () => {
    expect(stateChoices(summary).find(({ value }) => value === 'in review')).toMatchObject({ note: '4' })
    expect(stateChoices(summary).find(({ value }) => value === 'draft')).toMatchObject({ note: '0' })
    expect(tagChoices(summary, ['Deck'])).toEqual([{ value: 'winter', label: 'winter', note: '1\u202f500' }])
  })
})

describe('libraryFacts', () => {
  it('says how many are to be carried over, where there are any', () => {
    const facts = libraryFacts({ total: 3, states: { 'to carry over': 2, draft: 1 } }, [])
    expect(facts.slice(2, 4)).toEqual([
      { label: 'To carry over', value: '2', note: 'to the current version' },
      { label: 'With a run sheet', value: '1', note: 'for the current version' },
    ])
  })

  const sheet = (number: number, state: RunSheetItem['state']) => ({ number, state }) as RunSheetItem

  it('counts over the whole library', () => {
    const facts = libraryFacts(summary, [sheet(7, 'in review'), sheet(6, 'in review'), sheet(5, 'returned')])
    expect(facts.map(({ label, value, note }) => [label, String(value), note])).toEqual([
      ['Problems', '1\u202f234', undefined],
      ['Not embedded yet', '1\u202f000', undefined],
      ['With a run sheet', '34', undefined],
      ['Waiting for a reviewer', '2', 'RS-7 and more'],
      ['Approved, not issued', '0', undefined],
      ['Returned', '1', 'RS-5'],
    ])
  })
})
