import { createRandom, shuffle, STREAMS } from '../random'
import type { SamplerModel } from './physical-model'

/**
 * A shuffled order in which the spins are visited, one per seed (Fisher & Yates 1938). Metropolis sweeps that follow a chain
 * from end to end push its domain walls along instead of letting them wander, since flips that cost nothing are always
 * taken: a chain in the order of its qubits forgets its start some thirty times slower than in a shuffled order (measured at T = 2|J|).
 */
export function shuffledOrder(n: number, seed: number): Uint32Array {
  const random = createRandom(seed, STREAMS.order)
  const order = Uint32Array.from({ length: n }, (_, i) => i)
  shuffle(order, random)
  return order
}

/** Spins order[starts[l]] … order[starts[l + 1] − 1] are those of level l. */
export interface LevelledOrder {
  readonly order: Uint32Array
  readonly starts: Uint32Array
}

/**
 * The shuffled order cut into levels: a spin's level is one above the highest of its neighbours that come before it. Spins
 * of a level are no neighbours, so a level can be judged at once, and a sweep level by level is the sweep in the shuffled
 * order itself: neighbours keep their order, and for others it does not matter. (A colouring would give fewer
 * levels, but in two colours a domain wall is pushed along its chain as it is in the order of qubits.)
 * Within a level spins of more neighbours come first, so that loops over neighbours end where the one before ended.
 */
export function levelledOrder(model: SamplerModel, seed: number): LevelledOrder {
  const { n, offsets, targets } = model
  const shuffled = shuffledOrder(n, seed)
  const place = new Uint32Array(n)
  shuffled.forEach((i, k) => (place[i] = k))
  const level = new Uint32Array(n)
  let levels = 0
  for (const i of shuffled) {
    for (let p = offsets[i]!; p < offsets[i + 1]!; p++) {
      const j = targets[p]!
      if (place[j]! < place[i]!) level[i] = Math.max(level[i]!, level[j]! + 1)
    }
    levels = Math.max(levels, level[i]! + 1)
  }
  const degree = (i: number): number => offsets[i + 1]! - offsets[i]!
  const order = shuffled.sort((i, j) => level[i]! - level[j]! || degree(j) - degree(i) || place[i]! - place[j]!)
  const starts = new Uint32Array(levels + 1)
  for (const l of level) starts[l + 1]!++
  for (let l = 0; l < levels; l++) starts[l + 1]! += starts[l]!
  return { order, starts }
}
