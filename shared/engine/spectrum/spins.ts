import type { Problem } from '../problem/problem'
import type { Programmed } from '../programming/programme'
import type { SpinModel } from './spin-operator'

/** A logical problem in Ising form as it would be programmed without chains: every coefficient times the scale. */
export function logicalSpins(ising: Problem, scale: number): SpinModel {
  const ends = new Uint32Array(2 * ising.values.length)
  ising.values.forEach((_, k) => {
    ends[2 * k] = ising.rows[k]!
    ends[2 * k + 1] = ising.cols[k]!
  })
  return { h: ising.linear.map((field) => field * scale), ends, J: ising.values.map((value) => value * scale) }
}

/**
 * The qubits of some chains with what is programmed on and between them. Couplings to other chains are left out.
 * @param variables whose chains are meant
 * @returns the model, and for each of its spins the position in `programmed.qubits`
 */
export function clusterSpins(
  programmed: Programmed,
  variables: readonly number[],
): { model: SpinModel; positions: Uint32Array } {
  const { h, ends, J, chainOf } = programmed
  const wanted = new Set(variables)
  const positions = Uint32Array.from(chainOf.keys()).filter((p) => wanted.has(chainOf[p]!))
  const spinOf = new Map<number, number>()
  positions.forEach((p, spin) => spinOf.set(p, spin))
  const kept = Array.from(J.keys()).filter((c) => spinOf.has(ends[2 * c]!) && spinOf.has(ends[2 * c + 1]!))
  return {
    positions,
    model: {
      h: Float64Array.from(positions, (p) => h[p]!),
      ends: Uint32Array.from(kept.flatMap((c) => [spinOf.get(ends[2 * c]!)!, spinOf.get(ends[2 * c + 1]!)!])),
      J: Float64Array.from(kept, (c) => J[c]!),
    },
  }
}
