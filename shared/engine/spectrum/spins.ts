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

/** The fields that spins outside put on those inside: J·s over the couplers between, s = ±1 by variable. */
function outsideFields(
  { ends, J, chainOf }: Programmed,
  spinOf: ReadonlyMap<number, number>,
  state: ArrayLike<number>,
): Float64Array {
  const fields = new Float64Array(spinOf.size)
  for (let c = 0; c < J.length; c++) {
    const [a, b] = [ends[2 * c]!, ends[2 * c + 1]!]
    const [inA, inB] = [spinOf.get(a), spinOf.get(b)]
    if (inA !== undefined && inB === undefined) fields[inA]! += J[c]! * state[chainOf[b]!]!
    if (inB !== undefined && inA === undefined) fields[inB]! += J[c]! * state[chainOf[a]!]!
  }
  return fields
}

/**
 * The qubits of some chains with what is programmed on and between them. Couplings to other chains are left out, or act
 * as fields where their spins are held.
 * @param variables whose chains are meant
 * @param held ±1 for each variable of the problem: the state at which all other chains are held, unbroken
 * @returns the model, and for each of its spins the position in `programmed.qubits`
 */
export function clusterSpins(
  programmed: Programmed,
  variables: readonly number[],
  held: ArrayLike<number> | null = null,
): { model: SpinModel; positions: Uint32Array } {
  const { h, ends, J, chainOf } = programmed
  const wanted = new Set(variables)
  const positions = Uint32Array.from(chainOf.keys()).filter((p) => wanted.has(chainOf[p]!))
  const spinOf = new Map<number, number>()
  positions.forEach((p, spin) => spinOf.set(p, spin))
  const kept = Array.from(J.keys()).filter((c) => spinOf.has(ends[2 * c]!) && spinOf.has(ends[2 * c + 1]!))
  const outside = held ? outsideFields(programmed, spinOf, held) : null
  return {
    positions,
    model: {
      h: Float64Array.from(positions, (p, spin) => h[p]! + (outside?.[spin] ?? 0)),
      ends: Uint32Array.from(kept.flatMap((c) => [spinOf.get(ends[2 * c]!)!, spinOf.get(ends[2 * c + 1]!)!])),
      J: Float64Array.from(kept, (c) => J[c]!),
    },
  }
}
