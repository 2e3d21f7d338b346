import { expect, it } from 'vitest'
import { csvCell, csvWords } from '../../../shared/csv'

it.each([
  ['Rowan', 'Rowan'],
  ['a,b', '"a,b"'],
  ['a "b"', '"a ""b"""'],
  ['a\nb', '"a\nb"'],
  ['=1+1', '=1+1'],
])('writes the value %j as %j', (text, cell) => {
  expect(csvCell(text)).toBe(cell)
})

it.each([
  ['Rowan', 'Rowan'],
  ['a=b', 'a=b'],
  ['=HYPERLINK("http://x")', `"'=HYPERLINK(""http://x"")"`],
  ['+1', "'+1"],
  ['-1', "'-1"],
  ['@sum', "'@sum"],
])('writes words %j as %j, which no spreadsheet takes for a formula', (text, cell) => {
  expect(csvWords(text)).toBe(cell)
})
