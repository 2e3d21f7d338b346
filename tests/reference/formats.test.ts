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
