import { describe, expect, it } from 'vitest'
import { forEachLine } from '../../../../shared/engine/formats/lines'

function linesOf(text: string): [number, string][] {
  const lines: [number, string][] = []
  forEachLine(text, (start, end, line) => lines.push([line, text.slice(start, end)]))
  return lines
}

describe('forEachLine', () => {
  it.each([
    ['LF', 'a\n\nb\n'],
    ['CRLF', 'a\r\n\r\nb\r\n'],
    ['CR alone', 'a\r\rb\r'],
    ['no last line ending', 'a\n\nb'],
    ['a byte order mark', '\ufeffa\n\nb'],
  ])('numbers lines from 1 with %s', (_, text) => {
    expect(linesOf(text)).toEqual([
      [1, 'a'],
      [2, ''],
      [3, 'b'],
    ])
  })

  it('sees no line in nothing', () => {
    expect(linesOf('')).toEqual([])
    expect(linesOf('\ufeff')).toEqual([])
  })
})
