import { describe, expect, it } from 'vitest'
import type { DifferenceView, VersionChange } from '../../../../shared/schemas/problem-versions'
import { changeWords, leftOut, sourceWords, standingNote, standingWords } from '../../../../utils/problem/versions'

const none: VersionChange = {
  variablesAdded: 0,
  variablesRemoved: 0,
  variablesRenamed: 0,
  linearChanged: 0,
  interactionsAdded: 0,
  interactionsRemoved: 0,
  interactionsChanged: 0,
  offsetChanged: false,
  formChanged: false,
  senseChanged: false,
  graph: 'same',
}

describe('changeWords', () => {
  it('counts each kind once, the thing named first', () => {
    expect(changeWords({ ...none, variablesAdded: 2, variablesRenamed: 1, interactionsChanged: 1400 })).toBe(
      '2 variables added, 1 renamed; 1400 interactions changed'.replace('1400', '1\u202f400'),
    )
    expect(changeWords({ ...none, variablesRemoved: 1, interactionsRemoved: 3 })).toBe(
      '1 variable removed; 3 interactions removed',
    )
    expect(changeWords({ ...none, linearChanged: 1, offsetChanged: true, senseChanged: true, formChanged: true })).toBe(
      '1 linear coefficient changed; offset changed; other form; other sense',
    )
  })

  it('says that only the order changed', () => {
    expect(changeWords(none)).toBe('nothing but the order of the variables')
  })
})

describe('what was made for an earlier version', () => {
  it('is told with what to do', () => {
    expect(standingWords({ version: 3, current: 3, graph: null })).toBeNull()
    expect(standingWords({ version: 1, current: 3, graph: 'same' })).toEqual({
      what: 'Made for version 1; version 3 is current.',
      next: expect.stringMatching(/still holds/),
    })
    expect(standingWords({ version: 1, current: 3, graph: 'changed' })!.next).toMatch(/by repair/)
  })

  it('is noted in a table', () => {
    expect(standingNote({ version: 3, current: 3, graph: null })).toBe('')
    expect(standingNote({ version: 1, current: 3, graph: 'fewer' })).toBe('holds for version 3 too')
    expect(standingNote({ version: 2, current: 3, graph: 'changed' })).toBe('to be repaired for version 3')
  })
})

describe('sourceWords', () => {
  const file = { fileName: 'berths.csv', bytes: 1, sha256: '-' }

  it('says how a version came about', () => {
    expect(sourceWords({ source: file })).toBe('berths.csv')
    expect(sourceWords({ source: { ...file, relabelled: 2 } })).toBe('labels of version 2 edited')
    expect(sourceWords({ source: { ...file, copyOf: { id: 'p', number: 4, version: 1 } } })).toBe('copied from P-4')
  })
})

it('counts what a difference leaves out', () => {
  const difference: DifferenceView = {
    ...none,
    variablesAdded: 60,
    interactionsAdded: 70,
    linearChanged: 5,
    form: 'qubo',
    added: Array.from({ length: 50 }, (_, k) => `v${k}`),
    removed: [],
    renamed: [],
    changes: Array.from({ length: 50 }, () => ({ labels: ['a'], before: 1, after: 2 })),
    offset: { before: 0, after: 0 },
  }
  expect(leftOut(difference)).toEqual({ added: 10, removed: 0, renamed: 0, changes: 25 })
})
