import { expect, it } from 'vitest'
import { FORMATS } from '../../../shared/engine/formats'
import { PROBLEM_FILES } from '../../../shared/problem-files'

it('every format can be taken out, once', () => {
  const offered = Object.values(PROBLEM_FILES).map(({ format }) => format)
  expect([...offered].sort()).toEqual(FORMATS.map(({ id }) => id).sort())
})

it('endings are those of the formats', () => {
  for (const { format, ending } of Object.values(PROBLEM_FILES))
    expect(FORMATS.find(({ id }) => id === format)!.extensions).toContain(ending)
})
