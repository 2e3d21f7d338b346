/**
 * The two forms of one problem, related by s = 2x − 1. With E(x) = Σ a_i x_i + Σ b_ij x_i x_j + c and
 * E(s) = Σ h_i s_i + Σ J_ij s_i s_j + g:
 *   h_i = a_i/2 + Σ_j b_ij/4    J_ij = b_ij/4    g = c + Σ a_i/2 + Σ b_ij/4
 *   a_i = 2h_i − 2Σ_j J_ij      b_ij = 4J_ij     c = g − Σ h_i + Σ J_ij
 * (Lucas, Ising formulations of many NP problems, Front. Phys. 2:5, 2014, writes the substitution the same way.)
 */
import { ExactSum } from './exact-sum'
import type { Form, Problem } from './problem'

/** What each old coefficient gives to each new one. All are powers of two, so the products are exact. */
interface Substitution {
  readonly linear: number
  readonly pair: number
  readonly linearFromPair: number
  readonly offsetFromLinear: number
  readonly offsetFromPair: number
}

const TO_ISING: Substitution = {
  linear: 1 / 2,
  pair: 1 / 4,
  linearFromPair: 1 / 4,
  offsetFromLinear: 1 / 2,
  offsetFromPair: 1 / 4,
}
const TO_QUBO: Substitution = { linear: 2, pair: 4, linearFromPair: -2, offsetFromLinear: -1, offsetFromPair: 1 }

/** The interaction values at each variable: values[offsets[i] … offsets[i + 1] − 1] belong to variable i. */
function valuesByVariable(problem: Problem): { offsets: Uint32Array; values: Float64Array } {
  const { n, rows, cols } = problem
  const size = problem.values.length
  const offsets = new Uint32Array(n + 1)
  for (let k = 0; k < size; k++) {
    offsets[rows[k]! + 1]!++
    offsets[cols[k]! + 1]!++
  }
  for (let v = 0; v < n; v++) offsets[v + 1]! += offsets[v]!
  const next = offsets.slice(0, n)
  const values = new Float64Array(2 * size)
  for (let k = 0; k < size; k++) {
    values[next[rows[k]!]!++] = problem.values[k]!
    values[next[cols[k]!]!++] = problem.values[k]!
  }
  return { offsets, values }
}

function substitute(problem: Problem, factors: Substitution): Problem {
  const { n, rows, cols } = problem
  const incident = valuesByVariable(problem)
  const sum = new ExactSum()
  const linear = problem.linear.map((value, i) => {
    sum.reset()
    sum.add(factors.linear * value)
    for (let p = incident.offsets[i]!; p < incident.offsets[i + 1]!; p++)
      sum.add(factors.linearFromPair * incident.values[p]!)
    return sum.value()
  })
  const values = problem.values.map((value) => factors.pair * value)
  sum.reset()
  sum.add(problem.offset)
  for (const value of problem.linear) sum.add(factors.offsetFromLinear * value)
  for (const value of problem.values) sum.add(factors.offsetFromPair * value)
  const offset = sum.value()
  if (!Number.isFinite(offset) || !linear.every(Number.isFinite) || !values.every((v) => Number.isFinite(v) && v !== 0))
    throw new RangeError('the converted coefficients are beyond the range of doubles')
  return { n, linear, rows, cols, values, offset }
}

/** The Ising form of a QUBO; same energy for every state, with x = (1 + s)/2. See `convertForm`. */
export const toIsing = (qubo: Problem): Problem => substitute(qubo, TO_ISING)

/** The QUBO of an Ising form; same energy for every state, with s = 2x − 1. See `convertForm`. */
export const toQubo = (ising: Problem): Problem => substitute(ising, TO_QUBO)

/**
 * Converts between the forms, offset included. Each new coefficient is the exact value rounded once; so integers and
 * dyadic fractions come through exactly, and come back to the last bit, as long as the new coefficients fit 53 bits.
 * O(n + interactions).
 * @throws RangeError when a new coefficient overflows, or an interaction underflows to zero
 */
export function convertForm(problem: Problem, from: Form, to: Form): Problem {
  if (from === to) return problem
  return to === 'ising' ? toIsing(problem) : toQubo(problem)
}
