import type { Control } from '../../../shared/engine/control'
import type { VariableGroup } from '../../../shared/engine/problem/groups/group'
import { distinctSolutions } from '../../../shared/engine/readout/energies'
import type { Violations } from '../../../shared/engine/readout/violations'
import { violationsOf } from '../../../shared/engine/readout/violations'
import type { Samples } from '../../../shared/engine/sampling/samples'
import { joinSamples } from '../../../shared/engine/sampling/merge'
import { spinOf, strideOf } from '../../../shared/engine/sampling/samples'

export interface ListSolutionsInput {
  states: Samples
  /** Of each state. */
  energies: Float64Array
  /** Constraint groups whose violations are counted. */
  groups: VariableGroup[]
  /** Only states that break no group. */
  feasibleOnly: boolean
  /** How many of the best distinct states to answer. */
  limit: number
}

export interface DistinctState {
  energy: number
  count: number
  /** Spins in which it differs from the first one. */
  distance: number
  spins: Int8Array
  /** Groups that it breaks. */
  violated: number
}

export interface ListedSolutions {
  solutions: DistinctState[]
  /** Distinct states there are in all. */
  distinct: number
  /** Of all reads, whatever is listed. */
  violations: Violations
}

/** A state as a set of its own. */
function stateAt(states: Samples, row: number): Samples {
  const stride = strideOf(states.width)
  const bytes = states.bytes.subarray(row * stride, (row + 1) * stride)
  return { width: states.width, rows: 1, bytes, counts: states.counts.subarray(row, row + 1) }
}

/** The best distinct decoded states, and how many reads break each constraint group. */
export function listSolutions(input: ListSolutionsInput, _control: Control<never>): ListedSolutions {
  const { states, energies, groups, feasibleOnly, limit } = input
  const violated = Uint32Array.from({ length: states.rows }, (_, r) =>
    violationsOf(stateAt(states, r), groups).perGroup.reduce((sum, reads) => sum + (reads > 0 ? 1 : 0), 0),
  )
  const rows = Uint32Array.from(violated.keys()).filter((r) => !feasibleOnly || violated[r] === 0)
  const kept = joinSamples(Array.from(rows, (r) => stateAt(states, r)))
  const found = distinctSolutions(
    kept,
    Float64Array.from(rows, (r) => energies[r]!),
  )
  const solutions = found.slice(0, limit).map(({ row, ...solution }) => ({
    ...solution,
    violated: violated[rows[row]!]!,
    spins: Int8Array.from({ length: states.width }, (_, c) => spinOf(kept, row, c)),
  }))
  return { solutions, distinct: found.length, violations: violationsOf(states, groups) }
}
