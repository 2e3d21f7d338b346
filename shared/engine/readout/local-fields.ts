import type { Problem } from '../problem/problem'
import { samplerModel } from '../sampling/physical-model'
import type { SamplerModel } from '../sampling/physical-model'

/** The neighbour lists of a logical Ising problem. */
export function logicalModel(ising: Problem): SamplerModel {
  const ends = new Uint32Array(2 * ising.values.length)
  ising.rows.forEach((row, k) => {
    ends[2 * k] = row
    ends[2 * k + 1] = ising.cols[k]!
  })
  return samplerModel({ h: ising.linear, ends, J: ising.values })
}

/** Writes h_i + Σ_j J_ij s_j of every spin into `fields`. */
export function writeLocalFields(model: SamplerModel, spins: Int8Array, fields: Float64Array): void {
  for (let i = 0; i < model.n; i++) {
    let field = model.h[i]!
    for (let p = model.offsets[i]!; p < model.offsets[i + 1]!; p++)
      field += model.weights[p]! * spins[model.targets[p]!]!
    fields[i] = field
  }
}
