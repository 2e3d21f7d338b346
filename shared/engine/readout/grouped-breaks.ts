import type { Interval } from './intervals'
import { wilson } from './intervals'

/** Chains that are alike in some measure, and how often they broke together. */
export interface BreakGroup extends Interval {
  /** Least, mean and greatest measure of its chains. */
  readonly from: number
  readonly mean: number
  readonly to: number
  readonly chains: number
  /** Chain breaks among chain reads. */
  readonly breaks: number
  readonly chainReads: number
  /** breaks / chainReads; 0 without reads. */
  readonly rate: number
}

/** More groups than this cannot be told apart in a chart of this size. */
const DEFAULTS = { groups: 8 }

/** Places where the ordered values may be cut: the first of each distinct value. */
function cutsOf(sorted: Float64Array, groups: number): number[] {
  const distinct = Array.from(sorted.keys()).filter((k) => k === 0 || sorted[k] !== sorted[k - 1])
  if (distinct.length <= groups) return distinct
  const cuts = Array.from({ length: groups }, (_, g) => {
    const quantile = Math.round((g * sorted.length) / groups)
    return distinct.findLast((at) => at <= quantile)!
  })
  return [...new Set(cuts)]
}

/**
 * Break rates of chains grouped by a measure such as their length: one group a value where there are few, else quantile
 * groups of about as many chains, equal values never parted. The Wilson interval takes chain reads as independent; chains
 * that break together in a read make it too narrow.
 * @param values measure of each chain; `breaks` reads in which it broke, of `reads`
 * @returns groups in ascending order; none without chains
 * @throws RangeError for lists of different lengths
 */
export function groupedBreaks(
  values: ArrayLike<number>,
  breaks: ArrayLike<number>,
  reads: number,
  groups = DEFAULTS.groups,
): BreakGroup[] {
  if (values.length !== breaks.length) throw new RangeError(`${breaks.length} counts for ${values.length} chains`)
  const order = Uint32Array.from({ length: values.length }, (_, k) => k).sort(
    (a, b) => values[a]! - values[b]! || a - b,
  )
  const sorted = Float64Array.from(order, (k) => values[k]!)
  const cuts = cutsOf(sorted, groups)
  return cuts.map((start, g) => {
    const end = cuts[g + 1] ?? order.length
    let [broken, sum] = [0, 0]
    for (let k = start; k < end; k++) {
      broken += breaks[order[k]!]!
      sum += sorted[k]!
    }
    const chains = end - start
    const chainReads = chains * reads
    return {
      from: sorted[start]!,
      mean: sum / chains,
      to: sorted[end - 1]!,
      chains,
      breaks: broken,
      chainReads,
      rate: chainReads > 0 ? broken / chainReads : 0,
      ...wilson(broken, chainReads),
    }
  })
}
