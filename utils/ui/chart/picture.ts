import type { Palette } from '../../../assets/css/tokens'
import type { LegendEntry } from './legend'

/** A chart on a sheet of its own: title, unit and legend above the plot, on paper. */

const MARGIN = 16
const LINE = 20
const SWATCH = 18
const SANS = '"IBM Plex Sans", sans-serif'
const TITLE = `600 14px ${SANS}`
const SMALL = `12px ${SANS}`

export interface ChartSheet {
  readonly title: string
  readonly unit?: string
  readonly legend: readonly LegendEntry[]
}

function intoLines(context: CanvasRenderingContext2D, text: string, width: number): string[] {
  const lines: string[] = []
  for (const word of text.split(' ')) {
    const longer = lines.length ? `${lines.at(-1)} ${word}` : word
    if (lines.length === 0 || context.measureText(longer).width > width) lines.push(word)
    else lines[lines.length - 1] = longer
  }
  return lines
}

function drawSwatch(context: CanvasRenderingContext2D, entry: LegendEntry, x: number, y: number, palette: Palette) {
  const colour = palette[entry.tone]
  context.fillStyle = colour
  context.strokeStyle = colour
  if (entry.isBar) context.fillRect(x, y - 5, SWATCH, 10)
  context.lineWidth = 2
  context.setLineDash([...entry.dash])
  context.beginPath()
  if (entry.isLine) {
    context.moveTo(x, y)
    context.lineTo(x + SWATCH, y)
  }
  context.stroke()
  context.setLineDash([])
  context.lineWidth = 1.6
  context.beginPath()
  const middle = x + SWATCH / 2
  if (entry.isBar || entry.marker === 'none') return
  if (entry.marker === 'full') {
    context.arc(middle, y, 3, 0, 2 * Math.PI)
    context.fill()
  } else if (entry.marker === 'hollow') {
    context.fillStyle = palette.paper
    context.fillRect(middle - 3, y - 3, 6, 6)
    context.strokeRect(middle - 3, y - 3, 6, 6)
  } else {
    context.moveTo(middle, y - 4)
    context.lineTo(middle, y + 4)
    context.moveTo(middle - 4, y)
    context.lineTo(middle + 4, y)
    context.stroke()
  }
}

/** Entries one after another, on as many lines as they need. Returns the height taken up. */
function drawLegend(
  context: CanvasRenderingContext2D,
  legend: readonly LegendEntry[],
  top: number,
  width: number,
  palette: Palette,
): number {
  if (legend.length === 0) return 0
  let [x, y] = [MARGIN, top + LINE / 2]
  context.font = SMALL
  context.textAlign = 'left'
  context.textBaseline = 'middle'
  for (const entry of legend) {
    const needed = SWATCH + 6 + context.measureText(entry.name).width + 16
    if (x > MARGIN && x + needed > width) [x, y] = [MARGIN, y + LINE]
    drawSwatch(context, entry, x, y, palette)
    context.fillStyle = palette.ink2
    context.fillText(entry.name, x + SWATCH + 6, y)
    x += needed
  }
  return y + LINE / 2 - top
}

/** Title at the left, unit at its right or on a line of its own. Returns the height taken up. */
function drawHead(
  context: CanvasRenderingContext2D,
  { title, unit = '' }: ChartSheet,
  width: number,
  palette: Palette,
) {
  context.textBaseline = 'top'
  context.font = SMALL
  const unitWidth = context.measureText(unit).width
  context.font = TITLE
  const lines = intoLines(context, title, width)
  const isBeside = lines.length === 1 && context.measureText(title).width + unitWidth + MARGIN <= width
  context.fillStyle = palette.ink
  for (const [k, line] of lines.entries()) context.fillText(line, MARGIN, MARGIN + k * LINE)
  context.font = SMALL
  context.fillStyle = palette.ink2
  context.textAlign = isBeside ? 'right' : 'left'
  const row = isBeside ? 0 : lines.length
  if (unit) context.fillText(unit, isBeside ? MARGIN + width : MARGIN, MARGIN + row * LINE + 2)
  return LINE * (lines.length + (unit && !isBeside ? 1 : 0))
}

/** @param plot a canvas with the plot alone, drawn at `ratio` pixels to one of `size` */
export async function chartPicture(
  plot: HTMLCanvasElement,
  size: { width: number; height: number; ratio: number },
  sheet: ChartSheet,
  palette: Palette,
): Promise<Blob | null> {
  const canvas = document.createElement('canvas')
  const context = canvas.getContext('2d')
  if (!context) return null
  const draw = () => {
    const head = MARGIN + drawHead(context, sheet, size.width, palette)
    return head + drawLegend(context, sheet.legend, head, size.width, palette) + 6
  }
  // Drawn once to learn how high the head is; setting the size of a canvas clears it.
  const top = draw()
  const [width, height] = [size.width + 2 * MARGIN, top + size.height + MARGIN]
  canvas.width = width * size.ratio
  canvas.height = height * size.ratio
  context.scale(size.ratio, size.ratio)
  context.fillStyle = palette.paper
  context.fillRect(0, 0, width, height)
  draw()
  context.drawImage(plot, MARGIN, top, size.width, size.height)
  return new Promise((resolve) => canvas.toBlob(resolve, 'image/png'))
}
