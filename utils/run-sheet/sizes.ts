import type { HistogramBin } from '#shared/schemas/common'
import type { ChartPoint } from '../ui/chart/types'

export interface SizeChart {
  points: ChartPoint[]
  /** Width of one bar, in programmed units. */
  width: number
  /** Right end of the last bar. */
  end: number
}

const MOST_BARS = 40
const LEAST_BARS = 20
/** Keeps a value that sits on an edge in the bin above it. */
const EDGE = 1e-9

/** Equal bars from nought whose width divides or is divided by the threshold, so that the threshold falls on an edge. */
function barWidth(greatest: number, threshold: number): number {
  let width = threshold > 0 ? threshold : greatest / MOST_BARS
  while (greatest / width > MOST_BARS) width *= 2
  while (greatest / width < LEAST_BARS) width /= 2
  return width
}

/** Counts single values into equal bars. */
function intoBars(bins: readonly HistogramBin[], width: number): HistogramBin[] {
  const bars: HistogramBin[] = []
  for (const { from, count } of bins) {
    const index = Math.floor(from / width + EDGE)
    for (let next = bars.length; next <= index; next++)
      bars.push({ from: next * width, to: (next + 1) * width, count: 0 })
    bars[index] = { ...bars[index]!, count: bars[index]!.count + count }
  }
  return bars
}

/**
 * Bars of programmed sizes for a chart; those wholly under the threshold are set apart.
 * @param bins sizes in programmed units, ascending: one value a bin, or bins of equal width
 * @param threshold 2σ in programmed units, 0 where the machine states no control error
 */
export function sizeChart(bins: readonly HistogramBin[], threshold: number): SizeChart {
  const greatest = bins.at(-1)?.to ?? 0
  if (greatest === 0) return { points: [], width: 1, end: 1 }
  const single = bins.every(({ from, to }) => from === to)
  const bars = single ? intoBars(bins, barWidth(greatest, threshold)) : bins
  const width = bars[0]!.to - bars[0]!.from
  const points = bars.map(({ from, to, count }): ChartPoint => ({
    x: (from + to) / 2,
    y: count,
    ...(to <= threshold * (1 + EDGE) ? { tone: 'ochre' as const } : {}),
  }))
  return { points, width, end: bars.at(-1)!.to }
}
