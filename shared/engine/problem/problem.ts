/** The two equivalent forms: `qubo` over x ∈ {0, 1}, `ising` over s ∈ {−1, +1}. */
export type Form = 'qubo' | 'ising'

/**
 * A quadratic problem over n variables, to be minimised:
 * E(z) = Σ linear[i]·z_i + Σ_k values[k]·z_{rows[k]}·z_{cols[k]} + offset.
 * rows[k] < cols[k]; pairs are sorted by row, then column; each pair stands once; no value is zero.
 */
export interface Problem {
  readonly n: number
  readonly linear: Float64Array
  readonly rows: Uint32Array
  readonly cols: Uint32Array
  readonly values: Float64Array
  readonly offset: number
}
