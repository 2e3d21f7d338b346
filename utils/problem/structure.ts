import type { HistogramBin } from '#shared/schemas/common'
import type { StructureView } from '#shared/schemas/problems'
import type { ChartAxis, ChartPoint } from '../ui/chart/types'

/** One bar chart of the structure section. */
export interface StructureChart {
  title: string
  unit: string
  x: ChartAxis
  y: ChartAxis
  points: ChartPoint[]
  binWidth?: number
  /** What the bars leave open, for the note beneath. */
  empty: string
}

/** Coefficients are kept as for a minimisation; a maximised problem shows the mirror image, as it was given. */
function inOwnSense(bins: readonly HistogramBin[], sense: 'min' | 'max'): HistogramBin[] {
  if (sense === 'min') return [...bins]
  return bins.map(({ from, to, count }) => ({ from: 0 - to, to: 0 - from, count })).reverse()
}

type Bars = Pick<StructureChart, 'x' | 'points' | 'binWidth'>

function barsOf(bins: readonly HistogramBin[], label: string): Bars {
  const [first] = bins
  const points = bins.map(({ from, to, count }) => ({ x: (from + to) / 2, y: count }))
  if (!first || first.to > first.from) return { x: { label }, points, binWidth: first && first.to - first.from }
  if (bins.length > 1) return { x: { label }, points }
  // A single value needs room at its sides to look like one bar among many.
  const room = Math.abs(first.from) / 4 || 1
  return { x: { label, min: first.from - room, max: first.from + room }, points, binWidth: room / 4 }
}

/** Degree, interaction size and field size, in the form and the sense in which the problem was given. */
export function structureCharts(structure: StructureView, form: 'qubo' | 'ising', sense: 'min' | 'max') {
  const [field, coupling] = form === 'qubo' ? ['a', 'b'] : ['h', 'J']
  const degrees = structure.degreeHistogram.map(({ value, count }) => ({ from: value, to: value, count }))
  const charts: StructureChart[] = [
    {
      title: 'Degree',
      unit: 'variables',
      y: { label: 'variables', min: 0, whole: true },
      ...barsOf(degrees, 'interactions of a variable'),
      empty: 'No variables.',
    },
    {
      title: 'Interaction size',
      unit: 'interactions',
      y: { label: 'interactions', min: 0, whole: true },
      ...barsOf(inOwnSense(structure.interactionHistogram, sense), `${coupling} of an interaction`),
      empty: 'No interactions.',
    },
    {
      title: 'Field size',
      unit: 'variables',
      y: { label: 'variables', min: 0, whole: true },
      ...barsOf(inOwnSense(structure.linearHistogram, sense), `${field} of a variable`),
      empty: 'No fields: every linear coefficient is zero.',
    },
  ]
  return charts
}
