import type { Control } from '../../../shared/engine/control'
import type { MachineLimits, UnderControlError } from '../../../shared/engine/problem/control-error'
import { underControlError } from '../../../shared/engine/problem/control-error'
import { convertForm } from '../../../shared/engine/problem/convert'
import type { Form, Problem } from '../../../shared/engine/problem/problem'
import type { StructureDetails } from '../../../shared/engine/problem/structure-details'
import { structureDetails as detailsOf } from '../../../shared/engine/problem/structure-details'

export interface StructureDetailsInput {
  problem: Problem
  form: Form
  machines: MachineLimits[]
}

export interface StructureDetailsOutput {
  details: StructureDetails
  /** One a machine. */
  precision: UnderControlError[]
  seconds: number
}

/** The slower part of a problem's structure report, and its coefficients beside the control error of machines. */
export function structureDetails(
  { problem, form, machines }: StructureDetailsInput,
  control: Control<never>,
): StructureDetailsOutput {
  const began = control.now()
  const ising = convertForm(problem, form, 'ising')
  const details = detailsOf(problem, form)
  const precision = machines.map((machine) => underControlError(ising, machine))
  return { details, precision, seconds: control.now() - began }
}
