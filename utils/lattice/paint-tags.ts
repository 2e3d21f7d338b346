import { rulerTicks } from './ruler'
import type { Tokens } from './tokens'
import type { Box, View } from './types'

/** How a tag looks: boxed on its band, bare beside it, or the rate of a break. */
export interface TagLook {
  readonly text: string
  readonly kind: 'focus' | 'chain' | 'quiet' | 'rate'
  /** Frame of a `chain` tag: the hue of its chain. */
  readonly frame: string
}

export const TAG_FONT = {
  family: '"IBM Plex Mono", ui-monospace, monospace',
  size: { focus: 13, chain: 10.5, quiet: 10.5, rate: 11 },
  height: { focus: 21, chain: 15, quiet: 13, rate: 15 },
  padding: { focus: 6, chain: 4, quiet: 3, rate: 3 },
} as const

const fontOf = (kind: TagLook['kind']) =>
  `${kind === 'focus' || kind === 'rate' ? 600 : kind === 'chain' ? 500 : 400} ${TAG_FONT.size[kind]}px ${TAG_FONT.family}`

/** Size of a tag in pixels. */
export function measureTag(ctx: CanvasRenderingContext2D, { text, kind }: TagLook): { width: number; height: number } {
  ctx.font = fontOf(kind)
  return { width: Math.ceil(ctx.measureText(text).width) + 2 * TAG_FONT.padding[kind], height: TAG_FONT.height[kind] }
}

export function paintTag(ctx: CanvasRenderingContext2D, look: TagLook, box: Box, tokens: Tokens) {
  const x = Math.round(box.x1)
  const y = Math.round(box.y1)
  const width = Math.round(box.x2 - box.x1)
  const height = Math.round(box.y2 - box.y1)
  ctx.globalAlpha = look.kind === 'quiet' ? 0.86 : 1
  ctx.fillStyle = tokens.paper
  ctx.fillRect(x, y, width, height)
  ctx.globalAlpha = 1
  if (look.kind === 'focus' || look.kind === 'chain') {
    const line = look.kind === 'focus' ? 1.5 : 1
    ctx.strokeStyle = look.kind === 'focus' ? tokens.ink : look.frame
    ctx.lineWidth = line
    ctx.strokeRect(x + line / 2, y + line / 2, width - line, height - line)
  }
  ctx.font = fontOf(look.kind)
  ctx.textBaseline = 'middle'
  ctx.textAlign = 'center'
  ctx.fillStyle = look.kind === 'quiet' ? tokens.ink2 : look.kind === 'rate' ? tokens.claytext : tokens.ink
  ctx.fillText(look.text, x + width / 2, y + height / 2 + 0.5)
}

/** Numbers and ticks along the top and left of the frame; the frame starts at (inset, inset). */
export function paintRuler(
  ctx: CanvasRenderingContext2D,
  view: View,
  size: { width: number; height: number; inset: number },
  limits: Box,
  tokens: Tokens,
) {
  const { width, height, inset } = size
  ctx.font = `400 11.5px ${TAG_FONT.family}`
  ctx.fillStyle = tokens.ink2
  ctx.strokeStyle = tokens.ink
  ctx.lineWidth = 1
  ctx.textAlign = 'center'
  ctx.textBaseline = 'alphabetic'
  ctx.beginPath()
  for (const { at, text } of rulerTicks(view.x, view.scale, width, [limits.x1, limits.x2])) {
    const x = Math.round(inset + at) + 0.5
    ctx.moveTo(x, inset - (text ? 6 : 3))
    ctx.lineTo(x, inset)
    if (text) ctx.fillText(text, Math.min(inset + width - 10, Math.max(inset + 8, x + 9)), inset - 8)
  }
  for (const { at, text } of rulerTicks(view.y, view.scale, height, [limits.y1, limits.y2])) {
    const y = Math.round(inset + at) + 0.5
    ctx.moveTo(inset - (text ? 6 : 3), y)
    ctx.lineTo(inset, y)
    if (!text) continue
    ctx.save()
    ctx.translate(inset - 8, Math.min(inset + height - 10, Math.max(inset + 8, y - 9)))
    ctx.rotate(-Math.PI / 2)
    ctx.fillText(text, 0, 0)
    ctx.restore()
  }
  ctx.stroke()
}
