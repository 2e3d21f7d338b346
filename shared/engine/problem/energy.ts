import type { Problem } from './problem'

/**
 * The energy of a state, offset included, summed with compensation (Ogita, Rump & Oishi 2005, algorithm Sum2), as
 * accurate as if it were summed in twice the precision. O(n + interactions).
 * @param state one value a variable: 0 or 1 when the problem is a QUBO, −1 or +1 when it is an Ising form
 * @throws RangeError when the state has another length than the problem
 */
export function energyOf(problem: Problem, state: ArrayLike<number>): number {
  const { n, linear, rows, cols, values } = problem
  if (state.length !== n) throw new RangeError(`the state has ${state.length} values for ${n} variables`)
  let sum = problem.offset
  let error = 0
  for (let i = 0; i < n; i++) {
    const term = linear[i]! * state[i]!
    const next = sum + term
    const share = next - sum
    error += sum - (next - share) + (term - share)
    sum = next
  }
  for (let k = 0; k < values.length; k++) {
    const term = values[k]! * state[rows[k]!]! * state[cols[k]!]!
    const next = sum + term
    const share = next - sum
    error += sum - (next - share) + (term - share)
    sum = next
  }
  // Adding 0 turns −0 into 0.
  return sum + error + 0
}
