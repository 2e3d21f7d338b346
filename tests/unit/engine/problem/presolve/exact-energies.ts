import type { Form, Problem } from '../../../../../shared/engine/problem/problem'
import type { Random } from '../../../../../shared/engine/random'

/** Every coefficient of these tests is a multiple of 2^−100, so energies times 2^100 are whole numbers. */
const SCALE = 2 ** 100

const whole = (value: number): bigint => {
  const scaled = value * SCALE
  if (!Number.isInteger(scaled)) throw new Error(`${value} is too fine for this oracle`)
  return BigInt(scaled)
}

/** Energies of all states by definition, times 2^100, without rounding. */
export function exactEnergies(problem: Problem, form: Form): bigint[] {
  const linear = Array.from(problem.linear, whole)
  const values = Array.from(problem.values, whole)
  const offset = whole(problem.offset)
  return Array.from({ length: 2 ** problem.n }, (_, code) => {
    const z = Array.from(stateFrom(code, problem.n, form), BigInt)
    let energy = offset
    linear.forEach((h, i) => (energy += h * z[i]!))
    values.forEach((b, k) => (energy += b * z[problem.rows[k]!]! * z[problem.cols[k]!]!))
    return energy
  })
}

/** State number `code`: variable i is bit i. */
export const stateFrom = (code: number, n: number, form: Form): number[] =>
  Array.from({ length: n }, (_, i) => ((code >> i) & 1 ? 1 : form === 'qubo' ? 0 : -1))

/** The number of a state in either alphabet. */
export const codeOf = (state: ArrayLike<number>): number =>
  Array.from(state).reduce((code, value, i) => code + (value > 0 ? 2 ** i : 0), 0)

export const least = (energies: readonly bigint[]): bigint => energies.reduce((a, b) => (a < b ? a : b))

/** Ways to draw a coefficient, each with its own kind of ties and roundings. */
export const DRAWS: Record<string, (random: Random) => number> = {
  signs: (random) => random.below(3) - 1,
  integers: (random) => random.below(13) - 6,
  halves: (random) => (random.below(9) - 4) / 2,
  tenths: (random) => (random.below(7) - 3) / 10,
  reals: (random) => Math.round((random.float() - 0.5) * 1e6) / 1e6,
  'far apart': (random) => (random.below(5) - 2) * 10 ** (random.below(15) - 6),
}
