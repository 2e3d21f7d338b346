import type { ReturnView } from '#shared/schemas/returns'
import type { ChartSeries } from '../ui/chart/types'

export interface EnergyChart {
  series: ChartSeries[]
  binWidth: number
  unit: string
  axis: string
}

/** Share of the reads that are as good as an energy or better, as steps; the samples compared with as a dashed line. */
export function cumulativeSeries(
  { series }: Pick<NonNullable<ReturnView['energies']>, 'series'>,
  sense: 'min' | 'max',
): ChartSeries[] {
  return series.map(({ title, cumulative, reads }, index) => ({
    name: title,
    kind: 'step' as const,
    holds: sense === 'min' ? ('from' as const) : ('up to' as const),
    ...(index === 0 ? {} : { stroke: 'dashed' as const }),
    points: cumulative
      .map(({ energy, reads: within }) => ({ x: energy, y: (100 * within) / reads }))
      .sort((a, b) => a.x - b.x),
  }))
}

/**
 * Decoded energies as bars, and those of the samples they are compared with as a dashed outline on the same steps; in
 * per cent of the reads when the two hold different numbers of reads.
 */
export function energyChart({ start, width, series }: NonNullable<ReturnView['energies']>): EnergyChart {
  const [own] = series
  const asShare = series.some(({ reads }) => reads !== own?.reads)
  return {
    binWidth: width,
    unit: asShare ? '% of reads in each step' : 'reads in each step',
    axis: asShare ? '% of reads' : 'reads',
    series: series.map(({ title, counts, reads }, index) => ({
      name: title,
      kind: index === 0 ? ('bar' as const) : ('step' as const),
      ...(index === 0 ? {} : { stroke: 'dashed' as const }),
      points: counts.map((count, bin) => ({
        x: start + (bin + 0.5) * width,
        y: asShare ? (100 * count) / reads : count,
      })),
    })),
  }
}
