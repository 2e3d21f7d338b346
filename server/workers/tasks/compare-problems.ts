import type { Control } from '../../../shared/engine/control'
import type { ProblemDifference } from '../../../shared/engine/problem/difference/difference'
import { differenceOf } from '../../../shared/engine/problem/difference/difference'
import { convertForm } from '../../../shared/engine/problem/convert'
import { negateProblem } from '../../../shared/engine/problem/negate'
import type { Form, Problem } from '../../../shared/engine/problem/problem'

/** A problem as it is stored: to be minimised, in the form that it came in, with the sense it is shown in. */
interface Side {
  labels: string[]
  form: Form
  sense: 'min' | 'max'
  problem: Problem
}

export interface CompareProblemsInput {
  before: Side
  after: Side
  /** How many labels and changed coefficients are listed of each kind; all are counted. */
  shown: number
}

export interface ComparedProblems {
  counts: { added: number; removed: number; renamed: number }
  difference: ProblemDifference
}

const asShown = ({ labels, form, sense, problem }: Side, to: Form) => {
  const converted = convertForm(problem, form, to)
  return {
    labels,
    problem: sense === 'max' ? negateProblem(converted, { coefficients: true, offset: true }) : converted,
  }
}

/** What changed, in the form of the later problem and each one's own sense, with the first of each kind. */
export function compareProblems({ before, after, shown }: CompareProblemsInput, _control: Control<never>) {
  const whole = differenceOf(asShown(before, after.form), asShown(after, after.form), shown)
  const { added, removed, renamed } = whole
  const difference = {
    ...whole,
    added: added.slice(0, shown),
    removed: removed.slice(0, shown),
    renamed: renamed.slice(0, shown),
  }
  const counts = { added: added.length, removed: removed.length, renamed: renamed.length }
  return { counts, difference } satisfies ComparedProblems
}
