import loadHighs from 'highs'
import { beforeAll, expect, it } from 'vitest'
import { buildProblem } from '../../../../../shared/engine/problem/build'
import { energyOf } from '../../../../../shared/engine/problem/energy'
import type { LinearProgramme } from '../../../../../shared/engine/problem/optimum/linearise'
import { columnsOf, isFlipSymmetric, linearise } from '../../../../../shared/engine/problem/optimum/linearise'
import { toQubo } from '../../../../../shared/engine/problem/convert'
import { createRandom } from '../../../../../shared/engine/random'
import { randomProblem, smallInteger } from '../../../../fixtures/problems/random-problem'
import { bruteForce, randomProblems } from './oracle'

let highs: Awaited<ReturnType<typeof loadHighs>>
beforeAll(async () => {
  highs = await loadHighs()
})

/** The programme written out as text for the solver. */
function textOf(programme: LinearProgramme): string {
  const { binaries, cost, columnUpper, rowStarts, columns, weights, rowLower } = programme
  const term = (value: number, column: number): string => `${value < 0 ? '-' : '+'} ${Math.abs(value)} z${column}`
  const rows = Array.from(rowLower, (lower, r) => {
    const terms = []
    for (let p = rowStarts[r]!; p < rowStarts[r + 1]!; p++) terms.push(term(weights[p]!, columns[p]!))
    return ` ${terms.join(' ')} >= ${lower}`
  })
  const bounds = Array.from(columnUpper, (upper, column) => ` 0 <= z${column} <= ${upper}`)
  const names = Array.from({ length: binaries }, (_, i) => ` z${i}`)
  const objective = Array.from(cost, term).join('\n ')
  return `Minimize\n obj: ${objective}\nSubject To\n z0 >= 0\n${rows.join('\n')}\nBounds\n${bounds.join('\n')}\nGeneral\n${names.join('\n')}\nEnd\n`
}

it('has the optimum of the problem, scaled', () => {
  for (const problem of randomProblems(40, 9, 41).filter(({ n }) => n > 0)) {
    const programme = linearise(problem)
    const { ObjectiveValue, Status } = highs.solve(textOf(programme), { output_flag: false })
    expect(Status).toBe('Optimal')
    expect(ObjectiveValue * programme.scale).toBeCloseTo(bruteForce(problem).energy, 5)
  }
})

it('fixes a variable where all may be flipped at once, and mirrors states to it', () => {
  const spins = { ...randomProblem(createRandom(42), 7, 0.6, smallInteger), linear: new Float64Array(7) }
  const qubo = { ...toQubo(spins), offset: 0 }
  expect(isFlipSymmetric(qubo)).toBe(true)
  const programme = linearise(qubo)
  expect(programme.columnUpper.filter((upper) => upper === 0).length).toBe(1)
  const { ObjectiveValue } = highs.solve(textOf(programme), { output_flag: false })
  expect(ObjectiveValue * programme.scale).toBeCloseTo(bruteForce(qubo).energy, 6)
  const up = new Uint8Array(7).fill(1)
  expect(Array.from(columnsOf(qubo, programme, up).subarray(0, 7))).toEqual([0, 0, 0, 0, 0, 0, 0])
  expect(isFlipSymmetric({ ...qubo, linear: qubo.linear.map((value, i) => (i === 0 ? value + 1 : value)) })).toBe(false)
})

it('fills in the products of a state, at its cost', () => {
  const problem = buildProblem(3, { rows: [0, 0, 1], cols: [0, 1, 2], values: [-5, 4, -2] }, 0).problem
  const programme = linearise(problem)
  const state = Uint8Array.of(1, 1, 1)
  const columns = columnsOf(problem, programme, state)
  expect(Array.from(columns)).toEqual([1, 1, 1, 1, 1])
  const cost = programme.cost.reduce((sum, value, k) => sum + value * columns[k]!, 0)
  expect(cost * programme.scale).toBe(energyOf(problem, state))
})
