import type { ChartPoint } from '../ui/chart/types'

/**
 * Bars from the shortest to the longest length that occurs, gaps included.
 * @param histogram number of chains by length
 */
export function lengthPoints(histogram: readonly number[]): ChartPoint[] {
  const shortest = histogram.findIndex((chains) => chains > 0)
  const longest = histogram.findLastIndex((chains) => chains > 0)
  if (shortest < 0) return []
  return histogram.slice(shortest, longest + 1).map((chains, k) => ({ x: shortest + k, y: chains }))
}
