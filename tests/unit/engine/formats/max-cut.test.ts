import { describe, expect, it } from 'vitest'
import { maxCut } from '../../../../shared/engine/formats/max-cut'
import { buildProblem } from '../../../../shared/engine/problem/build'
import { energyOf } from '../../../../shared/engine/problem/energy'
import { createRandom } from '../../../../shared/engine/random'
import { fileOf, textOf } from '../../../fixtures/problems/bytes'

const read = (text: string, options = {}) => maxCut.read(fileOf(text), options)

/** A random graph as the text of a file and as its edges. */
function randomGraph(seed: number) {
  const random = createRandom(seed)
  const n = 2 + random.below(7)
  const edges: [number, number, number][] = []
  for (let i = 0; i < n; i++)
    for (let j = 0; j < n; j++)
      if (i !== j && random.float() < 0.3) edges.push([i, j, Math.round(16 * random.normal()) / 8 || 1])
  if (edges.length === 0) edges.push([1, 0, 1])
  const lines = edges.map(([i, j, w]) => (w === 1 ? `${i + 1} ${j + 1}` : `${i + 1} ${j + 1} ${w}`))
  return { n, edges, text: `${n} ${edges.length}\n${lines.join('\n')}\n` }
}

describe('reading an edge list', () => {
  it.each(['qubo', 'ising'] as const)('the value of every state is the weight that it cuts: %s', (form) => {
    for (let seed = 1; seed <= 20; seed++) {
      const { n, edges, text } = randomGraph(seed)
      const reading = read(text, { form })
      expect(reading).toMatchObject({ form, sense: 'max', entriesRead: edges.length, rejectedCount: 0 })
      for (let mask = 0; mask < 2 ** n; mask++) {
        const side = Array.from({ length: n }, (_, i) => (mask >> i) & 1)
        const cut = edges.reduce((sum, [i, j, w]) => sum + (side[i] === side[j] ? 0 : w), 0)
        const state = Int8Array.from(side, (x) => (form === 'qubo' ? x : 2 * x - 1))
        expect(0 - energyOf(reading.problem!, state)).toBe(cut)
      }
    }
  })

  it('counts edges given twice, keeps vertices without any, shows weights as stated', () => {
    const reading = read('# ferry links\n4 3\n\n1 2 3\n2 1 -1\n3 2\n')
    expect(reading).toMatchObject({
      labels: ['1', '2', '3', '4'],
      duplicatesSummed: 1,
      triangle: 'both',
      entriesRead: 3,
    })
    expect(reading.firstRows).toEqual([
      ['1', '2', 3],
      ['2', '1', -1],
      ['3', '2', 1],
    ])
  })

  it('rejects edges line by line', () => {
    const reading = read('3 7\n1 2 1\n1 1 5\n0 2\n1 4\n1 2 x\n1\n1.5 2 1\n')
    expect(reading.rejected.map(({ line, reason }) => [line, reason])).toEqual([
      [3, 'vertex 1 is joined to itself: no cut goes through that edge'],
      [4, 'the edge 0 2 leaves 1 … 3, the vertices that line 1 states; they count from 1'],
      [5, 'the edge 1 4 leaves 1 … 3, the vertices that line 1 states; they count from 1'],
      [6, 'the value "x" is not a decimal number'],
      [7, 'expected 2 or 3 columns (i, j, weight), found 1'],
      [8, 'the vertex "1.5" is not a whole number'],
    ])
    expect(reading.problem!.values.length).toBe(1)
  })

  it.each<[string, RegExp]>([
    ['', /empty/],
    ['3 2 1\n', /first line must hold/],
    ['0 0\n', /no vertices/],
    ['9999999 1\n1 2\n', /at most 1000000 vertices/],
    ['3 2\n1 2\n', /promises 2 edges, the file holds 1: is it cut short/],
    ['3 1\n1 2\n2 3\n', /promises 1 edges, the file holds 2/],
  ])('finds no problem in %j', (text, message) => {
    const reading = read(text)
    expect(reading.problem).toBeNull()
    expect(reading.issues[0]!.message).toMatch(message)
  })

  it('knows no convention', () => {
    expect(read('2 1\n1 2\n', { form: 'ising', convention: 'minus' }).issues[0]!.message).toMatch(/no convention/)
  })
})

describe('writing an edge list', () => {
  it('comes back, weights and all', () => {
    for (let seed = 30; seed < 50; seed++) {
      const { form, labels, sense, problem } = read(randomGraph(seed).text)
      const again = maxCut.read([maxCut.write({ form, labels, sense, problem: problem! })], {})
      expect(again).toMatchObject({ form, labels, sense, problem })
    }
  })

  it('refuses what is no cut, and labels that would be lost', () => {
    const cut = read('2 1\n1 2 3\n')
    const document = { form: 'qubo' as const, labels: ['1', '2'], sense: 'max' as const, problem: cut.problem! }
    expect(textOf(maxCut.write(document))).toBe('2 1\n1 2 3\n')
    expect(() => maxCut.write({ ...document, labels: ['a', 'b'] })).toThrow(/labels would be lost/)
    expect(() => maxCut.write({ ...document, sense: 'min' })).toThrow(/only the QUBO form of a cut/)
    const other = buildProblem(2, { rows: [0], cols: [1], values: [1] }, 0).problem
    expect(() => maxCut.write({ ...document, problem: other })).toThrow(RangeError)
  })
})

describe('recognising an edge list', () => {
  const score = (text: string) => maxCut.sniff(fileOf(text)[0]!)

  it.each([
    ['3 2\n1 2\n2 3 4\n', 0.9],
    ['3 9\n1 2\n2 3 4\n', 0.4],
    ['1 2 3\n2 3 4\n', 0],
    ['1,2\n3,4\n', 0],
    ['2 1\n1 5 3\n', 0],
    ['2 1\n1 2 3\n1 2 4\n', 0],
    ['hello\n', 0],
  ])('%j', (text, expected) => expect(score(text)).toBe(expected))
})
