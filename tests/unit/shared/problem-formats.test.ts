import { expect, it } from 'vitest'
import { FORMATS } from '../../../shared/engine/formats'
import { PROBLEM_FORMATS } from '../../../shared/problem-formats'

it('tells of every format that there is a reader for, and of no other', () => {
  const told = Object.entries(PROBLEM_FORMATS).map(([id, { title, endings }]) => ({ id, title, endings }))
  const read = FORMATS.map(({ id, title, extensions }) => ({ id, title, endings: extensions }))
  const byId = (a: { id: string }, b: { id: string }) => a.id.localeCompare(b.id)
  expect(told.sort(byId)).toEqual(read.sort(byId))
})
