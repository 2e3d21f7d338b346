import { describe, expect, it } from 'vitest'
import { createRandom } from '../../../../../shared/engine/random'
import { readSamples } from '../../../../../shared/engine/readout/files'
import type { SamplesReading } from '../../../../../shared/engine/readout/files'
import { writeSamplesCsv } from '../../../../../shared/engine/readout/files/write-csv'
import { packRows } from '../../../../../shared/engine/sampling/merge'
import { spinOf } from '../../../../../shared/engine/sampling/samples'

const qubitIds = [4, 7, 30]
const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text)

/** The same bytes cut into pieces of a few bytes, in memory that is used again. */
function* cut(bytes: Uint8Array, size: number): Generator<Uint8Array> {
  const memory = new Uint8Array(size)
  for (let at = 0; at < bytes.length; at += size) {
    const piece = bytes.subarray(at, at + size)
    memory.set(piece)
    yield memory.subarray(0, piece.length)
    memory.fill(0)
  }
}

/** Read whole, and in pieces: both the same. */
function read(text: string, ids = qubitIds, order: number[] | null = null): SamplesReading {
  const whole = readSamples(bytesOf(text), { qubitIds: ids, order })
  for (const size of [1, 2, 3, 7])
    expect(readSamples(cut(bytesOf(text), size), { qubitIds: ids, order })).toEqual(whole)
  return whole
}
const spinsOf = (text: string): number[][] => {
  const { rows: samples, issues } = read(text)
  if (!samples) throw new Error(issues.map((issue) => issue.message).join('; '))
  return Array.from({ length: samples.rows }, (_, r) => [0, 1, 2].map((c) => spinOf(samples, r, c)))
}
const expected = [
  [1, -1, 1],
  [-1, -1, 1],
]

describe('a table of samples', () => {
  it.each([
    ['comma', '4,7,30\n1,-1,1\n-1,-1,1\n'],
    ['no last line feed', '4,7,30\n1,-1,1\n-1,-1,1'],
    ['other order', '30,4,7\n1,1,-1\n1,-1,-1\n'],
    ['semicolon, CRLF', '4;7;30\r\n1;-1;1\r\n-1;-1;1\r\n'],
    ['tab', '4\t7\t30\n1\t-1\t1\n-1\t-1\t1\n'],
    ['one blank', '4 7 30\n1 -1 1\n-1 -1 1\n'],
    ['aligned blanks', '  4  7  30\n  1 -1   1\n -1 -1   1\n'],
    ['blanks after commas', '4, 7, 30\n1, -1, 1\n-1, -1, 1\n'],
    ['byte-order mark, comments, empty lines', '\uFEFF# returned\n\n4,7,30\n# a\n1,-1,1\n\n-1,-1,1\n  \n'],
    ['quotes', '"4","7","30"\n"1","-1","1"\n"-1","-1","1"\n'],
    ['decimals', '4,7,30\n1.0,-1.0,+1\n-1e0,-1,1.000\n'],
    ['0/1', '4,7,30\n1,0,1\n0,0,1\n'],
    ['leading zeros', '04,007,30\n1,0,1\n0,0,1\n'],
  ])('reads %s', (_name, text) => {
    expect(spinsOf(text)).toEqual(expected)
  })

  it('tells the value set', () => {
    expect(read('4,7,30\n1,0,1\n').valueSet).toBe('0/1')
    expect(read('4,7,30\n1,-1,1\n').valueSet).toBe('±1')
    expect(read('4,7,30\n1,1,1\n').valueSet).toBe('±1')
  })

  it('reads counts, energies and gauges, wherever their columns stand', () => {
    const result = read('energy,4,count,7,30,Gauge\n-1.5,1,3,-1,1,0\n2e-1,-1, 1,-1,1,"2"\n')
    expect(result.issues).toEqual([])
    expect([...result.rows!.counts]).toEqual([3, 1])
    expect(result.hasCounts).toBe(true)
    expect([...result.rows!.energies!]).toEqual([-1.5, 0.2])
    expect([...result.rows!.gauges!]).toEqual([0, 2])
    const plain = read('4,7,30\n1,-1,1\n')
    expect([...plain.rows!.counts]).toEqual([1])
    expect(plain).toMatchObject({ hasCounts: false, columnsFrom: 'file', rejectedCount: 0 })
    expect(plain.rows).toMatchObject({ energies: null, gauges: null })
  })

  it('takes rows without a header where an order of qubits is given', () => {
    const { rows, columnsFrom } = read('1,0,0\n0,0,1\n', qubitIds, [30, 4, 7])
    expect(columnsFrom).toBe('given')
    expect(rows && [0, 1].map((r) => [0, 1, 2].map((c) => spinOf(rows, r, c)))).toEqual([
      [-1, -1, 1],
      [-1, 1, -1],
    ])
    // A header is one all the same, and what the file says holds.
    const named = read('7,4,30\n1,0,0\n', qubitIds, [30, 4, 7])
    expect(named.columnsFrom).toBe('file')
    expect(spinOf(named.rows!, 0, 1)).toBe(1)
    expect(read('1,0,0\n', qubitIds, [30, 4, 4]).issues[0]!.message).toMatch(/occur twice: 4; |twice: 4/)
    expect(read('1,0\n', qubitIds, [30, 4, 7]).issues[0]!).toMatchObject({
      line: 1,
      message: expect.stringMatching(/2 of 3/),
    })
  })

  it.each([
    ['unknown qubits', '4,7,30,31\n1,1,1,1\n', /does not use: 31/],
    ['missing qubits', '4\n1\n', /missing: 7, 30/],
    ['repeated qubits', '4,7,30,4\n1,1,1,1\n', /twice: 4/],
    ['unreadable columns', '4,7,30,-2\n1,1,1,1\n', /"-2"/],
    ['no header', '1,-1,1\n1,1,1\n', /does not use|neither/],
    ['empty text', '', /empty/],
    ['blank text', ' \n\n# nothing\n', /empty/],
    ['no rows', '4,7,30\n', /no row/],
  ])('refuses %s', (_name, text, message) => {
    const { rows: samples, issues } = read(text)
    expect(samples).toBeNull()
    expect(issues.map((issue) => issue.message).join('; ')).toMatch(message)
  })

  it.each([
    ['a short row', '1,1', /the row has 2 of 3 values/],
    ['a long row', '1,1,1,1', /the row has 4 of 3 values/],
    ['a last separator', '1,1,1,', /the row has 4 of 3 values/],
    ['2', '1,2,1', /"2" for qubit 7/],
    ['-2', '1,-2,1', /"-2" for qubit 7/],
    ['a word', '1,up,1', /"up" for qubit 7/],
    ['an empty value', '1,,1', /"" for qubit 7/],
    ['11', '11,1,1', /"11" for qubit 4/],
    ['--1', '1,--1,1', /"--1"/],
    ['NaN', '1,1,NaN', /"NaN" for qubit 30/],
    ['an open end', '1,1,-', /"-" for qubit 30/],
  ])('refuses a row with %s, by its line', (_name, row, message) => {
    const { rows: samples, issues, rejectedCount } = read(`4,7,30\n1,1,1\n${row}\n1,1,1\n`)
    expect(samples).toBeNull()
    expect(rejectedCount).toBe(1)
    expect(issues).toHaveLength(1)
    expect(issues[0]!.line).toBe(3)
    expect(issues[0]!.message).toMatch(message)
  })

  it.each([
    ['count,4,7,30\n0,1,1,1\n', /count must/],
    ['count,4,7,30\n1.5,1,1,1\n', /count must/],
    ['count,4,7,30\n,1,1,1\n', /count must/],
    ['energy,4,7,30\nlow,1,1,1\n', /energy must/],
    ['gauge,4,7,30\n-1,1,1,1\n', /gauge must/],
    ['gauge,4,7,30\n1.5,1,1,1\n', /gauge must/],
    [`energy,4,7,30\n${'1'.repeat(50)}x,1,1,1\n`, /energy must/],
  ])('refuses other columns that are no numbers (%#)', (text, message) => {
    expect(read(text).issues[0]).toMatchObject({ line: 2, message: expect.stringMatching(message) })
  })

  it('refuses a mixture of both sets and names the lines', () => {
    const { rows: samples, issues } = read('4,7,30\n1,-1,1\n1,1,1\n0,1,1\n')
    expect(samples).toBeNull()
    expect(issues[0]!.message).toMatch(/0 in line 4 and -1 in line 2/)
    expect(read('4,7,30\n1,-1,0\n').rows).toBeNull()
  })

  it('lists the first refused rows and counts all, and the first of many qubits', () => {
    const { issues, rejectedCount } = read('4,7,30\n' + '1,9,1\n'.repeat(500))
    expect(rejectedCount).toBe(500)
    expect(issues).toHaveLength(20)
    const wide = read(
      '0\n1\n',
      Array.from({ length: 100 }, (_, q) => q),
    )
    expect(wide.issues[0]!.message).toMatch(/missing: 1, 2, .*… \(99 in all\)/)
  })

  it('refuses bytes that are no text, by their line', () => {
    const bytes = Uint8Array.from([...bytesOf('4,7,30\n1,1,'), 0xff, 0xfe])
    const { rows, issues, isReadToEnd } = readSamples(bytes, { qubitIds, order: null })
    expect(rows).toBeNull()
    expect(isReadToEnd).toBe(false)
    expect(issues[0]).toMatchObject({ line: 2, message: expect.stringMatching(/UTF-8/) })
  })

  it('leaves nothing of a refused plain start in the row read with care', () => {
    const { rows: samples } = read('4,7,30\n1,1, -1\n-1, -1,1\n-1,-1,-1\n')
    expect(samples && [0, 1, 2].map((r) => [0, 1, 2].map((c) => spinOf(samples, r, c)))).toEqual([
      [1, 1, -1],
      [-1, -1, 1],
      [-1, -1, -1],
    ])
  })

  it('reads back what was written, rotated columns as well', () => {
    const random = createRandom(1)
    const ids = Array.from({ length: 53 }, (_, k) => 3 * k + 1)
    const spins = Array.from({ length: 40 * 53 }, () => (random.float() < 0.5 ? 1 : -1))
    const samples = packRows(
      53,
      spins,
      Array.from({ length: 40 }, () => 1 + random.below(1000)),
    )
    const text = writeSamplesCsv(samples, ids)
    expect(read(text, ids).rows).toEqual({ ...samples, energies: null, gauges: null })
    const rotated = text
      .split('\n')
      .map((line) => line.split(','))
      .map((cells) => [...cells.slice(20), ...cells.slice(0, 20)].join(';'))
    expect(read(rotated.join('\n').replace(/;\n*$/, ''), ids).rows).toMatchObject({ ...samples })
    expect(() => writeSamplesCsv(samples, [1])).toThrow(RangeError)
  })
})
