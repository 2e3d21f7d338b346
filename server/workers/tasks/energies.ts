import type { Control } from '../../../shared/engine/control'
import { convertForm } from '../../../shared/engine/problem/convert'
import { energyOf } from '../../../shared/engine/problem/energy'
import type { Problem } from '../../../shared/engine/problem/problem'

export interface EnergiesInput {
  problem: Problem
  /** The form of the problem given. */
  from: 'qubo' | 'ising'
  /** The form whose states are given. */
  form: 'qubo' | 'ising'
  /** States one after the other, a value for each variable. */
  states: Int8Array
}

/** The energy of each state. */
export function energies({ problem, from, form, states }: EnergiesInput, _control: Control<never>): Float64Array {
  const converted = convertForm(problem, from, form)
  const { n } = problem
  return Float64Array.from({ length: states.length / n }, (_, k) =>
    energyOf(converted, states.subarray(k * n, (k + 1) * n)),
  )
}
