import type { Control } from '../../../../../shared/engine/control'
import type { Form, Problem } from '../../../../../shared/engine/problem/problem'
import { createRandom } from '../../../../../shared/engine/random'
import type { Draw } from '../../../../fixtures/problems/random-problem'
import {
  dyadic,
  energyByDefinition,
  randomProblem,
  smallInteger,
  stateOf,
} from '../../../../fixtures/problems/random-problem'

/** Never cancelled, on a clock that stands still. */
export const idle: Control<unknown> = { now: () => 0, cancelled: () => false, report: () => {} }

/** Every state in counting order, each energy from the definition. */
export function bruteForce(problem: Problem, form: Form = 'qubo', slack = 0): { energy: number; codes: number[] } {
  const values = form === 'qubo' ? ([0, 1] as const) : ([-1, 1] as const)
  const energies = Array.from({ length: 2 ** problem.n }, (_, code) =>
    energyByDefinition(problem, stateOf(code, problem.n, values)),
  )
  const energy = energies.reduce((least, value) => Math.min(least, value), Infinity)
  return { energy, codes: energies.flatMap((value, code) => (value <= energy + slack ? [code] : [])) }
}

export const codeOf = (state: Uint8Array): number => state.reduce((code, bit, i) => code + bit * 2 ** i, 0)

/** −1, 0 and 1: many optima, and pairs that come to nothing. */
export const trit: Draw = (random) => random.below(3) - 1

/** Random problems of at most `most` variables and every density, without offset. */
export function randomProblems(count: number, most: number, seed: number): Problem[] {
  const random = createRandom(seed)
  const draws = [smallInteger, dyadic, trit]
  return Array.from({ length: count }, (_, k) => ({
    ...randomProblem(random, random.below(most + 1), random.float(), draws[k % draws.length]!),
    offset: 0,
  }))
}
