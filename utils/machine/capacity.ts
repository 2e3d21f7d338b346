import type { CapacityMeasured } from '#shared/schemas/machine-use'
import type { ChainLengthPoint } from '#shared/schemas/machines'
import type { ChartSeries } from '../ui/chart/types'
import { formatCount, formatNumber, formatPercent } from '../format'

const STROKES = ['solid', 'dashed', 'dotted'] as const

const densitiesOf = (points: readonly ChainLengthPoint[]): number[] =>
  [...new Set(points.map(({ density }) => density))].sort((a, b) => a - b)

/** A line a density through the medians, with the least and the most as intervals. */
export const chainSeries = (points: readonly ChainLengthPoint[]): ChartSeries[] =>
  densitiesOf(points).flatMap((density, k): ChartSeries[] => {
    const found = points.flatMap((point) =>
      point.density === density && point.longestChain
        ? [
            {
              x: point.variables,
              y: point.longestChain.median,
              low: point.longestChain.least,
              high: point.longestChain.most,
            },
          ]
        : [],
    )
    if (found.length === 0) return []
    const name = `d ${formatPercent(density)}`
    return [
      {
        name,
        points: found,
        stroke: STROKES[k % STROKES.length],
        marker: k % 2 ? 'hollow' : 'full',
        labelAt: found.at(-1)!.x,
      },
    ]
  })

/** Where nothing was found, density by density. */
export const noneFoundWords = ({ points, settings }: CapacityMeasured): string[] =>
  points
    .filter(({ found }) => found === 0)
    .map(
      ({ density, variables, problems }) =>
        `density ${formatPercent(density)}: none found at ${formatCount(variables, 'variable')} in ${formatCount(problems, 'problem')} of ${formatNumber(settings.timeLimitSeconds)} s`,
    )
