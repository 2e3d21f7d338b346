import type { Control } from '../../../shared/engine/control'
import { writeProblem } from '../../../shared/engine/formats'
import { convertForm } from '../../../shared/engine/problem/convert'
import type { Problem } from '../../../shared/engine/problem/problem'

type Form = 'qubo' | 'ising'

export interface WriteProblemInput {
  /** A problem as it is stored: to be minimised, in the form that it came in. */
  stored: { form: Form; labels: string[]; problem: Problem }
  form: Form
  format: 'coefficients' | 'dense-csv'
  sense: 'min' | 'max'
}

/** A problem file in either form. */
export function writeProblemFile({ stored, form, format, sense }: WriteProblemInput, _control: Control<never>) {
  const problem = convertForm(stored.problem, stored.form, form)
  return { bytes: writeProblem(format, { form, labels: stored.labels, problem, sense }) }
}
