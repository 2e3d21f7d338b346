import type { Control } from '../../../shared/engine/control'
import type { Lifting } from '../../../shared/engine/problem/presolve/lift'
import { lift } from '../../../shared/engine/problem/presolve/lift'

export interface LiftStatesInput {
  /** From the problem that the states are of back to the one it came from first. */
  levels: readonly Lifting[]
  /** States one after the other, in the alphabet of the first level's form. */
  states: Int8Array
  count: number
}

/** The states of the first problem, one after the other, in the alphabet of the last level's form. */
export function liftStates({ levels, states, count }: LiftStatesInput, _control: Control<never>): Int8Array {
  const width = count === 0 ? 0 : states.length / count
  const lifted = new Int8Array(count * levels[levels.length - 1]!.variables)
  for (let k = 0; k < count; k++) {
    let state = states.subarray(k * width, (k + 1) * width)
    for (const level of levels) state = lift(level, state)
    lifted.set(state, k * state.length)
  }
  return lifted
}
