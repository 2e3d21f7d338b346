import { describe, expect, it } from 'vitest'
import { readProblem } from '../../shared/engine/formats/index'
import { groundStates } from '../../shared/engine/problem/enumerate'

/*
 * Worked examples of F. Glover, G. Kochenberger & Y. Du, "Quantum Bridge Analytics I: a tutorial on formulating and using
 * QUBO models", 4OR 17 (2019): matrices and optima *from memory*, read here as the files a person would type.
 */
const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text)

describe('published examples read as files', () => {
  it('number partitioning of {25, 7, 13, 31, 42, 17, 21, 10}: a dense symmetric matrix with optimum −6889', () => {
    const numbers = [25, 7, 13, 31, 42, 17, 21, 10]
    const total = numbers.reduce((sum, s) => sum + s, 0)
    const rows = numbers.map((a, i) => numbers.map((b, j) => (i === j ? a * (a - total) : a * b)).join(','))
    const reading = readProblem(bytesOf(rows.join('\n')))
    expect(reading).toMatchObject({ format: 'dense-csv', triangle: 'symmetric', form: 'qubo' })
    expect(groundStates(reading.problem!, 'qubo').energy).toBe(-6889)
  })

  it('max-cut of the five-vertex graph: a coefficient list to be maximised, best cut 5', () => {
    const text = `# sense: max
1 1 2
2 2 2
3 3 3
4 4 3
5 5 2
1 2 -2
1 3 -2
2 4 -2
3 4 -2
3 5 -2
4 5 -2
`
    const reading = readProblem(bytesOf(text))
    expect(reading).toMatchObject({ format: 'coefficients', sense: 'max', labels: ['1', '2', '3', '4', '5'] })
    const { energy, states } = groundStates(reading.problem!, 'qubo')
    expect(-energy).toBe(5)
    expect(states.map((state) => [...state].join(''))).toContain('01100')
  })
})

/*
 * Examples of R. F. Boisvert, R. Pozo & K. A. Remington, "The Matrix Market exchange formats: initial design", NISTIR 5935,
 * 1996, *from memory*: the 5 × 5 matrix of the coordinate format, 8 entries, and the same entries symmetric.
 */
describe('worked examples of the Matrix Market exchange formats', () => {
  const general = `%%MatrixMarket matrix coordinate real general
% This is a 5x5 sparse matrix with 8 nonzeros
5 5 8
1 1 1.0
2 2 10.5
4 2 250.5
3 3 1.5e-2
1 4 6.0
4 4 -2.8e2
4 5 33.32
5 5 12.0
`

  it('coordinate real general', () => {
    const { format, problem, triangle } = readProblem(bytesOf(general))
    expect({ format, triangle }).toEqual({ format: 'matrix-market', triangle: 'both' })
    expect([...problem!.linear]).toEqual([1, 10.5, 0.015, -280, 12])
    expect(Array.from(problem!.values, (value, k) => [problem!.rows[k]! + 1, problem!.cols[k]! + 1, value])).toEqual([
      [1, 4, 6],
      [2, 4, 250.5],
      [4, 5, 33.32],
    ])
  })

  it('coordinate real symmetric: the lower triangle stands for both', () => {
    const text = `%%MatrixMarket matrix coordinate real symmetric
5 5 7
1 1 1.0
2 2 10.5
3 3 .015
4 4 -280.0
5 5 12.0
4 2 250.5
5 4 33.32
`
    const { problem, triangle } = readProblem(bytesOf(text))
    expect(triangle).toBe('symmetric')
    expect([...problem!.linear]).toEqual([1, 10.5, 0.015, -280, 12])
    expect([...problem!.values]).toEqual([501, 66.64])
  })

  it('array real general, column by column', () => {
    const text = `%%MatrixMarket matrix array real general
2 2
1.0
2.0
3.0
4.0
`
    const { problem } = readProblem(bytesOf(text))
    expect([...problem!.linear]).toEqual([1, 4])
    expect([...problem!.values]).toEqual([5])
  })
})

/** Cuts known in closed form: ⌊n² / 4⌋ edges of the complete graph, n − 1 of an odd cycle, 12 of the Petersen graph. */
describe('largest cuts in closed form, read from edge lists', () => {
  const textOfEdges = (n: number, edges: readonly (readonly [number, number])[]): string =>
    [`${n} ${edges.length}`, ...edges.map(([i, j], k) => (k % 2 ? `${i + 1} ${j + 1} 1` : `${i + 1} ${j + 1}`))].join(
      '\n',
    )
  const complete = (n: number) =>
    Array.from({ length: n }, (_, i) => Array.from({ length: i }, (__, j) => [j, i] as const)).flat()
  const cycle = (n: number) => Array.from({ length: n }, (_, i) => [i, (i + 1) % n] as const)
  const petersen = [0, 1, 2, 3, 4].flatMap((i) => [
    [i, (i + 1) % 5] as const,
    [i, i + 5] as const,
    [i + 5, ((i + 2) % 5) + 5] as const,
  ])

  it.each([
    ['K₂', 2, complete(2), 1],
    ['K₅', 5, complete(5), 6],
    ['K₈', 8, complete(8), 16],
    ['K₁₁', 11, complete(11), 30],
    ['C₅', 5, cycle(5), 4],
    ['C₉', 9, cycle(9), 8],
    ['the Petersen graph', 10, petersen, 12],
  ])('%s', (_, n, edges, best) => {
    for (const form of ['qubo', 'ising'] as const) {
      const reading = readProblem(bytesOf(textOfEdges(n, edges)), { form })
      expect(reading).toMatchObject({ format: 'max-cut', sense: 'max', form, entriesRead: edges.length })
      expect(0 - groundStates(reading.problem!, form).energy).toBe(best)
    }
  })
})
