import { holds, type VariableGroup } from '../problem/groups/group'
import { spinOf, type Samples } from '../sampling/samples'

export interface Violations {
  /** Reads of all rows. */
  readonly reads: number
  /** Reads that break each group. */
  readonly perGroup: Float64Array
  /** Reads that break one group or more. */
  readonly any: number
}

/**
 * How many reads of decoded states break each group; a spin up counts as 1. O(rows · members).
 * @throws RangeError for a member outside the states
 */
export function violationsOf(states: Samples, groups: readonly VariableGroup[]): Violations {
  for (const { members } of groups)
    for (const i of members)
      if (!(i >= 0 && i < states.width)) throw new RangeError(`member ${i} is no variable of 0 … ${states.width - 1}`)
  const perGroup = new Float64Array(groups.length)
  let [reads, any] = [0, 0]
  for (let r = 0; r < states.rows; r++) {
    const count = states.counts[r]!
    let isBroken = false
    groups.forEach((group, g) => {
      let set = 0
      for (const i of group.members) if (spinOf(states, r, i) === 1) set++
      if (holds(group, set)) return
      perGroup[g]! += count
      isBroken = true
    })
    reads += count
    if (isBroken) any += count
  }
  return { reads, perGroup, any }
}
