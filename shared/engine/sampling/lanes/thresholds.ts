import { LANES } from './lane-model'
import { LONGEST, QUANTILES, shuffledQuantiles } from './quantiles'

/** Units of ln u in a 16-bit table: the longest entry just fits. */
const UNIT = Math.floor(32_768 / LONGEST)
/** Doublings beyond which every temperature counts as the same: some 10⁵ times the largest local field. */
const MOST_DOUBLINGS = 16
const FULL = 32_768

/** Entries of a table: the first ones again at its end, so that a run of lanes may start anywhere. */
export const TABLE_LENGTH = QUANTILES + LANES

/** A sweep of the 16-bit kernel: thresholds are entries × factor / 32,768, rounded, doubled so often, less the bias. */
export interface Sweep16 {
  readonly factor: number
  readonly doublings: number
  readonly bias: number
}

/**
 * How sweep number `index` compares s·f, in steps, with ln(u)·T/2. Its instruction multiplies by less than one, so hot
 * sweeps double what comes out, and saturate, for no flip costs more than the lowest number. Comparing whole numbers with a
 * rounded threshold favours one side by half a step: odd sweeps favour the other one.
 * @param scale steps in a programmed unit
 */
export function sweep16(inverseTemperature: number, scale: number, index: number): Sweep16 {
  const ratio = (FULL * scale) / (2 * inverseTemperature) / UNIT
  let doublings = 0
  while (doublings < MOST_DOUBLINGS && Math.round(ratio / 2 ** doublings) >= FULL) doublings++
  const factor = Math.min(FULL - 1, Math.round(ratio / 2 ** doublings))
  return { factor, doublings, bias: index & 1 }
}

/** ln u in 16 bits. */
export const table16 = (): Int16Array => {
  const quantiles = shuffledQuantiles()
  return Int16Array.from({ length: TABLE_LENGTH }, (_, k) => Math.round(quantiles[k % QUANTILES]! * UNIT))
}

/** What the entries of the 32-bit table are multiplied by: half the temperature, in steps. */
export const factor32 = (inverseTemperature: number, scale: number): number =>
  Math.fround(scale / (2 * inverseTemperature))

/** ln u itself, in single precision. */
export const table32 = (): Float32Array => {
  const quantiles = shuffledQuantiles()
  return Float32Array.from({ length: TABLE_LENGTH }, (_, k) => quantiles[k % QUANTILES]!)
}
