import type { ChartConfiguration, ChartDataset, ChartOptions, ChartType, TooltipItem } from 'chart.js'
import type { Palette } from '../../../assets/css/tokens'
import { axisOptions } from './axes'
import { placeText, valueText } from './points'
import { headroom, overlayPlugin, POINT_ROOM } from './overlays'
import { RATE_COLUMNS, ratesPlugin } from './rates'
import { DASHES, kindOf, toneOf } from './series'
import type { ChartAxis, ChartInput, ChartLook, ChartPoint, ChartSeries } from './types'

const SANS = '"IBM Plex Sans", sans-serif'
const MONO = '"IBM Plex Mono", monospace'
/** A few bars of single values stand on the axis as bars: as wide as there is room they would be slabs of ink. */
const WIDEST_BAR = 72
/** Bars stand apart by one pixel, as ruled columns do. */
const BAR_GAP = 1
/** Where the drawing library steps from one value to the next. */
const STEPS = { from: 'before', 'up to': 'after', around: 'middle' } as const
/** Width of one digit or letter of a label in a chart of rates. */
const LABEL_LETTER = 7.6

function smallestStep(points: readonly ChartPoint[]): number {
  const xs = points.map((point) => point.x).sort((a, b) => a - b)
  let least = Infinity
  for (let index = 1; index < xs.length; index += 1) {
    const step = (xs[index] ?? 0) - (xs[index - 1] ?? 0)
    if (step > 0 && step < least) least = step
  }
  return Number.isFinite(least) ? least : 1
}

export const binWidthOf = (input: ChartInput, series: ChartSeries) => input.binWidth ?? smallestStep(series.points)

function barDataset(input: ChartInput, index: number, palette: Palette): ChartDataset<'bar', ChartPoint[]> {
  const series = input.series[index] as ChartSeries
  const tone = toneOf(input, index)
  const width = binWidthOf(input, series)
  return {
    type: 'bar',
    label: series.name,
    data: series.points,
    backgroundColor: series.points.map((point) => palette[point.tone ?? tone]),
    hoverBackgroundColor: palette.ink,
    barThickness: ((context: {
      chart: { scales: Record<string, { getPixelForValue: (value: number) => number }> }
    }) => {
      const scale = context.chart.scales.x
      if (!scale) return 1
      const room = Math.abs(scale.getPixelForValue(width) - scale.getPixelForValue(0)) - BAR_GAP
      return Math.min(input.binned ? Infinity : WIDEST_BAR, Math.max(1, room))
    }) as unknown as number,
    grouped: false,
    order: 2,
  }
}

function lineDataset(input: ChartInput, index: number, palette: Palette): ChartDataset<'line', ChartPoint[]> {
  const series = input.series[index] as ChartSeries
  const kind = kindOf(input, series)
  const colour = palette[toneOf(input, index)]
  const marker = series.marker ?? (kind === 'step' ? 'none' : 'full')
  const isOpen = marker === 'hollow'
  return {
    type: 'line',
    label: series.name,
    data: series.points,
    showLine: kind !== 'points',
    stepped: kind === 'step' ? STEPS[series.holds ?? 'around'] : false,
    borderColor: colour,
    borderWidth: 1.8,
    borderDash: [...DASHES[series.stroke ?? 'solid']],
    borderJoinStyle: 'miter',
    // Points at the ends of the axes are drawn whole.
    clip: POINT_ROOM,
    pointStyle: marker === 'plus' ? 'cross' : isOpen ? 'rect' : 'circle',
    pointRadius: marker === 'none' ? 0 : isOpen ? 4 : marker === 'plus' ? 4 : 3,
    pointHitRadius: 10,
    pointHoverRadius: marker === 'none' ? 3 : 5,
    pointBackgroundColor: series.points.map((point) =>
      isOpen ? palette.paper : palette[point.tone ?? toneOf(input, index)],
    ),
    pointBorderColor: series.points.map((point) => palette[point.tone ?? toneOf(input, index)]),
    pointBorderWidth: isOpen || marker === 'plus' ? 1.6 : 0,
    tension: 0,
    order: 1,
  }
}

function tooltipOptions(input: ChartInput, palette: Palette) {
  return {
    backgroundColor: palette.paper,
    borderColor: palette.ink,
    borderWidth: 1,
    cornerRadius: 0,
    caretSize: 0,
    caretPadding: 8,
    padding: 8,
    displayColors: false,
    titleColor: palette.ink2,
    titleFont: { family: SANS, size: 12, weight: 'normal' as const },
    bodyColor: palette.ink,
    bodyFont: { family: MONO, size: 12.5 },
    callbacks: {
      title: (items: TooltipItem<ChartType>[]) => {
        const point = items[0]?.raw as ChartPoint | undefined
        return point ? placeText(input, point) : ''
      },
      label: (item: TooltipItem<ChartType>) => {
        return valueText(input, item.datasetIndex, item.raw as ChartPoint)
      },
    },
  }
}

function commonOptions(input: ChartInput, palette: Palette): ChartOptions {
  return {
    responsive: true,
    maintainAspectRatio: false,
    animation: false,
    layout: { padding: { top: 6 + headroom(input), right: 6 } },
    interaction: { mode: 'nearest', axis: input.kind === 'rates' ? 'y' : 'x', intersect: false },
    plugins: { legend: { display: false }, tooltip: tooltipOptions(input, palette) },
  } as ChartOptions
}

/** The x axis with room for the halves of bars, or of single points, at its ends. */
function withRoom(input: ChartInput, bars: ChartSeries | undefined, points: readonly ChartPoint[]): ChartAxis {
  const isApart = input.kind === 'points' && input.x.scale !== 'log'
  const held = bars?.points ?? (isApart ? points : [])
  if (held.length === 0) return input.x
  const room = (bars ? binWidthOf(input, bars) : smallestStep(points)) / 2
  const xs = held.map(({ x }) => x)
  return { ...input.x, min: input.x.min ?? Math.min(...xs) - room, max: input.x.max ?? Math.max(...xs) + room }
}

function plotConfig(input: ChartInput, palette: Palette, live: () => ChartLook): ChartConfiguration {
  const bars = input.series.find((series) => kindOf(input, series) === 'bar')
  const points = input.series.flatMap((series) => series.points)
  const ends = points.flatMap((point) => [point.low ?? point.y, point.high ?? point.y])
  const x = withRoom(input, bars, points)
  const yMin = input.y.min ?? (bars ? 0 : undefined)
  const datasets = input.series.map((series, index) =>
    kindOf(input, series) === 'bar' ? barDataset(input, index, palette) : lineDataset(input, index, palette),
  )
  return {
    type: 'line',
    data: { datasets: datasets as unknown as ChartDataset[] },
    options: {
      ...commonOptions(input, palette),
      scales: {
        x: axisOptions(
          x,
          palette,
          'across',
          points.map((point) => point.x),
        ),
        y: axisOptions({ ...input.y, min: yMin }, palette, 'up', ends),
      },
    } as ChartOptions,
    plugins: [overlayPlugin(live)],
  }
}

function ratesConfig(input: ChartInput, palette: Palette, live: () => ChartLook): ChartConfiguration {
  const points = input.series[0]?.points ?? []
  const most = Math.max(1e-9, ...points.map((point) => point.high ?? point.y))
  const labels = points.map((point) => point.label ?? String(point.x))
  const beside = RATE_COLUMNS + LABEL_LETTER * Math.max(0, ...labels.map(({ length }) => length)) + 12
  const x = { ...input.x, min: input.x.min ?? 0, max: input.x.max ?? most * 1.05 }
  const across = axisOptions(x, palette, 'across', [], beside)
  const data = points.map((point, index) => ({ ...point, value: point.y, row: index }))
  return {
    type: 'bar',
    data: {
      labels,
      datasets: [
        {
          label: input.series[0]?.name,
          data,
          parsing: { xAxisKey: 'value', yAxisKey: 'row' },
          backgroundColor: 'transparent',
        } as unknown as ChartDataset,
      ],
    },
    options: {
      ...commonOptions(input, palette),
      indexAxis: 'y',
      layout: { padding: { top: 2, right: RATE_COLUMNS } },
      scales: {
        x: {
          ...across,
          border: { display: false },
          grid: { color: palette.hair, drawTicks: false },
          ticks: { ...across?.ticks, padding: 6, maxTicksLimit: 6 },
        },
        y: {
          type: 'category',
          border: { display: true, color: palette.ink },
          grid: { display: false },
          ticks: {
            color: palette.ink,
            font: { family: MONO, size: 12.5 },
            autoSkip: false,
            padding: 6,
            crossAlign: 'far',
          },
        },
      },
    } as unknown as ChartOptions,
    plugins: [ratesPlugin(live)],
  }
}

/**
 * The whole chart.js configuration of a chart.
 * @param live asked at each drawing for what is drawn over the plot, so that a chart can be changed in place
 */
export function chartConfig(live: () => ChartLook): ChartConfiguration {
  const { input, palette } = live()
  return input.kind === 'rates' ? ratesConfig(input, palette, live) : plotConfig(input, palette, live)
}
