import { describe, expect, it } from 'vitest'
import { blocksOf, eachLine } from '../../../../shared/engine/formats/blocks'
import { createRandom } from '../../../../shared/engine/random'
import { textOf } from '../../../fixtures/problems/bytes'

const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text)

function linesOf(chunks: readonly Uint8Array[]): [number, string][] {
  const lines: [number, string][] = []
  eachLine(chunks, (bytes, start, end, line) => lines.push([line, textOf(bytes.slice(start, end))]))
  return lines
}

describe('eachLine', () => {
  it.each([
    ['LF', 'a\n\nb\n'],
    ['CRLF', 'a\r\n\r\nb\r\n'],
    ['CR alone', 'a\r\rb\r'],
    ['no last line ending', 'a\n\nb'],
    ['a byte order mark', '\ufeffa\n\nb'],
  ])('numbers lines from 1 with %s', (_, text) => {
    expect(linesOf([bytesOf(text)])).toEqual([
      [1, 'a'],
      [2, ''],
      [3, 'b'],
    ])
  })

  it('sees no line in nothing', () => {
    expect(linesOf([])).toEqual([])
    expect(linesOf([new Uint8Array(), bytesOf('\ufeff')])).toEqual([])
  })

  it('sees the same lines however a file is cut, from memory that is used again', () => {
    const random = createRandom(71)
    const text = '\ufeffone\r\ntwo\n\n\nthree and some more\r\n…\nlast'
    const whole = bytesOf(text)
    const expected = linesOf([whole])
    expect(expected.map(([, line]) => line)).toEqual(['one', 'two', '', '', 'three and some more', '…', 'last'])
    function* cut(): Generator<Uint8Array> {
      const memory = new Uint8Array(whole.length)
      for (let start = 0; start < whole.length;) {
        const end = Math.min(whole.length, start + random.below(6))
        memory.fill(0x21)
        memory.set(whole.subarray(start, end))
        yield memory.subarray(0, end - start)
        start = end
      }
    }
    for (let trial = 0; trial < 50; trial++) {
      const lines: [number, string][] = []
      eachLine(cut(), (bytes, start, end, line) => lines.push([line, textOf(bytes.slice(start, end))]))
      expect(lines).toEqual(expected)
    }
  })
})

it('blocks end with a line feed, the last one too', () => {
  for (const { bytes, end } of blocksOf([bytesOf('a b'), bytesOf(' 1\nb'), bytesOf(' c 2\nd d 3')]))
    expect(bytes[end - 1]).toBe(0x0a)
})
