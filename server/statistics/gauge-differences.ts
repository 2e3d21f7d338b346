import jstat from 'jstat'
import type { GaugeRow } from '../../shared/engine/readout/gauge-table'
import type { GroupStatistic } from '../../shared/engine/readout/group-differences'
import { homogeneity, rankStatistic } from '../../shared/engine/readout/group-differences'

export interface GaugeDifference extends GroupStatistic {
  readonly of: 'breaks' | 'successes' | 'energies'
  /** Chance of as great a difference, or a greater one, between gauges that do not differ. */
  readonly p: number
  /** The same for all tests made together (Holm, Scand. J. Statist. 6:65, 1979). */
  readonly adjusted: number
}

/** P(X > x) of a chi-squared variable. @param degrees of freedom, at least 1 */
export const chiSquaredTail = (x: number, degrees: number): number =>
  Math.min(1, Math.max(0, 1 - jstat.chisquare.cdf(x, degrees)))

/** Adjusts p-values for being several: the smallest by their number, the next by one less, never falling. */
export function adjustedForSeveral(pValues: readonly number[]): number[] {
  const order = pValues.map((_, k) => k).sort((a, b) => pValues[a]! - pValues[b]!)
  const adjusted = new Array<number>(pValues.length)
  let most = 0
  order.forEach((k, place) => {
    most = Math.max(most, Math.min(1, pValues[k]! * (pValues.length - place)))
    adjusted[k] = most
  })
  return adjusted
}

/**
 * Whether gauges differ more than chance lets them: reads with a broken chain and successes by the chi-squared test of
 * homogeneity, decoded energies by Kruskal and Wallis's test. Reads are taken as independent.
 * @param energies of all rows, NaN for a dropped one; `counts` reads of each
 * @returns the tests that can be made; none with a single gauge
 */
export function gaugeDifferences(
  table: readonly GaugeRow[],
  energies: Float64Array,
  counts: Uint32Array,
): GaugeDifference[] {
  const place = new Uint32Array(counts.length)
  table.forEach(({ rows }, g) => rows.forEach((row) => (place[row] = g)))
  const reads = table.map((row) => row.reads)
  const breaks = table.map(({ readsWithBreak }) => readsWithBreak)
  const successes = table.flatMap((row) => row.successes ?? [])
  const statistics = [
    ['breaks', homogeneity(breaks, reads)],
    ['successes', successes.length > 0 ? homogeneity(successes, reads) : null],
    ['energies', rankStatistic(energies, counts, place, table.length)],
  ] as const
  const made = statistics.flatMap(([of, found]) => (found ? [{ of, ...found }] : []))
  const pValues = made.map(({ statistic, degrees }) => chiSquaredTail(statistic, degrees))
  const adjusted = adjustedForSeveral(pValues)
  return made.map((test, k) => ({ ...test, p: pValues[k]!, adjusted: adjusted[k]! }))
}
