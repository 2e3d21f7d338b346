import { createHash } from 'node:crypto'
import type { Lifting } from '../../shared/engine/problem/presolve/lift'
import type { Steps } from '../../shared/engine/problem/presolve/record'
import type { PackedArray } from '../../shared/packed-arrays'
import { packArrays, unpackArrays } from '../../shared/packed-arrays'
import type { ProblemReference } from '../../shared/schemas/presolve'
import type { ProblemData } from './problem-data'

/** One reduction: what was taken out of a problem, and that problem's labels. */
export interface ReductionLevel extends Lifting {
  readonly steps: Steps
  readonly labels: readonly string[]
  readonly sense: 'min' | 'max'
  /** The problem it was taken out of, as it was called then. */
  readonly source: ProblemReference
}

/** How the answers of a reduced problem are lifted, as far back as it was reduced; enough by itself. */
export interface ReductionRecord {
  /** Of the reduced problem's form and coefficients: other ones are not answers of this reduction. */
  readonly coefficients: string
  /** From the reduced problem back to the one it came from first; at least one. */
  readonly levels: readonly ReductionLevel[]
}

/** SHA-256 over form, coefficients and offset; labels may be changed without harm. */
export function coefficientsOf({ form, problem }: ProblemData): string {
  const { linear, rows, cols, values, offset } = problem
  const bytes = packArrays({ linear, rows, cols, values, offset: Float64Array.of(offset) }, { form })
  return createHash('sha256').update(bytes).digest('hex')
}

export function packRecord({ coefficients, levels }: ReductionRecord): Uint8Array {
  const arrays: Record<string, PackedArray> = {}
  levels.forEach(({ kept, steps }, k) => {
    arrays[`${k} kept`] = kept
    for (const [name, array] of Object.entries(steps)) arrays[`${k} ${name}`] = array
  })
  const heads = levels.map(({ form, variables, labels, sense, source }) => ({
    form,
    variables,
    labels,
    sense,
    source,
  }))
  return packArrays(arrays, { coefficients, levels: heads })
}

export function unpackRecord(bytes: Uint8Array): ReductionRecord {
  const { meta, arrays } = unpackArrays(bytes)
  const heads = meta.levels as Omit<ReductionLevel, 'kept' | 'steps'>[]
  return {
    coefficients: meta.coefficients as string,
    levels: heads.map((head, k) => ({
      ...head,
      kept: arrays[`${k} kept`] as Uint32Array,
      steps: {
        rule: arrays[`${k} rule`] as Uint8Array,
        variable: arrays[`${k} variable`] as Uint32Array,
        first: arrays[`${k} first`] as Uint32Array,
        second: arrays[`${k} second`] as Uint32Array,
        table: arrays[`${k} table`] as Uint8Array,
        quantities: arrays[`${k} quantities`] as Float64Array,
      },
    })),
  }
}
