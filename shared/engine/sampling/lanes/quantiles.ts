import { createRandom, shuffle } from '../../random'

/** Entries of the table; 16 bits of a random number are a place in it. */
export const QUANTILES = 65_536
/** The largest −ln u in the table: a flip that costs more, relative to the temperature, is never taken. */
export const LONGEST = Math.log(2 * QUANTILES)

let shuffled: Float64Array | null = null

/**
 * ln u at the middles u = (j + ½) / 65,536 of as many equal parts of (0, 1), in a shuffled order that is always the
 * same: consecutive entries from a random place are thresholds for replicas side by side. Worked out once a thread.
 */
export function shuffledQuantiles(): Float64Array {
  if (shuffled) return shuffled
  const order = Uint32Array.from({ length: QUANTILES }, (_, j) => j)
  shuffle(order, createRandom(QUANTILES))
  shuffled = Float64Array.from(order, (j) => Math.log((j + 0.5) / QUANTILES))
  return shuffled
}
