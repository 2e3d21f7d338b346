import type { ColourName } from '../../../assets/css/tokens'
import { DASHES, kindOf, toneOf } from './series'
import type { ChartInput } from './types'

/** How one series is recognised: by stroke and mark first, by colour second. */
export interface LegendEntry {
  readonly name: string
  readonly isBar: boolean
  readonly isLine: boolean
  readonly marker: 'full' | 'hollow' | 'plus' | 'none'
  readonly dash: readonly number[]
  readonly tone: ColourName
}

/** Entries of a chart of several series; one alone needs none. */
export function legendOf(input: ChartInput): LegendEntry[] {
  if (input.series.length < 2) return []
  return input.series.map((series, index) => {
    const kind = kindOf(input, series)
    return {
      name: series.name,
      isBar: kind === 'bar',
      isLine: kind === 'line' || kind === 'step',
      marker: series.marker ?? (kind === 'points' || kind === 'line' ? 'full' : 'none'),
      dash: DASHES[series.stroke ?? 'solid'],
      tone: toneOf(input, index),
    }
  })
}
