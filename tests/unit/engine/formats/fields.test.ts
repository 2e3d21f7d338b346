import { describe, expect, it } from 'vitest'
import { splitFields, surveyLine } from '../../../../shared/engine/formats/fields'

function cut(line: string): string[] | string {
  const { start, end, delimiter } = surveyLine(line, 0, line.length)
  return splitFields(line, start, end, delimiter)
}

describe('surveyLine and splitFields', () => {
  it.each<[string, string[] | string]>([
    ['a b 3', ['a', 'b', '3']],
    ['  a \t b   3  ', ['a ', 'b   3'].map((field) => field.trim())],
    ['a,b,3', ['a', 'b', '3']],
    ['a , b c , 3', ['a', 'b c', '3']],
    ['a;b,c;3', ['a', 'b,c', '3']],
    ['a\tb c\t3', ['a', 'b c', '3']],
    ['a,,3', ['a', '', '3']],
    ['a,b,', ['a', 'b', '']],
    [',b,3', ['', 'b', '3']],
    ['"a b" "c;d" 3', ['a b', 'c;d', '3']],
    ['"a, ""b""",c,"3"', ['a, "b"', 'c', '3']],
    ['"" x', ['', 'x']],
    ['5"pipe,a""b,3', ['5"pipe', 'a""b', '3']],
    ['" # " a 3', [' # ', 'a', '3']],
    ['x#1 y 3 # note, with; signs', ['x#1', 'y', '3']],
    ['"a b 3', 'a quotation mark is not closed'],
    ['"a"b c 3', 'text follows a closing quotation mark'],
    ['a\u00a0b\u00a03', ['a', 'b', '3']],
  ])('%j', (line, expected) => {
    expect(cut(line)).toEqual(expected)
  })

  it('finds comments and blank lines', () => {
    expect(surveyLine('# form: ising', 0, 13)).toMatchObject({ start: 0, end: 0, comment: 1 })
    expect(surveyLine('  \t ', 0, 4)).toMatchObject({ start: 4, end: 4, comment: -1 })
    expect(surveyLine('a 1 #x', 0, 6)).toMatchObject({ start: 0, end: 3, comment: 5 })
  })
})
