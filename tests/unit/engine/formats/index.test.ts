import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { detectFormat, FORMATS, readProblem, writeProblem } from '../../../../shared/engine/formats/index'
import { createRandom } from '../../../../shared/engine/random'
import { dyadic, randomProblem } from '../../../fixtures/problems/random-problem'

const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text)
const fixture = (name: string): Uint8Array =>
  readFileSync(new URL(`../../../fixtures/problems/${name}`, import.meta.url))

describe('detectFormat', () => {
  it.each([
    ['berths-semicolon-crlf.csv', 'coefficients'],
    ['radio-ising.tsv', 'coefficients'],
    ['crews-max.txt', 'coefficients'],
    ['faulty-lines.csv', 'coefficients'],
    ['matrix-symmetric-labelled.csv', 'dense-csv'],
    ['matrix-upper.txt', 'dense-csv'],
  ])('%s', (name, id) => expect(detectFormat(fixture(name)).id).toBe(id))

  it.each([
    ['', 'coefficients'],
    ['hello there\n', 'coefficients'],
    ['north berth slot\nslot two three four\n', 'coefficients'],
    ['0 1 2\n', 'coefficients'],
    ['0 0 1\n0 1 2\n1 1 3\n', 'coefficients'],
    ['-1.5 2.5 0\n2.5 1.5 0\n0 0 1\n', 'dense-csv'],
    [',a,b\na,1,2\nb,3,4\n', 'dense-csv'],
    ['1,2\n3,4\n', 'dense-csv'],
    ['7\n', 'dense-csv'],
    [`${'0.5e0 '.repeat(20_000)}\n`, 'dense-csv'],
    [`${'1 '.repeat(50_000)}\n1\n`, 'dense-csv'],
  ])('%#', (text, id) => expect(readProblem(bytesOf(text)).format).toBe(id))
})

describe('readProblem and writeProblem', () => {
  it('read back what the text formats write, detected or named', () => {
    const problem = randomProblem(createRandom(51), 3, 1, dyadic)
    for (const id of ['coefficients', 'dense-csv']) {
      const text = writeProblem(id, { form: 'ising', labels: ['0', '1', '2'], problem, sense: 'max' })
      expect(readProblem(text)).toMatchObject({ format: id, form: 'ising', sense: 'max', problem })
      expect(readProblem(text, { format: id, sense: 'min' })).toMatchObject({ format: id, sense: 'min' })
    }
  })

  it.each([
    [Uint8Array.of(0xff, 0xfe, 0x00, 0xc0), false],
    [Uint8Array.of(0x1f, 0x8b, 8, 0, 1), false],
    [bytesOf('a b c d\n'), true],
  ])('%# tell bytes that are no such file from a file that is wrong', (bytes, isReadToEnd) => {
    const reading = readProblem(bytes)
    expect(reading.problem).toBeNull()
    expect(reading.isReadToEnd).toBe(isReadToEnd)
    expect(reading.issues.length).toBeGreaterThan(0)
  })

  it('name the formats there are', () => {
    expect(() => readProblem(bytesOf(''), { format: 'tarot' })).toThrow(
      /^unknown format "tarot": expected coefficients, dense-csv, .* or \S+$/,
    )
    expect(new Set(FORMATS.map((format) => format.id)).size).toBe(FORMATS.length)
  })

  it('read a list longer than what detection looks at', () => {
    const text = Array.from({ length: 20_000 }, (_, k) => `x${k % 300},x${(k * 7 + 1) % 300},0.5`).join('\n')
    expect(readProblem(bytesOf(text))).toMatchObject({ format: 'coefficients', entriesRead: 20_000, rejectedCount: 0 })
  })
})
