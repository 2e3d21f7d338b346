import { expect, it } from 'vitest'
import { mentionedIn, partsOf, withNames } from '../../../shared/mentions'

const ida = { id: 'id-1', name: 'Ida Fenn' }

it('finds each id once, and nothing in what only looks alike', () => {
  expect(mentionedIn('@[id-1] and @[id_2], then @[id-1] again')).toEqual(['id-1', 'id_2'])
  expect(mentionedIn('a@b.example, @[], @[no space], [id-1]')).toEqual([])
})

it('splits a text at the mentions that are known', () => {
  expect(partsOf('Look, @[id-1]: @[gone]', [ida])).toEqual([{ text: 'Look, ' }, ida, { text: ': @[gone]' }])
  expect(partsOf('nobody', [ida])).toEqual([{ text: 'nobody' }])
  expect(withNames('@[id-1], again @[id-1].', [ida])).toBe('@Ida Fenn, again @Ida Fenn.')
})
