import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { coefficients } from '../../../../shared/engine/formats/coefficients'
import type { ProblemDocument } from '../../../../shared/engine/formats/format'
import { buildProblem } from '../../../../shared/engine/problem/build'
import { createRandom } from '../../../../shared/engine/random'
import { fileOf, textOf } from '../../../fixtures/problems/bytes'
import { dyadic, randomOrder, randomProblem, real } from '../../../fixtures/problems/random-problem'

const fixture = (name: string): string =>
  readFileSync(new URL(`../../../fixtures/problems/${name}`, import.meta.url), 'utf8')

const write = (document: ProblemDocument): string => textOf(coefficients.write(document))

const read = (text: string, options = {}) => coefficients.read(fileOf(text), options)

/** The problem as a map from labels to values, for comparing without regard to the order of variables. */
function byLabel(text: string, options = {}) {
  const { problem, labels } = read(text, options)
  if (!problem) throw new Error('no problem')
  const linear = Object.fromEntries(labels.map((label, i) => [label, problem.linear[i]]))
  const pairs = Array.from(problem.values, (value, k) => [labels[problem.rows[k]!], labels[problem.cols[k]!], value])
  return { linear, pairs, offset: problem.offset }
}

describe('reading a coefficient list', () => {
  it('reads semicolons, quotes, CRLF, a byte order mark, names and comments', () => {
    const text = fixture('berths-semicolon-crlf.csv')
    expect(byLabel(text)).toEqual({
      linear: { 'north berth': -1.5, 'slot 2': -1 },
      pairs: [['north berth', 'slot 2', 2]],
      offset: 0,
    })
    expect(read(text)).toMatchObject({
      format: 'coefficients',
      form: 'qubo',
      formSource: 'default',
      convention: 'plus',
      sense: 'min',
      triangle: 'upper',
      header: { line: 1, text: 'i;j;value' },
      entriesRead: 3,
      rejectedCount: 0,
      issues: [],
    })
  })

  it('reads tabs and turns the minus convention round, the offset excepted', () => {
    const text = fixture('radio-ising.tsv')
    expect(byLabel(text)).toEqual({
      linear: { deck: -0.5, bridge: 0, 'engine room': 0 },
      pairs: [
        ['deck', 'bridge', 1],
        ['bridge', 'engine room', 2],
      ],
      offset: 3.5,
    })
    const reading = read(text)
    expect(reading).toMatchObject({ form: 'ising', formSource: 'file', convention: 'minus', triangle: 'both' })
    expect(reading.firstRows[2]).toEqual(['engine room', 'bridge', -2])
    expect(byLabel(text, { convention: 'plus' }).pairs[0]).toEqual(['deck', 'bridge', -1])
  })

  it('reads white space, sorts integers, keeps declared variables and turns maximisation into minimisation', () => {
    const text = fixture('crews-max.txt')
    const reading = read(text)
    expect(reading.labels).toEqual(['2', '7', '10'])
    expect(byLabel(text)).toEqual({ linear: { 2: 3, 7: 0, 10: 0 }, pairs: [['2', '10', -2]], offset: -10 })
    expect(reading).toMatchObject({ sense: 'max', duplicatesSummed: 1, zerosDropped: 0, triangle: 'both' })
    expect(reading.firstRows[0]).toEqual(['10', '2', 1.5])
    expect(byLabel(text, { sense: 'min' })).toMatchObject({ linear: { 2: -3 }, offset: 10 })
  })

  it('undoes convention and sense together: coefficients stay, the offset turns', () => {
    const text = '# form: ising\n# sense: max\n# convention: minus\n# offset: 2\na a 3\na b 5\n'
    expect(byLabel(text)).toEqual({ linear: { a: 3, b: 0 }, pairs: [['a', 'b', 5]], offset: -2 })
  })

  it('rejects what it cannot read, line by line, and reads the rest', () => {
    const reading = read(fixture('faulty-lines.csv'))
    expect(reading.rejected.map(({ line, reason }) => [line, reason])).toEqual([
      [3, 'the value "NaN" is not a finite number'],
      [4, 'the value "Infinity" is not a finite number'],
      [5, 'the value "0x10" is not a decimal number'],
      [6, 'the value is missing'],
      [7, 'expected 3 columns (i, j, value), found 2'],
      [8, 'expected 3 columns (i, j, value), found 4'],
      [9, 'a label is empty'],
      [10, 'a quotation mark is not closed'],
      [11, 'the value "1e400" is too large'],
      [12, 'the value "1e-400" is too close to zero'],
      [13, 'the value "1_000" is not a decimal number'],
      [14, 'the value "0,5" is not a number; write the decimal mark as a point'],
    ])
    expect(reading.rejected[3]!.text).toBe('a,b,')
    expect(reading.rejectedCount).toBe(12)
    expect(reading.entriesRead).toBe(2)
    expect(byLabel(fixture('faulty-lines.csv'))).toMatchObject({ linear: { a: 1, b: 0 }, pairs: [['a', 'b', 2]] })
  })

  it('does not let a rejected line declare a variable', () => {
    expect(read('a a 1\nc c NaN\nd "" 1\n').labels).toEqual(['a'])
  })

  it('keeps the first 100 rejected lines and counts all, cutting long ones', () => {
    const reading = read(`a a 1\n${'x y\n'.repeat(150)}${'z'.repeat(3000)}\n# ${'c'.repeat(5000)}\n`)
    expect(reading.rejected).toHaveLength(100)
    expect(reading.rejectedCount).toBe(151)
    const long = read(`a a 1\n${'z'.repeat(3000)} b 1\n`)
    expect(long.rejected[0]!.reason).toBe('the line is longer than 2000 characters')
    expect(long.rejected[0]!.text).toHaveLength(201)
  })

  it('rejects a directive that it does not understand', () => {
    const reading = read('# form: spins\na a 1\n')
    expect(reading.rejected).toEqual([
      { line: 1, text: '# form: spins', reason: 'form must be qubo or ising, not "spins"' },
    ])
    expect(reading.problem).not.toBeNull()
  })

  it('takes only the first data line for names, and no failed number', () => {
    expect(read('row column weight\na b 1\n').header).toEqual({ line: 1, text: 'row column weight' })
    expect(read('a b 1\nrow column weight\n').rejectedCount).toBe(1)
    expect(read('a b nan\na b 1\n').rejectedCount).toBe(1)
    expect(read('a b 1x\na b 1\n').rejectedCount).toBe(1)
  })

  it.each([
    ['', /there are no coefficients/],
    ['# nothing\n\n', /there are no coefficients/],
    ['i,j,value\n', /there are no coefficients/],
    ['a b\nc d\n', /no line could be read; line 1: expected 3 columns/],
    ['01 2 1\n3 3 1\n1 2 1\n', /"01" \(line 1\) and "1" \(line 3\)/],
    ['a b 1\nA b 1\n', /"a" \(line 1\) and "A" \(line 2\) differ only in upper and lower case/],
    ['# convention: minus\na b 1\n', /belongs to the Ising form/],
  ])('finds no problem in %j', (text, message) => {
    const reading = read(text)
    expect(reading.problem).toBeNull()
    expect(reading.issues[0]!.message).toMatch(message)
  })

  it('shows the first 8 entries', () => {
    const text = Array.from({ length: 12 }, (_, k) => `v${k} v${k + 1} ${k}`).join('\n')
    expect(read(text).firstRows).toHaveLength(8)
    expect(read(text)).toMatchObject({ entriesRead: 12, zerosDropped: 1 })
  })

  it('calls mirrored entries symmetric and sums them', () => {
    const reading = read('0 1 2\n1 0 2\n0 0 1\n')
    expect(reading).toMatchObject({ triangle: 'symmetric', duplicatesSummed: 1 })
    expect([...reading.problem!.values]).toEqual([4])
  })
})

describe('writing a coefficient list', () => {
  const oddLabels = ['3', 'a,b', '#x', ' lead', 'q"q', 'semi;colon', 'tab le', '船', 'É', '1.5', 'i', '-', 'é a']

  it.each(['qubo', 'ising'] as const)('comes back to the last bit: %s', (form) => {
    const random = createRandom(31)
    for (let trial = 0; trial < 60; trial++) {
      const n = 1 + random.below(oddLabels.length)
      const labels =
        trial % 2 === 0
          ? randomOrder(random, oddLabels.length)
              .slice(0, n)
              .map((k) => oddLabels[k]!)
          : randomOrder(random, n).map((k) => String(k * 3 - 4))
      const problem = randomProblem(random, n, random.float(), trial % 3 === 0 ? real : dyadic)
      const document: ProblemDocument = { form, labels, problem, sense: trial % 4 < 2 ? 'min' : 'max' }
      const reading = read(write(document))
      expect(reading.issues).toEqual([])
      expect(reading.rejectedCount).toBe(0)
      expect(reading).toMatchObject({ form, formSource: 'file', sense: document.sense, labels, problem })
    }
  })

  it('is unchanged by another round, and keeps isolated variables', () => {
    const problem = buildProblem(3, { rows: [0], cols: [2], values: [0.1] }, 0).problem
    const text = write({ form: 'qubo', labels: ['b', 'a', 'c'], problem, sense: 'max' })
    expect(text).toBe(
      '# layout: list\n# form: qubo\n# sense: max\n# offset: 0\ni,j,value\nb,b,0\na,a,0\nc,c,0\nb,c,-0.1\n',
    )
    const { form, labels, sense, problem: again } = read(text)
    expect(write({ form, labels, sense, problem: again! })).toBe(text)
  })

  it('refuses labels that would not come back', () => {
    const problem = buildProblem(2, { rows: [0], cols: [1], values: [1] }, 0).problem
    expect(() => write({ form: 'qubo', labels: ['a', 'A'], problem, sense: 'min' })).toThrow(RangeError)
    expect(() => write({ form: 'qubo', labels: ['a', 'b\nc'], problem, sense: 'min' })).toThrow(RangeError)
  })
})
