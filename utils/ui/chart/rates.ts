import type { Chart, ChartType, Plugin } from 'chart.js'
import type { Palette } from '../../../assets/css/tokens'
import { formatInterval, formatNumber } from '../../format'
import type { ChartLook, ChartPoint } from './types'

/** Rates with intervals, one row each: a dashed line from nought, the interval as a bar, the estimate as a tick. */

/** Room right of the plot for the value and its interval. */
export const RATE_COLUMNS = 108
const MONO = '"IBM Plex Mono", monospace'
const TICK = 5

function drawRow(
  ctx: CanvasRenderingContext2D,
  point: ChartPoint,
  y: number,
  x: (value: number) => number,
  palette: Palette,
) {
  const colour = palette[point.tone ?? 'clay']
  const value = x(point.y)
  ctx.strokeStyle = colour
  ctx.lineWidth = 1.3
  ctx.setLineDash([3, 2.5])
  ctx.beginPath()
  ctx.moveTo(x(0), y)
  ctx.lineTo(value, y)
  ctx.stroke()
  ctx.setLineDash([])
  if (point.low !== undefined && point.high !== undefined) {
    ctx.lineWidth = 4
    ctx.beginPath()
    ctx.moveTo(x(point.low), y)
    ctx.lineTo(Math.max(x(point.high), x(point.low) + 2), y)
    ctx.stroke()
  }
  ctx.lineWidth = 1.8
  ctx.beginPath()
  ctx.moveTo(value, y - TICK)
  ctx.lineTo(value, y + TICK)
  ctx.stroke()
}

/** At least two digits after the point for small rates, none for large ones: `0.8`, `14`, `63`. */
const short = (value: number) =>
  formatNumber(value, value !== 0 && Math.abs(value) < 10 ? { decimals: 1 } : { decimals: 0 })

function intervalText(point: ChartPoint): string {
  if (point.low === undefined || point.high === undefined) return ''
  return formatInterval(point.low, point.high, { decimals: point.high < 10 ? 1 : 0 })
}

function drawColumns(ctx: CanvasRenderingContext2D, point: ChartPoint, y: number, right: number, palette: Palette) {
  ctx.textBaseline = 'middle'
  ctx.textAlign = 'right'
  ctx.font = `12.5px ${MONO}`
  ctx.fillStyle = palette.ink
  ctx.fillText(short(point.y), right + 40, y + 0.5)
  ctx.font = `12px ${MONO}`
  ctx.fillStyle = palette.ink2
  ctx.fillText(intervalText(point), right + RATE_COLUMNS - 2, y + 0.5)
}

export function ratesPlugin(live: () => ChartLook): Plugin<ChartType> {
  return {
    id: 'workbook-rates',
    afterDatasetsDraw(chart: Chart) {
      const { ctx, chartArea, scales } = chart
      const { input, palette } = live()
      const points = input.series[0]?.points ?? []
      ctx.save()
      for (const [index, point] of points.entries()) {
        const y = scales.y?.getPixelForValue(index) ?? 0
        drawRow(ctx, point, y, (value) => scales.x?.getPixelForValue(value) ?? 0, palette)
        drawColumns(ctx, point, y, chartArea.right, palette)
      }
      ctx.restore()
    },
  }
}
