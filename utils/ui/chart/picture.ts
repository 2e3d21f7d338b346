import type { Chart } from 'chart.js'
import type { Palette } from '../../../assets/css/tokens'

const MARGIN = 16
const HEAD = 28

/** A chart as a PNG with its title and unit, on the paper of the theme: a bare canvas would be transparent and nameless. */
export async function chartPicture(
  chart: Chart,
  title: string,
  unit: string | undefined,
  palette: Palette,
): Promise<Blob | null> {
  const ratio = chart.currentDevicePixelRatio
  const width = chart.width + 2 * MARGIN
  const height = chart.height + 2 * MARGIN + HEAD
  const canvas = document.createElement('canvas')
  canvas.width = width * ratio
  canvas.height = height * ratio
  const context = canvas.getContext('2d')
  if (!context) return null
  context.scale(ratio, ratio)
  context.fillStyle = palette.paper
  context.fillRect(0, 0, width, height)
  context.textBaseline = 'top'
  context.fillStyle = palette.ink
  context.font = '600 14px "IBM Plex Sans", sans-serif'
  context.fillText(title, MARGIN, MARGIN)
  if (unit) {
    context.fillStyle = palette.ink2
    context.font = '13px "IBM Plex Sans", sans-serif'
    context.textAlign = 'right'
    context.fillText(unit, width - MARGIN, MARGIN)
  }
  context.drawImage(chart.canvas, MARGIN, MARGIN + HEAD, chart.width, chart.height)
  return new Promise((resolve) => canvas.toBlob(resolve, 'image/png'))
}
