import { spinOf } from '../../../../shared/engine/sampling/samples'
import type { Samples } from '../../../../shared/engine/sampling/samples'
import type { CouplingList } from '../../../../shared/engine/sampling/physical-model'

/** A periodic square lattice of side L ≥ 3 with the same coupling on every bond, without fields. */
export function squareLattice(side: number, J: number): CouplingList {
  const ends: number[] = []
  for (let y = 0; y < side; y++)
    for (let x = 0; x < side; x++)
      ends.push(y * side + x, y * side + ((x + 1) % side), y * side + x, ((y + 1) % side) * side + x)
  const bonds = ends.length / 2
  return { h: new Float64Array(side * side), ends: Uint32Array.from(ends), J: new Float64Array(bonds).fill(J) }
}

/** Energies of the rows, summed term by term. */
export const energiesOfRows = ({ h, ends, J }: CouplingList, samples: Samples): Float64Array =>
  Float64Array.from({ length: samples.rows }, (_, r) => {
    let energy = 0
    for (let i = 0; i < h.length; i++) energy += h[i]! * spinOf(samples, r, i)
    for (let c = 0; c < J.length; c++)
      energy += J[c]! * spinOf(samples, r, ends[2 * c]!) * spinOf(samples, r, ends[2 * c + 1]!)
    return energy
  })
