import { TAG_FONT } from './paint-tags'
import { rulerTicks } from './ruler'
import type { Tokens } from './tokens'
import type { Box, View } from './types'

interface Strip {
  /** Length of the side of the frame, and depth of the strip beside it; the frame starts at `inset`. */
  readonly extent: number
  readonly inset: number
}

/** Length of ticks with and without a number. */
const TICKS = { long: 6, short: 3 }

function prepare(ctx: CanvasRenderingContext2D, tokens: Tokens): void {
  ctx.font = `400 11.5px ${TAG_FONT.family}`
  ctx.fillStyle = tokens.ink2
  ctx.strokeStyle = tokens.ink
  ctx.lineWidth = 1
  ctx.textAlign = 'center'
  ctx.textBaseline = 'alphabetic'
  ctx.beginPath()
}

const within = (value: number, { extent, inset }: Strip) => Math.min(inset + extent - 10, Math.max(inset + 8, value))

export function paintRulerTop(
  ctx: CanvasRenderingContext2D,
  view: View,
  strip: Strip,
  limits: Box,
  tokens: Tokens,
): void {
  prepare(ctx, tokens)
  for (const { at, text } of rulerTicks(view.x, view.scale, strip.extent, [limits.x1, limits.x2])) {
    const x = Math.round(strip.inset + at) + 0.5
    ctx.moveTo(x, strip.inset - (text ? TICKS.long : TICKS.short))
    ctx.lineTo(x, strip.inset)
    if (text) ctx.fillText(text, within(x + 9, strip), strip.inset - 8)
  }
  ctx.stroke()
}

export function paintRulerLeft(
  ctx: CanvasRenderingContext2D,
  view: View,
  strip: Strip,
  limits: Box,
  tokens: Tokens,
): void {
  prepare(ctx, tokens)
  for (const { at, text } of rulerTicks(view.y, view.scale, strip.extent, [limits.y1, limits.y2])) {
    const y = Math.round(strip.inset + at) + 0.5
    ctx.moveTo(strip.inset - (text ? TICKS.long : TICKS.short), y)
    ctx.lineTo(strip.inset, y)
    if (!text) continue
    ctx.save()
    ctx.translate(strip.inset - 8, within(y - 9, strip))
    ctx.rotate(-Math.PI / 2)
    ctx.fillText(text, 0, 0)
    ctx.restore()
  }
  ctx.stroke()
}
