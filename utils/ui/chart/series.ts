import type { ColourName } from '../../../assets/css/tokens'
import type { ChartInput, ChartKind, ChartSeries } from './types'

/** Strokes tell series apart before colours do. */
export const DASHES = { solid: [], dashed: [5, 3], dotted: [1.5, 3] } as const

/** Height of one row in a chart of rates. */
export const RATE_ROW = 19

/** Tone of a series that names none: ink, then quieter; bars under lines are pale. */
export function toneOf(input: ChartInput, index: number): ColourName {
  const series = input.series[index]
  if (series?.tone) return series.tone
  if (kindOf(input, series) !== 'bar') return 'ink'
  return input.series.length > 1 ? 'pale' : 'ink2'
}

export function kindOf(input: ChartInput, series: ChartSeries | undefined): ChartKind {
  return series?.kind ?? input.kind
}
