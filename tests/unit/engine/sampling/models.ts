import { createRandom } from '../../../../shared/engine/random'
import type { CouplingList } from '../../../../shared/engine/sampling/physical-model'

/** Random fields and couplings, each pair coupled with probability 0.6 or as told. */
export function randomModel(n: number, seed: number, density = 0.6): CouplingList {
  const random = createRandom(seed)
  const ends: number[] = []
  for (let a = 0; a < n; a++) for (let b = a + 1; b < n; b++) if (random.float() < density) ends.push(a, b)
  return {
    h: Float64Array.from({ length: n }, () => random.normal() * 0.5),
    ends: Uint32Array.from(ends),
    J: Float64Array.from({ length: ends.length / 2 }, () => random.normal()),
  }
}
