import type { ChartConfiguration, ChartDataset, ChartOptions, ChartType, TooltipItem } from 'chart.js'
import type { Palette } from '../../../assets/css/tokens'
import { formatInterval, formatNumber } from '../../format'
import { axisOptions } from './axes'
import { DASHES, overlayPlugin, ruleHeadroom } from './overlays'
import { RATE_COLUMNS, ratesPlugin } from './rates'
import { kindOf, toneOf } from './series'
import type { ChartAxis, ChartInput, ChartPoint, ChartSeries } from './types'

const SANS = '"IBM Plex Sans", sans-serif'
const MONO = '"IBM Plex Mono", monospace'
/** Bars stand apart by one pixel, as ruled columns do. */
const BAR_GAP = 1

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
    barThickness: ((context: {
      chart: { scales: Record<string, { getPixelForValue: (value: number) => number }> }
    }) => {
      const scale = context.chart.scales.x
      if (!scale) return 1
      return Math.max(1, Math.abs(scale.getPixelForValue(width) - scale.getPixelForValue(0)) - BAR_GAP)
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
    stepped: kind === 'step' ? 'middle' : false,
    borderColor: colour,
    borderWidth: 1.8,
    borderDash: [...DASHES[series.stroke ?? 'solid']],
    borderJoinStyle: 'miter',
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
  const across = input.x.label
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
        if (!point) return ''
        if (input.kind === 'rates') return point.label ?? ''
        return input.x.categories?.[point.x] ?? `${formatNumber(point.x)}, ${across}`
      },
      label: (item: TooltipItem<ChartType>) => {
        const point = item.raw as ChartPoint
        const interval = point.low === undefined ? '' : `  ${formatInterval(point.low, point.high)}`
        const name = input.series.length > 1 ? `${item.dataset.label}  ` : ''
        return `${name}${formatNumber(point.y)}${interval}`
      },
    },
  }
}

function commonOptions(input: ChartInput, palette: Palette): ChartOptions {
  return {
    responsive: true,
    maintainAspectRatio: false,
    animation: false,
    layout: { padding: { top: 6 + ruleHeadroom(input.rules), right: 6 } },
    interaction: { mode: 'nearest', axis: input.kind === 'rates' ? 'y' : 'x', intersect: false },
    plugins: { legend: { display: false }, tooltip: tooltipOptions(input, palette) },
  } as ChartOptions
}

function plotConfig(input: ChartInput, palette: Palette): ChartConfiguration {
  const bars = input.series.find((series) => kindOf(input, series) === 'bar')
  const offset = bars ? binWidthOf(input, bars) / 2 : 0
  const points = input.series.flatMap((series) => series.points)
  const ends = points.flatMap((point) => [point.low ?? point.y, point.high ?? point.y])
  const xs = bars?.points.map((point) => point.x) ?? []
  const x: ChartAxis =
    xs.length > 0
      ? { ...input.x, min: input.x.min ?? Math.min(...xs) - offset, max: input.x.max ?? Math.max(...xs) + offset }
      : input.x
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
    plugins: [
      overlayPlugin(
        () => input,
        () => palette,
      ),
    ],
  }
}

function ratesConfig(input: ChartInput, palette: Palette): ChartConfiguration {
  const points = input.series[0]?.points ?? []
  const most = Math.max(1e-9, ...points.map((point) => point.high ?? point.y))
  const across = axisOptions({ ...input.x, min: input.x.min ?? 0, max: input.x.max ?? most * 1.05 }, palette, 'across')
  const data = points.map((point, index) => ({ ...point, value: point.y, row: index }))
  return {
    type: 'bar',
    data: {
      labels: points.map((point) => point.label ?? String(point.x)),
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
    plugins: [
      ratesPlugin(
        () => input,
        () => palette,
      ),
    ],
  }
}

/** The whole chart.js configuration of a chart in the given colours. */
export function chartConfig(input: ChartInput, palette: Palette): ChartConfiguration {
  return input.kind === 'rates' ? ratesConfig(input, palette) : plotConfig(input, palette)
}
