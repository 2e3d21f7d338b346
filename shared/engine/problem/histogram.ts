/** Values v with from ≤ v < to (the last bin includes `to`); from = to when the bin holds one value only. */
export interface HistogramBin {
  readonly from: number
  readonly to: number
  readonly count: number
}

/** How often each distinct value occurs, ascending, or null as soon as there are more than `limit` of them. */
export function countDistinct(values: ArrayLike<number>, limit = Infinity): { value: number; count: number }[] | null {
  const counts = new Map<number, number>()
  for (let k = 0; k < values.length; k++) {
    counts.set(values[k]!, (counts.get(values[k]!) ?? 0) + 1)
    if (counts.size > limit) return null
  }
  return [...counts].map(([value, count]) => ({ value, count })).sort((a, b) => a.value - b.value)
}

/**
 * A histogram of at most `maxBins` bins, ascending: one bin a value when there are few distinct values, otherwise bins
 * of equal width from the least to the greatest value. No values, no bins.
 */
export function histogram(values: ArrayLike<number>, maxBins: number): HistogramBin[] {
  const distinct = countDistinct(values, maxBins)
  if (distinct) return distinct.map(({ value, count }) => ({ from: value, to: value, count }))
  let least = Infinity
  let greatest = -Infinity
  for (let k = 0; k < values.length; k++) {
    least = Math.min(least, values[k]!)
    greatest = Math.max(greatest, values[k]!)
  }
  const edge = (bin: number): number => (bin === maxBins ? greatest : least + (greatest - least) * (bin / maxBins))
  const counts = new Array<number>(maxBins).fill(0)
  for (let k = 0; k < values.length; k++) {
    let bin = Math.min(maxBins - 1, Math.floor(((values[k]! - least) / (greatest - least)) * maxBins))
    // Rounding may put a value beside an edge; the printed edges decide.
    while (bin > 0 && values[k]! < edge(bin)) bin--
    while (bin < maxBins - 1 && values[k]! >= edge(bin + 1)) bin++
    counts[bin]!++
  }
  return counts.map((count, bin) => ({ from: edge(bin), to: edge(bin + 1), count }))
}
