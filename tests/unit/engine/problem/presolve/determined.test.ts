import { expect, it } from 'vitest'
import { determinedValues, OPEN } from '../../../../../shared/engine/problem/presolve/determined'
import { lift } from '../../../../../shared/engine/problem/presolve/lift'
import { presolve } from '../../../../../shared/engine/problem/presolve/presolve'
import { COMPONENT_LIMITS } from '../../../../../shared/engine/problem/presolve/small-components'
import { createRandom } from '../../../../../shared/engine/random'
import { randomProblem } from '../../../../fixtures/problems/random-problem'
import { DRAWS, stateFrom } from './exact-energies'

it('tells only values on which all lifted states agree', () => {
  const random = createRandom(61)
  let open = 0
  let determined = 0
  for (let trial = 0; trial < 300; trial++) {
    const problem = randomProblem(random, 4 + random.below(7), 0.5, () => DRAWS.integers!(random))
    const limits = { ...COMPONENT_LIMITS, variables: 0 }
    const reduction = presolve(problem, 'ising', undefined, limits)
    const states = Array.from({ length: 2 ** reduction.kept.length }, (_, code) =>
      lift(reduction, stateFrom(code, reduction.kept.length, 'ising')),
    )
    determinedValues(reduction).forEach((value, v) => {
      if (value === OPEN) open++
      else determined++
      if (value !== OPEN) expect(states.every((state) => (state[v]! + 1) / 2 === value)).toBe(true)
      else if (reduction.kept.includes(v)) expect(new Set(states.map((state) => state[v])).size).toBe(2)
    })
  }
  expect(open).toBeGreaterThan(100)
  expect(determined).toBeGreaterThan(100)
})
