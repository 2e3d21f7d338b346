import { createHash } from 'node:crypto'
import type { Problem } from '../../shared/engine/problem/problem'
import { packArrays, unpackArrays } from '../../shared/packed-arrays'

export interface ProblemData {
  form: 'qubo' | 'ising'
  labels: string[]
  /** In `form`, to be minimised. */
  problem: Problem
}

/** The stored bytes of a problem, and their SHA-256: equal problems have equal fingerprints. */
export function packProblem({ form, labels, problem }: ProblemData): { bytes: Uint8Array; fingerprint: string } {
  const { linear, rows, cols, values, offset } = problem
  const bytes = packArrays({ linear, rows, cols, values, offset: Float64Array.of(offset) }, { form, labels })
  return { bytes, fingerprint: createHash('sha256').update(bytes).digest('hex') }
}

export function unpackProblem(bytes: Uint8Array): ProblemData {
  const { meta, arrays } = unpackArrays(bytes)
  const linear = arrays.linear as Float64Array
  return {
    form: meta.form as 'qubo' | 'ising',
    labels: meta.labels as string[],
    problem: {
      n: linear.length,
      linear,
      rows: arrays.rows as Uint32Array,
      cols: arrays.cols as Uint32Array,
      values: arrays.values as Float64Array,
      offset: arrays.offset![0]!,
    },
  }
}
