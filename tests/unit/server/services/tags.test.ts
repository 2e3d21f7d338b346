import { describe, expect, it } from 'vitest'
import { copyName } from '../../../../server/services/problem-copies'
import { changedTags } from '../../../../server/services/problem-tags'
import { editTagsSchema, libraryQuerySchema } from '../../../../shared/schemas/library'

const change = (tags: string[], edit: { add?: string[]; remove?: string[] }, inUse: string[] = []) =>
  changedTags(tags, editTagsSchema.parse(edit), inUse)

describe('changedTags', () => {
  it('adds and takes away whatever the case, keeping the spelling that is there', () => {
    expect(change(['Deck'], { add: ['deck', ' night   boats '], remove: ['DECK'] })).toEqual(['deck', 'night boats'])
    expect(change(['Deck'], { add: ['DECK'] })).toEqual(['Deck'])
    expect(change([], { add: ['WINTER', 'winter'] }, ['Winter'])).toEqual(['Winter'])
  })

  it('keeps to twenty', () => {
    const twenty = Array.from({ length: 20 }, (_, k) => `t${k}`)
    expect(() => change(twenty, { add: ['one more'] })).toThrow(/at most 20 tags; this would make 21/)
    expect(change(twenty, { add: ['one more'], remove: ['t3'] })).toHaveLength(20)
  })

  it.each([['   '], ['x'.repeat(41)], ['a\0b']])('are refused as “%s”', (tag) => {
    expect(editTagsSchema.safeParse({ add: [tag] }).success).toBe(false)
  })
})

describe('the library’s query', () => {
  it('takes a tag once or several times', () => {
    expect(libraryQuerySchema.parse({}).tag).toEqual([])
    expect(libraryQuerySchema.parse({ tag: 'a' }).tag).toEqual(['a'])
    expect(libraryQuerySchema.parse({ tag: ['a', 'b'] }).tag).toEqual(['a', 'b'])
  })

  it.each([
    { sort: 'colour' },
    { direction: 'up' },
    { state: 'lost' },
    { limit: '0' },
    { limit: '201' },
    { q: 'x'.repeat(201) },
  ])('refuses %j', (query) => expect(libraryQuerySchema.safeParse(query).success).toBe(false))
})

it('names a copy within the length of a name', () => {
  expect(copyName('Deck radio channels')).toBe('Deck radio channels, copy')
  expect(copyName('x'.repeat(120))).toHaveLength(120)
})
