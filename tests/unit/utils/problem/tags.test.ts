import { describe, expect, it } from 'vitest'
import { noTagWords, tagAnswers } from '../../../../utils/problem/tags'

const inUse = [
  { tag: 'Deck', count: 1 },
  { tag: 'night deck', count: 3 },
  { tag: 'winter', count: 12 },
]

describe('tagAnswers', () => {
  it('offers tags in use, those that begin with the words first, and the words as a new tag', () => {
    expect(tagAnswers('deC', inUse, [])).toEqual([
      { key: 'Deck', label: 'Deck', note: '1 problem' },
      { key: 'night deck', label: 'night deck', note: '3 problems' },
      { key: 'deC', label: 'deC', note: 'new tag' },
    ])
  })

  it('does not offer a tag in use as new, nor one that is borne', () => {
    expect(tagAnswers(' DECK ', inUse, []).map(({ key }) => key)).toEqual(['Deck', 'night deck'])
    expect(tagAnswers('winter', inUse, ['Winter'])).toEqual([])
  })

  it('knows how long and how many they may be', () => {
    expect(tagAnswers('x'.repeat(41), inUse, [])).toEqual([])
    expect(tagAnswers('x'.repeat(40), inUse, [])).toHaveLength(1)
    expect(tagAnswers('a  b', inUse, [])[0]!.key).toBe('a b')
    expect(tagAnswers('   ', inUse, [])).toEqual([])
    const full = Array.from({ length: 20 }, (_, k) => `t${k}`)
    expect(tagAnswers('winter', inUse, full)).toEqual([])
  })
})

describe('noTagWords', () => {
  it('says why there is none', () => {
    expect(noTagWords('winter', ['Winter'])).toBe('It has this tag already.')
    expect(noTagWords('x'.repeat(41), [])).toMatch(/40 characters/)
    expect(
      noTagWords(
        'x',
        Array.from({ length: 20 }, (_, k) => `t${k}`),
      ),
    ).toMatch(/at most 20 tags/)
  })
})
