import { holds } from '../../problem/groups/group'
import type { VariableGroup } from '../../problem/groups/group'
import { assessPenalties, canAssess } from '../../problem/groups/penalty'
import type { Problem } from '../../problem/problem'
import type { Samples } from '../../sampling/samples'
import { spinOf } from '../../sampling/samples'
import { violationsOf } from '../violations'
import type { Evidence, GroupEvidence } from './evidence'

export interface GroupsInput {
  /** The minimised problem as a QUBO. */
  readonly qubo: Problem
  readonly groups: readonly (VariableGroup & { readonly name: string })[]
  /** Decoded states, and the row of the best of them; null without any. */
  readonly states: Samples
  readonly best: number | null
}

/** Largest size of a coupling between members of one group, and of the others and the fields of variables in none. */
function largestOf(qubo: Problem, groups: readonly VariableGroup[]): Evidence['largest'] {
  const groupsAt = Array.from({ length: qubo.n }, () => new Set<number>())
  groups.forEach(({ members }, g) => members.forEach((i) => groupsAt[i]!.add(g)))
  let [withinGroups, elsewhere] = [0, 0]
  qubo.values.forEach((value, k) => {
    const [a, b] = [groupsAt[qubo.rows[k]!]!, groupsAt[qubo.cols[k]!]!]
    if ([...a].some((g) => b.has(g))) withinGroups = Math.max(withinGroups, Math.abs(value))
    else elsewhere = Math.max(elsewhere, Math.abs(value))
  })
  qubo.linear.forEach((value, i) => {
    if (groupsAt[i]!.size === 0) elsewhere = Math.max(elsewhere, Math.abs(value))
  })
  return { withinGroups, elsewhere }
}

/**
 * What decoded reads and coefficients say of the groups of a problem.
 * @throws RangeError for a member outside the states
 */
export function groupsEvidence({ qubo, groups, states, best }: GroupsInput): Pick<Evidence, 'groups' | 'largest'> {
  const { perGroup } = violationsOf(states, groups)
  const penalties = canAssess(groups) ? assessPenalties(qubo, groups) : null
  const upIn = ({ members }: VariableGroup): number => members.filter((i) => spinOf(states, best!, i) === 1).length
  const evidence = groups.map((group, g): GroupEvidence => {
    const { weight = null, sufficient = null } = penalties?.[g] ?? {}
    const isBrokenInBest = best !== null && !holds(group, upIn(group))
    return { name: group.name, isBrokenInBest, violations: perGroup[g]!, weight, sufficient }
  })
  return { groups: evidence, largest: largestOf(qubo, groups) }
}
