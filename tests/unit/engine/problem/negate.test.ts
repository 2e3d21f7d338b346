import { describe, expect, it } from 'vitest'
import { buildProblem } from '../../../../shared/engine/problem/build'
import { negateProblem } from '../../../../shared/engine/problem/negate'

describe('negateProblem', () => {
  const problem = buildProblem(3, { rows: [0, 1], cols: [0, 2], values: [2, -3] }, 5).problem

  it('negates coefficients and offset as told, without making −0', () => {
    const both = negateProblem(problem, { coefficients: true, offset: true })
    expect([...both.linear]).toEqual([-2, 0, 0])
    expect([...both.values]).toEqual([3])
    expect(both.offset).toBe(-5)
    const onlyOffset = negateProblem(problem, { coefficients: false, offset: true })
    expect(onlyOffset.linear).toBe(problem.linear)
    expect(onlyOffset.offset).toBe(-5)
    const onlyCoefficients = negateProblem(problem, { coefficients: true, offset: false })
    expect([...onlyCoefficients.values]).toEqual([3])
    expect(onlyCoefficients.offset).toBe(5)
  })
})
