import { Z_95 } from '#shared/engine/readout/intervals'
import type { ComparedReturn } from '#shared/schemas/return-comparison'
import type { ColourName } from '../../assets/css/tokens'
import type { ChartAxis, ChartPoint, ChartSeries } from '../ui/chart/types'
import { formatCount } from '../format'

/** Samples of one problem side by side: what is drawn, against what. */

export const COMPARED = ['breaks', 'gap', 'success', 'time', 'temperature'] as const
export type Compared = (typeof COMPARED)[number]
export const AGAINST = ['strength', 'order'] as const
export type Against = (typeof AGAINST)[number]

type Value = Pick<ChartPoint, 'y' | 'low' | 'high'>

interface Measure {
  label: string
  axis: ChartAxis
  /** Said beneath, where the values need a word. */
  note?: string
  of: (item: ComparedReturn) => Value | null
}

const percent = ({ rate, low, high }: { rate: number; low: number; high: number }): Value => ({
  y: 100 * rate,
  low: 100 * low,
  high: 100 * high,
})

export const MEASURES: Record<Compared, Measure> = {
  breaks: {
    label: 'Broken chains',
    axis: { label: 'broken chain reads', unit: '%', min: 0 },
    note: 'Bars are Wilson 95 % intervals, chain reads taken as independent: where chains break together they are too narrow.',
    of: ({ chainReads }) => (chainReads.total > 0 ? percent(chainReads) : null),
  },
  gap: {
    label: 'Gap of the best',
    axis: { label: 'best energy less the reference', unit: 'in units of the problem' },
    note: 'How much worse the best read is than the reference; less than 0 where it is better than what was best known.',
    of: ({ gapOfBest }) => (gapOfBest === null ? null : { y: gapOfBest }),
  },
  success: {
    label: 'Success',
    axis: { label: 'reads within the gap', unit: '%', min: 0 },
    note: 'Bars are Wilson 95 % intervals.',
    of: ({ success }) => success && percent(success),
  },
  time: {
    label: 'Time to solution',
    axis: { label: 'time to solution', unit: 'ms', scale: 'log' },
    note: 'Samples without a success have no time and are left out. An interval without an upper end ends at its value.',
    of: ({ milliseconds }) =>
      milliseconds?.value
        ? {
            y: milliseconds.value,
            low: milliseconds.low ?? milliseconds.value,
            high: milliseconds.high ?? milliseconds.value,
          }
        : null,
  },
  temperature: {
    label: 'Effective temperature',
    axis: { label: 'effective temperature', unit: 'programmed units' },
    note: 'Bars are 95 % intervals from the standard error. Programmed units: samples of another scale are not held to the same ruler.',
    of: ({ temperature }) => {
      if (!temperature) return null
      const { temperature: y, inverseTemperature: beta, standardError } = temperature
      const half = beta && standardError !== null ? (Z_95 * standardError) / beta ** 2 : null
      return half === null ? { y } : { y, low: y - half, high: y + half }
    },
  },
}

/** `RS-4/1`: the second set of samples of a run sheet has another number after the stroke. */
export const samplesNumber = ({ runSheet, number }: ComparedReturn): string => `RS-${runSheet.number}/${number}`

const TONES: readonly ColourName[] = ['ink', 'leaf', 'slate', 'ochretext']

/** A series for each machine and source, in the order in which machines come. */
function seriesOf(items: readonly ComparedReturn[], point: (item: ComparedReturn) => ChartPoint | null): ChartSeries[] {
  const machines = [...new Set(items.map(({ machine }) => machine.id))]
  return machines.flatMap((id, m) =>
    (['upload', 'rehearsal'] as const).flatMap((source) => {
      const own = items.filter((item) => item.machine.id === id && item.source === source)
      const points = own.map(point).filter((found) => found !== null)
      if (points.length === 0) return []
      const returned = m === 0 ? ('full' as const) : ('plus' as const)
      return [
        {
          name: `${own[0]!.machine.name}, ${source === 'upload' ? 'returned' : 'rehearsed'}`,
          points: points.sort((a, b) => a.x - b.x),
          marker: source === 'upload' ? returned : ('hollow' as const),
          tone: TONES[m % TONES.length]!,
        },
      ]
    }),
  )
}

export interface ComparisonChart {
  title: string
  x: ChartAxis
  y: ChartAxis
  series: ChartSeries[]
  /** What the picture cannot hold, and why. */
  leftOut: string | null
}

/** One measure of samples against their chain strength, or in the order in which they came. */
export function comparisonChart(
  items: readonly ComparedReturn[],
  measure: Compared,
  against: Against,
): ComparisonChart {
  const { label, axis, of } = MEASURES[measure]
  const inOrder = [...items].sort((a, b) => a.createdAt.localeCompare(b.createdAt))
  const place = (item: ComparedReturn): number | null =>
    against === 'order' ? inOrder.indexOf(item) : (item.strength?.mean ?? null)
  const point = (item: ComparedReturn): ChartPoint | null => {
    const [x, value] = [place(item), of(item)]
    return x === null || value === null ? null : { x, ...value }
  }
  const missing = items.filter((item) => point(item) === null).length
  return {
    title: `${label} ${against === 'order' ? 'in the order of the samples' : 'against chain strength'}`,
    x:
      against === 'order'
        ? { label: 'samples, oldest first', categories: inOrder.map(samplesNumber) }
        : { label: 'chain strength k, mean over chains', unit: 'in units of J' },
    y: axis,
    series: seriesOf(items, point),
    leftOut: missing === 0 ? null : `${formatCount(missing, 'set of samples', 'sets of samples')} without this value.`,
  }
}
