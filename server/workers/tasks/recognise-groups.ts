import type { Control } from '../../../shared/engine/control'
import { convertForm } from '../../../shared/engine/problem/convert'
import type { VariableGroup } from '../../../shared/engine/problem/groups/group'
import type { PenaltyReport } from '../../../shared/engine/problem/groups/penalty'
import { assessPenalties, canAssess } from '../../../shared/engine/problem/groups/penalty'
import { recogniseGroups as recognitionOf } from '../../../shared/engine/problem/groups/recognise'
import type { Form, Problem } from '../../../shared/engine/problem/problem'

export interface RecogniseGroupsInput {
  problem: Problem
  form: Form
  /** Assess these in place of looking for groups. */
  groups: VariableGroup[] | null
}

export interface RecogniseGroupsOutput {
  groups: VariableGroup[]
  /** One a group; null when they have too many pairs of members to look at. */
  penalties: PenaltyReport[] | null
  complete: boolean
  seconds: number
}

/** Constraint groups of a problem with their penalties: those given, else those that can be recognised. */
export function recogniseGroups(
  { problem, form, groups: given }: RecogniseGroupsInput,
  control: Control<never>,
): RecogniseGroupsOutput {
  const began = control.now()
  const qubo = convertForm(problem, form, 'qubo')
  const found = given ? { groups: given, complete: true } : recognitionOf(qubo)
  const groups = found.groups.map(({ kind, k, members }) => ({ kind, k, members }))
  const penalties = canAssess(groups) ? assessPenalties(qubo, groups) : null
  return { groups, penalties, complete: found.complete, seconds: control.now() - began }
}
