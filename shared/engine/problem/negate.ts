import type { Problem } from './problem'

const negated = (value: number): number => (value === 0 ? 0 : -value)

/** The problem with its coefficients, its offset, or both negated; what is not negated is shared, not copied. */
export function negateProblem(problem: Problem, what: { coefficients: boolean; offset: boolean }): Problem {
  const { coefficients, offset } = what
  return {
    ...problem,
    linear: coefficients ? problem.linear.map(negated) : problem.linear,
    values: coefficients ? problem.values.map(negated) : problem.values,
    offset: offset ? negated(problem.offset) : problem.offset,
  }
}
