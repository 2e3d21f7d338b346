import type { Form } from '../problem'
import type { Steps } from './record'
import { NONE } from './record'

/** What lifting needs of a reduction. */
export interface Lifting {
  readonly form: Form
  readonly variables: number
  readonly kept: Uint32Array
  readonly steps: Pick<Steps, 'variable' | 'first' | 'second' | 'table'>
}

/**
 * The state of the problem before pre-solve that belongs to a state of what was left: variables come back in the reverse
 * order in which they were taken out. Its energy is the same, and an optimum becomes an optimum. O(variables).
 * @param state one value a variable left: 0 or 1 for a QUBO, −1 or +1 for an Ising form
 * @returns the same alphabet, one value a variable of the problem given
 * @throws RangeError when the state has another length
 */
export function lift({ form, variables, kept, steps }: Lifting, state: ArrayLike<number>): Int8Array {
  if (state.length !== kept.length)
    throw new RangeError(`the state has ${state.length} values for ${kept.length} variables left`)
  const bits = new Uint8Array(variables)
  for (let k = 0; k < kept.length; k++) bits[kept[k]!] = state[k]! > 0 ? 1 : 0
  for (let k = steps.variable.length - 1; k >= 0; k--) {
    const first = steps.first[k]!
    const second = steps.second[k]!
    const place = (first === NONE ? 0 : bits[first]!) + (second === NONE ? 0 : 2 * bits[second]!)
    bits[steps.variable[k]!] = (steps.table[k]! >> place) & 1
  }
  return Int8Array.from(bits, form === 'qubo' ? (bit) => bit : (bit) => 2 * bit - 1)
}
