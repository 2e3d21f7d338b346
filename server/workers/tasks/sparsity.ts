import type { Control } from '../../../shared/engine/control'
import type { Problem } from '../../../shared/engine/problem/problem'
import type { Sparsity, SparsityOptions } from '../../../shared/engine/problem/sparsity'
import { sparsityOf } from '../../../shared/engine/problem/sparsity'

export interface SparsityInput extends SparsityOptions {
  problem: Problem
}

/** The pattern of a problem's interactions. */
export function sparsity(
  { problem, ...options }: SparsityInput,
  control: Control<never>,
): Sparsity & { seconds: number } {
  const began = control.now()
  return { ...sparsityOf(problem, options), seconds: control.now() - began }
}
