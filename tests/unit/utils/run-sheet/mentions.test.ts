import { expect, it } from 'vitest'
import { askedBefore, membersFor, withMentions } from '../../../../utils/run-sheet/mentions'

const members = [
  { id: '1', name: 'Ida Fenn' },
  { id: '2', name: 'Ida Fennimore' },
  { id: '3', name: 'Per Lind' },
]

it.each([
  ['Ask @', { from: 4, words: '' }],
  ['Ask @Ida F', { from: 4, words: 'Ida F' }],
  ['(@per', { from: 1, words: 'per' }],
  ['mail@host', null],
  ['@ then', null],
  ['@Ida\nnext', null],
  ['no', null],
])('knows what is asked at the end of %j', (text, expected) => {
  expect(askedBefore(text, text.length)).toEqual(expected)
})

it('asks for what stands before the caret alone', () => {
  expect(askedBefore('@Per and @Ida', 4)).toEqual({ from: 0, words: 'Per' })
})

it('offers whose names, or a word of them, begin so', () => {
  const offered = (words: string) => membersFor(members, words).map(({ id }) => id)
  expect(offered('')).toEqual(['1', '2', '3'])
  expect(offered('ida f')).toEqual(['1', '2'])
  expect(offered('LIND')).toEqual(['3'])
  expect(offered('x')).toEqual([])
})

it('sends ids in place of names, the longest that fits, and of two alike the one that was chosen', () => {
  expect(withMentions('@Ida Fennimore, @Ida Fenn and @Per Lind.', [], members)).toBe('@[2], @[1] and @[3].')
  expect(withMentions('@Ida Fennimores a@Per Lind @Nobody', [], members)).toBe('@Ida Fennimores a@Per Lind @Nobody')
  expect(withMentions('@Per Lind', [{ id: '4', name: 'Per Lind' }], members)).toBe('@[4]')
})
