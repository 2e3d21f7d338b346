import type { Control } from '../../../shared/engine/control'
import type { PresolveProgress, Reduction } from '../../../shared/engine/problem/presolve/presolve'
import { presolve as reduce } from '../../../shared/engine/problem/presolve/presolve'
import type { Form, Problem } from '../../../shared/engine/problem/problem'
import type { StructureReport } from '../../../shared/engine/problem/structure'
import { structureOf } from '../../../shared/engine/problem/structure'

export interface PresolveInput {
  problem: Problem
  form: Form
}

export interface PresolveOutput {
  reduction: Reduction
  /** Of what is left. */
  structure: StructureReport
  seconds: number
}

/** Makes a problem smaller without losing its optimum; stopped early it answers what it has. */
export function presolve({ problem, form }: PresolveInput, control: Control<PresolveProgress>): PresolveOutput {
  const began = control.now()
  const reduction = reduce(problem, form, { shouldStop: control.cancelled, report: control.report })
  return { reduction, structure: structureOf(reduction.problem), seconds: control.now() - began }
}
