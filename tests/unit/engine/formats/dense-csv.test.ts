import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { denseCsv } from '../../../../shared/engine/formats/dense-csv'
import type { ProblemDocument, ProblemReading } from '../../../../shared/engine/formats/format'
import { buildProblem } from '../../../../shared/engine/problem/build'
import { createRandom } from '../../../../shared/engine/random'
import { fileOf, textOf } from '../../../fixtures/problems/bytes'
import { dyadic, randomOrder, randomProblem, real } from '../../../fixtures/problems/random-problem'

const fixture = (name: string): string =>
  readFileSync(new URL(`../../../fixtures/problems/${name}`, import.meta.url), 'utf8')

const write = (document: ProblemDocument): string => textOf(denseCsv.write(document))

const read = (text: string, options = {}): ProblemReading => denseCsv.read(fileOf(text), options)

const coefficientsOf = ({ problem }: ProblemReading) => ({
  linear: [...problem!.linear],
  pairs: Array.from(problem!.values, (value, k) => [problem!.rows[k], problem!.cols[k], value]),
})

describe('reading a dense matrix', () => {
  const expected = {
    linear: [-1, -3, 4],
    pairs: [
      [0, 1, 4],
      [1, 2, 1],
    ],
  }

  it.each([
    ['upper', '-1,4,0\n0,-3,1\n0,0,4\n'],
    ['lower', '-1,0,0\n4,-3,0\n0,1,4\n'],
    ['symmetric', '-1,2,0\n2,-3,0.5\n0,0.5,4\n'],
    ['both', '-1,3,0\n1,-3,0\n0,1,4\n'],
  ])('reads %s matrices as the same sum, in both forms', (triangle, text) => {
    for (const form of ['qubo', 'ising'] as const) {
      const reading = read(text, { form })
      expect(coefficientsOf(reading)).toEqual(expected)
      expect(reading).toMatchObject({ triangle, labels: ['0', '1', '2'], duplicatesSummed: 0, rejectedCount: 0 })
    }
  })

  it('reads labels, semicolons, tabs, white space, CRLF', () => {
    const labelled = read(fixture('matrix-symmetric-labelled.csv'))
    expect(labelled).toMatchObject({ labels: ['pier', 'quay', 'slip'], triangle: 'symmetric', entriesRead: 7 })
    expect(coefficientsOf(labelled)).toEqual(expected)
    const spaced = read(fixture('matrix-upper.txt'))
    expect(spaced.labels).toEqual(['0', '1', '2', '3'])
    expect(spaced.problem!.n).toBe(4)
    const tabs = read('\ta\tb c\r\na\t1\t2\r\nb c\t0\t3\r\n')
    expect(tabs.labels).toEqual(['a', 'b c'])
    expect(tabs.firstRows).toEqual([
      ['a', 'a', 1],
      ['a', 'b c', 2],
      ['b c', 'b c', 3],
    ])
    expect(read('\t0\t1\n0\t1\t2\n1\t0\t3\n')).toMatchObject({ labels: ['0', '1'], issues: [] })
    expect(read('1;2\n0;3').problem!.values[0]).toBe(2)
    expect(read('a,1,2\nb,0,3').labels).toEqual(['a', 'b'])
    expect(read('p q\n1 2\n0 3').labels).toEqual(['p', 'q'])
    expect(read('7').problem!.linear[0]).toBe(7)
  })

  it('heeds directives and options', () => {
    const text = '# form: ising\n# convention: minus\n# offset: 1\n1,2\n0,3\n'
    expect(coefficientsOf(read(text))).toEqual({ linear: [-1, -3], pairs: [[0, 1, -2]] })
    expect(read(text, { sense: 'max' }).problem!.offset).toBe(-1)
    expect(coefficientsOf(read(text, { sense: 'max' }))).toEqual({ linear: [1, 3], pairs: [[0, 1, 2]] })
  })

  it('drops pairs that cancel', () => {
    expect(read('1,2\n-2,1')).toMatchObject({ zerosDropped: 1, triangle: 'both' })
  })

  it.each<[string, number | undefined, RegExp]>([
    ['', undefined, /no coefficients/],
    ['1,2,3\n4,5,6\n', 1, /not square: 2 rows of 3 cells/],
    ['1,2,3\n4,5\n7,8,9\n', 2, /line 2 has 2 cells, expected 3/],
    ['# x\n1,2,3\n4,5,6\n7,8\n', 4, /line 4 has 2 cells, expected 3/],
    ['1,2,3,4\n1,2,3,4\n1,2,3\n1,2,3,4\n1,2,3,4\n1,2,3,4\n', 3, /line 3 has 3 cells, most have 4/],
    ['1,2\n3,x\n', 2, /incomplete: line 2, cell 2: the value "x" is not a decimal number/],
    ['1,2\n,3\n', 2, /incomplete: line 2, cell 1: the value is missing/],
    ['a,A\n1,2\n3,4\n', 1, /differ only in upper and lower case/],
    ['a,a\n1,2\n3,4\n', 1, /are the same/],
    [',a,b\na,1,2\nc,3,4\n', 3, /row "c" \(line 3\) stands where the columns have "b"/],
    ['1,"2\n3,4\n', 1, /quotation mark is not closed/],
    [',0.5\n0.5,2\n', 1, /cell 1: the value is missing/],
    ['1,2\n3,4\n5,6\n', 1, /3 rows of 2 cells/],
    ['a,\n1,2\n3,4\n', 1, /variable 2: a label is empty/],
  ])('finds no problem in %j', (text, line, message) => {
    const reading = read(text)
    expect(reading.problem).toBeNull()
    expect(reading.issues[0]!.line).toBe(line)
    expect(reading.issues[0]!.message).toMatch(message)
  })

  it('names the rejected row', () => {
    expect(read('1,NaN\n3,4\n').rejected).toEqual([
      { line: 1, text: '1,NaN', reason: 'cell 2: the value "NaN" is not a finite number' },
    ])
  })

  it('refuses matrices beyond 5000 variables without reading them', () => {
    expect(read('1\n'.repeat(5002)).issues[0]!.message).toMatch(/at most 5000 rows/)
    expect(read(`${'1 '.repeat(5002)}\n1`).issues[0]!.message).toMatch(/at most 5000 columns/)
  })
})

describe('writing a dense matrix', () => {
  it.each(['qubo', 'ising'] as const)('comes back to the last bit: %s', (form) => {
    const random = createRandom(41)
    const names = ['3', 'a,b', '#x', ' lead', 'q"q', '船', '1.5', '-']
    for (let trial = 0; trial < 60; trial++) {
      const n = 1 + random.below(names.length)
      const labels =
        trial % 2 === 0
          ? randomOrder(random, names.length)
              .slice(0, n)
              .map((k) => names[k]!)
          : randomOrder(random, n).map(String)
      const problem = randomProblem(random, n, random.float(), trial % 3 === 0 ? real : dyadic)
      const document: ProblemDocument = { form, labels, problem, sense: trial % 4 < 2 ? 'min' : 'max' }
      const reading = read(write(document))
      expect(reading.issues).toEqual([])
      expect(reading).toMatchObject({ form, formSource: 'file', sense: document.sense, labels, problem })
    }
  })

  it('writes the upper triangle with labels', () => {
    const problem = buildProblem(2, { rows: [0, 1], cols: [1, 1], values: [0.5, -2] }, 1).problem
    expect(write({ form: 'ising', labels: ['a', 'b c'], problem, sense: 'min' })).toBe(
      '# layout: matrix\n# form: ising\n# sense: min\n# offset: 1\nvariable,a,"b c"\na,0,0.5\n"b c",0,-2\n',
    )
  })

  it('refuses problems too large for it', () => {
    const problem = buildProblem(5001, { rows: [], cols: [], values: [] }, 0).problem
    const labels = Array.from({ length: 5001 }, (_, i) => String(i))
    expect(() => write({ form: 'qubo', labels, problem, sense: 'min' })).toThrow(/at most 5000/)
  })
})
