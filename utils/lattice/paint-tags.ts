import type { Tokens } from './tokens'
import type { Box } from './types'

/** How a tag looks: boxed on its band, bare beside it, or a note beside its place. */
export interface TagLook {
  readonly text: string
  readonly kind: 'focus' | 'chain' | 'note'
  /** Frame of a `chain` tag, the hue of its chain; of a `note` the colour of its text. */
  readonly frame: string
}

export const TAG_FONT = {
  family: '"IBM Plex Mono", ui-monospace, monospace',
  size: { focus: 13, chain: 10.5, note: 11 },
  height: { focus: 21, chain: 15, note: 15 },
  padding: { focus: 6, chain: 4, note: 3 },
} as const

const fontOf = (kind: TagLook['kind']) => `${kind === 'chain' ? 500 : 600} ${TAG_FONT.size[kind]}px ${TAG_FONT.family}`

/** Widths of texts measured before: thousands of labels are asked for again with every hover. */
export type TextWidths = Map<string, number>

/** Size of a tag in pixels. */
export function measureTag(
  ctx: CanvasRenderingContext2D,
  { text, kind }: TagLook,
  widths: TextWidths,
): { width: number; height: number } {
  const key = `${kind} ${text}`
  let width = widths.get(key)
  if (width === undefined) {
    ctx.font = fontOf(kind)
    width = Math.ceil(ctx.measureText(text).width) + 2 * TAG_FONT.padding[kind]
    widths.set(key, width)
  }
  return { width, height: TAG_FONT.height[kind] }
}

export function paintTag(ctx: CanvasRenderingContext2D, look: TagLook, box: Box, tokens: Tokens) {
  const x = Math.round(box.x1)
  const y = Math.round(box.y1)
  const width = Math.round(box.x2 - box.x1)
  const height = Math.round(box.y2 - box.y1)
  ctx.fillStyle = tokens.paper
  ctx.fillRect(x, y, width, height)
  if (look.kind !== 'note') {
    const line = look.kind === 'focus' ? 1.5 : 1
    ctx.strokeStyle = look.kind === 'focus' ? tokens.ink : look.frame
    ctx.lineWidth = line
    ctx.strokeRect(x + line / 2, y + line / 2, width - line, height - line)
  }
  ctx.font = fontOf(look.kind)
  ctx.textBaseline = 'middle'
  ctx.textAlign = 'center'
  ctx.fillStyle = look.kind === 'note' ? look.frame : tokens.ink
  ctx.fillText(look.text, x + width / 2, y + height / 2 + 0.5)
}
