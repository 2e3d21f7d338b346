import { describe, expect, it } from 'vitest'
import type { ProblemDocument } from '../../../../shared/engine/formats/format'
import { matrixMarket } from '../../../../shared/engine/formats/matrix-market'
import { buildProblem } from '../../../../shared/engine/problem/build'
import { createRandom } from '../../../../shared/engine/random'
import { fileOf, textOf } from '../../../fixtures/problems/bytes'
import { dyadic, randomOrder, randomProblem, real } from '../../../fixtures/problems/random-problem'

const read = (text: string, options = {}) => matrixMarket.read(fileOf(text), options)
const banner = (rest: string) => `%%MatrixMarket matrix ${rest}\n`

/** Coefficients as an upper triangle of plain numbers. */
function cells(text: string, options = {}): number[][] {
  const { problem, issues } = read(text, options)
  if (!problem) throw new Error(issues[0]!.message)
  const dense = Array.from(problem.linear, (value, i) => {
    const row = new Array<number>(problem.n).fill(0)
    row[i] = value
    return row
  })
  problem.values.forEach((value, k) => (dense[problem.rows[k]!]![problem.cols[k]!] = value))
  return dense
}

describe('reading Matrix Market', () => {
  const expected = [
    [1, 5, 0],
    [0, 0, -2.5],
    [0, 0, 4],
  ]

  it.each([
    ['coordinate real general', '3 3 5\n1 1 1\n1 2 2\n2 1 3\n3 2 -2.5\n3 3 4\n', 'both'],
    ['coordinate real symmetric', '3 3 4\n1 1 1.0\n2 1 2.5\n3 2 -1.25\n3 3 4\n', 'symmetric'],
    ['array real general', '3 3\n1\n3\n0\n2\n0\n-2.5\n0\n0\n4\n', 'both'],
    ['array real symmetric', '3 3\n1\n2.5\n0\n0\n-1.25\n4\n', 'symmetric'],
  ])('%s', (kind, body, triangle) => {
    for (const form of ['qubo', 'ising'] as const) {
      const reading = read(banner(kind) + body, { form })
      expect(reading).toMatchObject({ form, triangle, labels: ['1', '2', '3'], duplicatesSummed: 0, rejectedCount: 0 })
      expect(cells(banner(kind) + body, { form })).toEqual(expected)
    }
  })

  it('takes blank lines, comments, CRLF, any case and several values of an array in a line', () => {
    const text = '%%matrixmarket MATRIX Array Integer General\r\n% notes: none\r\n\r\n 2 2 \r\n1 3\r\n2 4\r\n'
    expect(cells(text)).toEqual([
      [1, 5],
      [0, 4],
    ])
  })

  it('shows what the file states, and sums a cell that stands twice', () => {
    const symmetric = read(`${banner('coordinate integer symmetric')}2 2 3\n2 1 3\n2 1 4\n1 1 9\n`)
    expect(symmetric.firstRows).toEqual([
      ['2', '1', 3],
      ['2', '1', 4],
      ['1', '1', 9],
    ])
    expect(symmetric).toMatchObject({ duplicatesSummed: 1, entriesRead: 3 })
    expect([...symmetric.problem!.values]).toEqual([14])
    const mirrored = read(`${banner('coordinate integer general')}2 2 3\n1 2 3\n2 1 3\n2 1 0\n`)
    expect(mirrored).toMatchObject({ duplicatesSummed: 1, triangle: 'symmetric' })
  })

  it('heeds directives and names in its comments', () => {
    const text = `${banner('coordinate real general')}% form: ising\n% sense: max\n% offset: 3\n% variable 2: "north ""A"" berth"\n2 2 1\n1 2 4\n`
    const reading = read(text)
    expect(reading).toMatchObject({ form: 'ising', formSource: 'file', sense: 'max', labels: ['1', 'north "A" berth'] })
    expect(reading.problem!.offset).toBe(-3)
    expect([...reading.problem!.values]).toEqual([-4])
  })

  it('rejects entries line by line', () => {
    const reading = read(
      `${banner('coordinate integer symmetric')}2 2 8\n1 1 5\n0 1 1\n3 1 1\n1 2 1\n2 1\n2 1 x\n2 1 0.5\n-1 1 1\n`,
    )
    expect(reading.rejected.map(({ line, reason }) => [line, reason])).toEqual([
      [4, 'row 0, column 1 is outside the 2 × 2 that line 2 states; rows and columns count from 1'],
      [5, 'row 3, column 1 is outside the 2 × 2 that line 2 states; rows and columns count from 1'],
      [6, 'row 1, column 2 is above the diagonal; a symmetric file holds the lower triangle alone'],
      [7, 'expected 3 columns (row, column, value), found 2'],
      [8, 'the value "x" is not a decimal number'],
      [9, 'the value 0.5 is not whole, as line 1 states'],
      [10, 'the row "-1" is not a whole number'],
    ])
    expect(reading.problem!.linear[0]).toBe(5)
  })

  it.each<[string, string, number | undefined, RegExp]>([
    ['', '', undefined, /empty/],
    ['no banner', '1 1 1\n', 1, /first line must be/],
    ['pattern', `${banner('coordinate pattern general')}1 1 1\n1 1\n`, 1, /pattern file says where/],
    ['complex', `${banner('coordinate complex general')}1 1 0\n`, 1, /complex/],
    ['skew', `${banner('coordinate real skew-symmetric')}1 1 0\n`, 1, /cancel/],
    ['hermitian', `${banner('coordinate real hermitian')}1 1 0\n`, 1, /hermitian/],
    ['vector', '%%MatrixMarket vector coordinate real general\n', 1, /first line must be/],
    ['layout', banner('sparse real general'), 1, /layout must be coordinate or array, not "sparse"/],
    ['no size', `${banner('array real general')}% only this\n`, undefined, /no size line/],
    ['bad size', `${banner('coordinate real general')}2 2\n`, 2, /3 whole numbers/],
    ['not square', `${banner('array real general')}2 3\n`, 2, /not square: 2 rows and 3 columns/],
    ['too large', `${banner('coordinate real general')}99999999 99999999 0\n`, 2, /at most 1000000/],
    ['dense too large', `${banner('array real general')}5001 5001\n`, 2, /at most 5000/],
    [
      'too few',
      `${banner('coordinate real general')}2 2 2\n1 1 1\n`,
      2,
      /promises 2 entries, the file holds 1: is it cut/,
    ],
    ['too many', `${banner('array real general')}1 1\n1\n2\n`, 2, /promises 1 values, the file holds 2/],
    ['a hole', `${banner('array real general')}1 1\nNaN\n`, 3, /incomplete: line 3, the value "NaN"/],
    [
      'names',
      `${banner('coordinate real general')}% variable 1: a\n% variable 2: A\n2 2 1\n1 2 1\n`,
      3,
      /upper and lower/,
    ],
  ])('finds no problem: %s', (_, text, line, message) => {
    const reading = read(text)
    expect(reading.problem).toBeNull()
    expect(reading.issues[0]!.message).toMatch(message)
    expect(reading.issues[0]!.line).toBe(line)
  })

  it('reads the same however the file is cut', () => {
    const text = `\uFEFF${banner('coordinate real symmetric')}% sense: max\n3 3 3\n1 1 1.5e-3\n2 1 -2\n3 2 0.125`
    const [whole] = fileOf(text)
    const expected = read(text)
    for (const size of [1, 2, 3, 7, 20])
      expect(
        matrixMarket.read(
          Array.from({ length: Math.ceil(whole!.length / size) }, (_, k) => whole!.subarray(k * size, (k + 1) * size)),
          {},
        ),
      ).toEqual(expected)
  })
})

describe('writing Matrix Market', () => {
  const names = ['3', 'a,b', '#x', ' lead', 'q"q', '%', '船', '1.5', '-']

  it.each(['qubo', 'ising'] as const)('comes back to the last bit: %s', (form) => {
    const random = createRandom(61)
    for (let trial = 0; trial < 40; trial++) {
      const n = 1 + random.below(names.length)
      const named = randomOrder(random, names.length)
        .slice(0, n)
        .map((k) => names[k]!)
      const labels = trial % 2 === 0 ? named : Array.from({ length: n }, (_, i) => String(i + 1))
      const problem = randomProblem(random, n, random.float(), trial % 3 === 0 ? real : dyadic)
      const document: ProblemDocument = { form, labels, problem, sense: trial % 4 < 2 ? 'min' : 'max' }
      const reading = matrixMarket.read([matrixMarket.write(document)], {})
      expect(reading.issues).toEqual([])
      expect(reading).toMatchObject({ form, sense: document.sense, labels, problem, rejectedCount: 0 })
    }
  })

  it('writes the upper triangle, and names where there are any', () => {
    const problem = buildProblem(2, { rows: [0, 1], cols: [1, 1], values: [0.5, -2] }, 1).problem
    expect(textOf(matrixMarket.write({ form: 'qubo', labels: ['a', '2'], problem, sense: 'min' }))).toBe(
      '%%MatrixMarket matrix coordinate real general\n% form: qubo\n% sense: min\n% offset: 1\n% variable 1: a\n% variable 2: 2\n2 2 2\n2 2 -2\n1 2 0.5\n',
    )
  })
})
