import type { Chart, ChartType, Plugin } from 'chart.js'
import type { ColourName, Palette } from '../../../assets/css/tokens'
import { axisName } from './axisName'
import { DASHES } from './series'
import type { ChartInput, ChartLook, ChartPoint, ChartRule, ChartSeries } from './types'

/** What the plots need beyond chart.js: intervals, rules, spans and direct labels, drawn in the colours of the theme. */

const SANS = '"IBM Plex Sans", sans-serif'
const INTERVAL_WIDTH = 1.4
/** Px beyond the plot that marks at its ends may take. */
export const POINT_ROOM = 6
/** Below this width names stand in the legend only. */
const LEAST_LABELLED = 420
/** Height of a line of labels above the plot. */
const LABEL_LINE = 17

interface Axes {
  x: (value: number) => number
  y: (value: number) => number
}

function axesOf(chart: Chart): Axes {
  return {
    x: (value) => chart.scales.x?.getPixelForValue(value) ?? 0,
    y: (value) => chart.scales.y?.getPixelForValue(value) ?? 0,
  }
}

function clipToPlot(chart: Chart, draw: (context: CanvasRenderingContext2D) => void) {
  const { ctx, chartArea } = chart
  ctx.save()
  ctx.beginPath()
  ctx.rect(chartArea.left - POINT_ROOM, chartArea.top - 1, chartArea.width + 2 * POINT_ROOM, chartArea.height + 2)
  ctx.clip()
  draw(ctx)
  ctx.restore()
}

function drawBand(ctx: CanvasRenderingContext2D, series: ChartSeries, axes: Axes, colour: string) {
  const points = series.points.filter((point) => point.low !== undefined && point.high !== undefined)
  if (points.length < 2) return
  ctx.beginPath()
  for (const point of points) ctx.lineTo(axes.x(point.x), axes.y(point.high ?? point.y))
  for (const point of [...points].reverse()) ctx.lineTo(axes.x(point.x), axes.y(point.low ?? point.y))
  ctx.closePath()
  ctx.fillStyle = colour
  ctx.fill()
}

function drawBars(
  ctx: CanvasRenderingContext2D,
  series: ChartSeries,
  axes: Axes,
  colourOf: (tone?: ColourName) => string,
) {
  ctx.lineWidth = INTERVAL_WIDTH
  for (const point of series.points) {
    if (point.low === undefined || point.high === undefined) continue
    const x = axes.x(point.x)
    ctx.strokeStyle = colourOf(point.tone)
    ctx.beginPath()
    ctx.moveTo(x, axes.y(point.low))
    ctx.lineTo(x, axes.y(point.high))
    ctx.stroke()
  }
}

function strokeRule(chart: Chart, rule: ChartRule, axes: Axes, palette: Palette, top: number) {
  const { ctx, chartArea } = chart
  ctx.save()
  ctx.strokeStyle = palette[rule.tone ?? 'ink']
  ctx.lineWidth = 1.5
  ctx.setLineDash([...DASHES[rule.stroke ?? 'dotted']])
  ctx.beginPath()
  if (rule.axis === 'x') {
    const x = axes.x(rule.at)
    ctx.moveTo(x, top)
    ctx.lineTo(x, chartArea.bottom)
  } else {
    const y = axes.y(rule.at)
    ctx.moveTo(chartArea.left, y)
    ctx.lineTo(chartArea.right, y)
  }
  ctx.stroke()
  ctx.restore()
}

/** Text on a casing of paper, so that lines do not run through it. */
function writeOnPaper(
  ctx: CanvasRenderingContext2D,
  text: string,
  x: number,
  y: number,
  colour: string,
  palette: Palette,
) {
  ctx.lineJoin = 'round'
  ctx.lineWidth = 4
  ctx.strokeStyle = palette.paper
  ctx.strokeText(text, x, y)
  ctx.fillStyle = colour
  ctx.fillText(text, x, y)
}

const textTone = (tone: ColourName = 'ink'): ColourName =>
  tone === 'ochre' ? 'ochretext' : tone === 'clay' ? 'claytext' : tone

/** Room above the plot for the labels of rules across x: one line of text, two when there are more to place. */
function ruleHeadroom(rules: readonly ChartRule[] = []): number {
  const labelled = rules.filter((rule) => rule.axis === 'x' && rule.label).length
  if (labelled === 0) return 0
  return labelled < 3 ? LABEL_LINE : 2 * LABEL_LINE
}

/** The y axis is named at the right of the title, or above the plot where something else stands there. */
const hasUpName = ({ unit, y }: ChartInput): boolean => unit !== undefined && !unit.includes(y.label)

/** Room above the plot, in px. */
export const headroom = (input: ChartInput): number => ruleHeadroom(input.rules) + (hasUpName(input) ? LABEL_LINE : 0)

function drawUpName(chart: Chart, input: ChartInput, palette: Palette) {
  if (!hasUpName(input)) return
  const { ctx } = chart
  ctx.save()
  ctx.font = `12px ${SANS}`
  ctx.textBaseline = 'top'
  ctx.fillStyle = palette.ink2
  ctx.fillText(axisName(input.y), 0, 0)
  ctx.restore()
}

/** A thin line at the place that is pointed at or stepped to, beneath what is written there. */
function drawPlumb(chart: Chart, axes: Axes, palette: Palette) {
  const [active] = chart.getActiveElements()
  const point = active && (chart.data.datasets[active.datasetIndex]?.data[active.index] as ChartPoint | undefined)
  if (!point) return
  const { ctx, chartArea } = chart
  ctx.save()
  ctx.strokeStyle = palette.edge
  ctx.lineWidth = 1
  ctx.beginPath()
  ctx.moveTo(axes.x(point.x), chartArea.top)
  ctx.lineTo(axes.x(point.x), chartArea.bottom)
  ctx.stroke()
  ctx.restore()
}

/** Rules across x carry their labels above the plot, from left to right, on a second line where the first is taken. */
function drawRulesAcross(chart: Chart, rules: readonly ChartRule[], axes: Axes, palette: Palette) {
  const { ctx, chartArea } = chart
  const ends: number[] = [-Infinity, -Infinity]
  const lines = Math.round(ruleHeadroom(rules) / LABEL_LINE)
  ctx.save()
  ctx.font = `12px ${SANS}`
  ctx.textBaseline = 'alphabetic'
  for (const rule of [...rules].sort((a, b) => a.at - b.at)) {
    const x = axes.x(rule.at)
    const width = ctx.measureText(rule.label ?? '').width
    const start = Math.max(chartArea.left, Math.min(x + 5, chart.width - width))
    const line = ends.findIndex((end, index) => index < lines && end + 6 < start)
    const level = Math.max(0, line)
    const baseline = chartArea.top - 5 - level * LABEL_LINE
    strokeRule(chart, rule, axes, palette, rule.label ? baseline - 8 : chartArea.top)
    if (!rule.label) continue
    writeOnPaper(ctx, rule.label, start, baseline, palette[textTone(rule.tone)], palette)
    ends[level] = start + width
  }
  ctx.restore()
}

function drawRuleAlong(chart: Chart, rule: ChartRule, axes: Axes, palette: Palette) {
  strokeRule(chart, rule, axes, palette, chart.chartArea.top)
  if (!rule.label) return
  const { ctx, chartArea } = chart
  const atRight = rule.labelEnd === 'right'
  ctx.save()
  ctx.font = `12px ${SANS}`
  ctx.textBaseline = 'alphabetic'
  ctx.textAlign = atRight ? 'right' : 'left'
  const x = atRight ? chartArea.right - 2 : chartArea.left + 4
  writeOnPaper(ctx, rule.label, x, axes.y(rule.at) - 5, palette[textTone(rule.tone)], palette)
  ctx.restore()
}

/** The name of a series beside its line, on a casing of paper so that gridlines do not run through it. */
function drawDirectLabel(chart: Chart, series: ChartSeries, axes: Axes, palette: Palette) {
  const at = series.labelAt
  if (at === undefined || series.points.length === 0 || chart.width < LEAST_LABELLED) return
  const nearest = series.points.reduce((best, point) => (Math.abs(point.x - at) < Math.abs(best.x - at) ? point : best))
  const { ctx, chartArea } = chart
  ctx.save()
  ctx.font = `13px ${SANS}`
  ctx.textBaseline = 'bottom'
  const width = ctx.measureText(series.name).width
  const x = Math.min(axes.x(nearest.x) + 8, chartArea.right - width)
  const y = Math.max(axes.y(nearest.high ?? nearest.y) - 5, chartArea.top + 14)
  writeOnPaper(ctx, series.name, x, y, palette.ink, palette)
  ctx.restore()
}

function drawBeneath(chart: Chart, { input, palette }: ChartLook) {
  const axes = axesOf(chart)
  clipToPlot(chart, (ctx) => {
    for (const span of input.spans ?? []) {
      ctx.fillStyle = palette[span.tone ?? 'leafwash']
      const left = axes.x(span.from)
      ctx.fillRect(left, chart.chartArea.top, axes.x(span.to) - left, chart.chartArea.height)
    }
    for (const series of input.series) if (series.band) drawBand(ctx, series, axes, palette.tint)
  })
}

function drawAbove(chart: Chart, { input, palette }: ChartLook) {
  const axes = axesOf(chart)
  drawUpName(chart, input, palette)
  drawPlumb(chart, axes, palette)
  clipToPlot(chart, (ctx) => {
    for (const series of input.series) {
      if (!series.band) drawBars(ctx, series, axes, (tone) => palette[tone ?? series.tone ?? 'ink'])
    }
  })
  const rules = input.rules ?? []
  drawRulesAcross(
    chart,
    rules.filter((rule) => rule.axis === 'x'),
    axes,
    palette,
  )
  for (const rule of rules) if (rule.axis === 'y') drawRuleAlong(chart, rule, axes, palette)
  for (const series of input.series) drawDirectLabel(chart, series, axes, palette)
}

export function overlayPlugin(live: () => ChartLook): Plugin<ChartType> {
  return {
    id: 'workbook-overlays',
    beforeDatasetsDraw: (chart) => drawBeneath(chart, live()),
    afterDatasetsDraw: (chart) => drawAbove(chart, live()),
  }
}
