import type { Problem } from '../problem'

/** Steps on the smallest double that still count as a common grid. */
const LEAST_POWER = 2 ** -200

type Coefficients = Pick<Problem, 'linear' | 'values'>

/** The sum of the sizes of all coefficients: no energy without offset lies further from 0. */
export function coefficientTotal({ linear, values }: Coefficients): number {
  let total = 0
  for (const value of linear) total += Math.abs(value)
  for (const value of values) total += Math.abs(value)
  return total
}

function divisor(a: number, b: number): number {
  while (b !== 0) [a, b] = [b, a % b]
  return a
}

/**
 * The largest step that every coefficient is a whole multiple of, so that all energies lie on a grid of it; 1 when every
 * coefficient is 0. Null where there is none that keeps all sums of coefficients, four times over, within 53 bits: sums
 * of such coefficients in any order carry no rounding where a step is given, and may where it is not.
 */
export function energyGrid(problem: Coefficients): number | null {
  const total = coefficientTotal(problem)
  let power = 1
  for (const list of [problem.linear, problem.values])
    for (const value of list) while (!Number.isInteger(value / power) && power > LEAST_POWER) power /= 2
  if (!((4 * total) / power < 2 ** 53)) return null
  let common = 0
  for (const list of [problem.linear, problem.values])
    for (const value of list) common = divisor(common, Math.abs(value / power))
  return common === 0 ? 1 : common * power
}
