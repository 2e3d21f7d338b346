/** A statistic that is chi-squared distributed, nearly, where the groups do not differ. */
export interface GroupStatistic {
  readonly statistic: number
  readonly degrees: number
  /** Whether the approximation can be relied on. */
  readonly isReliable: boolean
}

/** Cochran's rule: no expected count under 1, and at most a fifth of them under 5 (Biometrics 10:417, 1954). */
const EXPECTED = { least: 1, usual: 5, shareUnder: 0.2 }
/** Observations a group should have for the ranks' statistic (Kruskal & Wallis say above five). */
const LEAST_RANKED = 6

/**
 * Pearson's chi-squared statistic of homogeneity: are events equally likely in all groups? (Pearson, Phil. Mag. 50:157,
 * 1900.)
 * @returns null with fewer than two groups that have trials, or where no event or nothing but events was seen
 * @throws RangeError for lists of different lengths or more events than trials
 */
export function homogeneity(events: ArrayLike<number>, trials: ArrayLike<number>): GroupStatistic | null {
  if (events.length !== trials.length) throw new RangeError(`${events.length} counts for ${trials.length} groups`)
  const groups: [number, number][] = []
  let [hits, all] = [0, 0]
  for (let g = 0; g < trials.length; g++) {
    if (!(events[g]! >= 0 && events[g]! <= trials[g]!))
      throw new RangeError(`${events[g]} events in ${trials[g]} trials`)
    if (trials[g] === 0) continue
    groups.push([events[g]!, trials[g]!])
    hits += events[g]!
    all += trials[g]!
  }
  if (groups.length < 2 || hits === 0 || hits === all) return null
  let [statistic, small, least] = [0, 0, Infinity]
  for (const [seen, of] of groups)
    for (const [observed, expected] of [
      [seen, (of * hits) / all],
      [of - seen, (of * (all - hits)) / all],
    ] as const) {
      statistic += (observed - expected) ** 2 / expected
      least = Math.min(least, expected)
      if (expected < EXPECTED.usual) small++
    }
  const isReliable = least >= EXPECTED.least && small <= EXPECTED.shareUnder * 2 * groups.length
  return { statistic, degrees: groups.length - 1, isReliable }
}

/**
 * Kruskal and Wallis's H, corrected for ties: do the values of some group tend to be greater? (Kruskal & Wallis, JASA
 * 47:583, 1952.) A value counts `counts` times; NaN is left out.
 * @param group of each value, 0 … groups − 1
 * @returns null with fewer than two groups that have values, or where all values are equal
 */
export function rankStatistic(
  values: Float64Array,
  counts: Uint32Array,
  group: ArrayLike<number>,
  groups: number,
): GroupStatistic | null {
  const order = Uint32Array.from(values.keys())
    .filter((k) => !Number.isNaN(values[k]!))
    .sort((a, b) => values[a]! - values[b]!)
  const sizes = new Float64Array(groups)
  const rankSums = new Float64Array(groups)
  let [below, tied] = [0, 0]
  for (let start = 0, end = 0; start < order.length; start = end) {
    let equal = 0
    while (end < order.length && values[order[end]!] === values[order[start]!]) equal += counts[order[end++]!]!
    for (let k = start; k < end; k++) {
      sizes[group[order[k]!]!]! += counts[order[k]!]!
      rankSums[group[order[k]!]!]! += counts[order[k]!]! * (below + (equal + 1) / 2)
    }
    below += equal
    tied += equal ** 3 - equal
  }
  const used = sizes.filter((size) => size > 0)
  const correction = 1 - tied / (below ** 3 - below)
  if (used.length < 2 || !(correction > 0)) return null
  const squares = rankSums.reduce((sum, ranks, g) => sum + (sizes[g]! > 0 ? ranks ** 2 / sizes[g]! : 0), 0)
  const uncorrected = (12 * squares) / (below * (below + 1)) - 3 * (below + 1)
  return {
    statistic: uncorrected / correction,
    degrees: used.length - 1,
    isReliable: used.every((size) => size >= LEAST_RANKED),
  }
}
