import type { ChainBreaks } from '#shared/schemas/returns'
import type { ChartPoint } from '../ui/chart/types'

const byRate = (a: ChainBreaks, b: ChainBreaks): number => b.rate - a.rate || a.variable - b.variable

/** The chains that broke most, worst first; chains that never broke are left out. */
export function worstChains(chains: readonly ChainBreaks[], most: number): ChainBreaks[] {
  return chains
    .filter(({ count }) => count > 0)
    .sort(byRate)
    .slice(0, most)
}

/** Rates in per cent with their intervals, one row a chain. */
export function breakRates(chains: readonly ChainBreaks[]): ChartPoint[] {
  return chains.map(({ label, rate, low, high }, row) => ({
    x: row,
    y: 100 * rate,
    low: 100 * low,
    high: 100 * high,
    label,
  }))
}

/**
 * The fewest chains that give the stated share of all chain breaks, worst first, with the share they reach.
 * Null when nothing broke.
 */
export function mainBreakers(
  chains: readonly ChainBreaks[],
  share: number,
): { chains: ChainBreaks[]; share: number } | null {
  const sorted = worstChains(chains, chains.length)
  const total = sorted.reduce((sum, { count }) => sum + count, 0)
  if (total === 0) return null
  let reached = 0
  const main: ChainBreaks[] = []
  for (const chain of sorted) {
    if (reached >= share * total) break
    main.push(chain)
    reached += chain.count
  }
  return { chains: main, share: reached / total }
}
