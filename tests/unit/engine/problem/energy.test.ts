import { describe, expect, it } from 'vitest'
import { buildProblem } from '../../../../shared/engine/problem/build'
import { energyOf } from '../../../../shared/engine/problem/energy'
import { createRandom } from '../../../../shared/engine/random'
import { energyByDefinition, randomProblem, smallInteger, stateOf } from '../../../fixtures/problems/random-problem'

describe('energyOf', () => {
  it('equals the definition on every state of small integer problems', () => {
    const random = createRandom(3)
    for (const values of [
      [0, 1],
      [-1, 1],
    ] as const) {
      const problem = randomProblem(random, 8, 0.6, smallInteger)
      for (let code = 0; code < 256; code++) {
        const state = stateOf(code, 8, values)
        expect(energyOf(problem, state)).toBe(energyByDefinition(problem, state))
        expect(energyOf(problem, Int8Array.from(state))).toBe(energyByDefinition(problem, state))
      }
    }
  })

  it('keeps small terms beside large ones that cancel', () => {
    const problem = buildProblem(3, { rows: [0, 1, 2], cols: [0, 1, 2], values: [1e17, 1, -1e17] }, 0.25).problem
    expect(energyOf(problem, [1, 1, 1])).toBe(1.25)
  })

  it('refuses a state of another length', () => {
    const problem = buildProblem(2, { rows: [], cols: [], values: [] }, 0).problem
    expect(() => energyOf(problem, [1])).toThrow('the state has 1 values for 2 variables')
  })
})
