import type { Coverage } from './coverage'
import { placeTags } from './labels'
import type { PlacedTag } from './labels'
import { paintOverlay } from './paint-overlay'
import type { Overlay } from './paint-overlay'
import { paintRuler, paintTag } from './paint-tags'
import type { TagLook } from './paint-tags'
import { requestTags } from './tag-requests'
import type { TagInput } from './tag-requests'
import type { Tokens } from './tokens'
import type { Box, View } from './types'

/** Outlines and tags over the chains, and the ruler around them, on two canvases. */
export interface TagLayer {
  theme(tokens: Tokens, limits: Box, coverage: Coverage | null): void
  give(input: TagInput): void
  point(overlay: Overlay | null): void
  resize(width: number, height: number): void
  paint(view: View): void
  repaint(): void
}

/** Sizes and clears a canvas; afterwards one unit of its context is one CSS pixel. */
function prepareCanvas(context: CanvasRenderingContext2D, width: number, height: number) {
  const { canvas } = context
  const ratio = window.devicePixelRatio || 1
  const [pixelWidth, pixelHeight] = [Math.round(width * ratio), Math.round(height * ratio)]
  if (canvas.width !== pixelWidth) canvas.width = pixelWidth
  if (canvas.height !== pixelHeight) canvas.height = pixelHeight
  canvas.style.width = `${width}px`
  canvas.style.height = `${height}px`
  context.setTransform(ratio, 0, 0, ratio, 0, 0)
  context.clearRect(0, 0, width, height)
}

/** @param inset width of the ruler's margin, left and top */
export function createTagLayer(canvas: HTMLCanvasElement, ruler: HTMLCanvasElement, inset: number): TagLayer {
  // By the processor, as the ground: see ground-layer.
  const ctx = canvas.getContext('2d', { willReadFrequently: true })!
  const rulerCtx = ruler.getContext('2d', { willReadFrequently: true })!
  let size = { width: 0, height: 0 }
  let theme: { tokens: Tokens; limits: Box; coverage: Coverage | null } | null = null
  let input: TagInput | null = null
  let placed: { scale: number; x: number; y: number; tags: PlacedTag[]; looks: TagLook[] } | null = null
  let latest: View | null = null
  let overlay: Overlay | null = null

  /** Places are kept while the camera only shifts a little, so that tags travel with their bands and do not jump. */
  const placeFor = (view: View) => {
    if (!input || !theme) return null
    const keeps = placed && placed.scale === view.scale && Math.hypot(placed.x - view.x, placed.y - view.y) < 40
    if (keeps) return placed
    const { requests, looks } = requestTags(ctx, input)
    const viewport = { x1: 2, y1: 2, x2: size.width - 2, y2: size.height - 2 }
    placed = { ...view, tags: placeTags(requests, view, viewport, theme.coverage), looks }
    return placed
  }

  const paint = (view: View) => {
    latest = view
    if (!theme || size.width === 0) return
    prepareCanvas(rulerCtx, size.width + inset + 2, size.height + inset + 2)
    paintRuler(rulerCtx, view, { ...size, inset }, theme.limits, theme.tokens)
    prepareCanvas(ctx, size.width, size.height)
    if (overlay) paintOverlay(ctx, overlay, view, theme.tokens)
    const places = placeFor(view)
    if (!places) return
    const dx = view.x - places.x
    const dy = view.y - places.y
    for (const { key, box } of [...places.tags].reverse())
      paintTag(
        ctx,
        places.looks[key]!,
        { x1: box.x1 + dx, y1: box.y1 + dy, x2: box.x2 + dx, y2: box.y2 + dy },
        theme.tokens,
      )
  }

  return {
    theme(tokens, limits, coverage) {
      theme = { tokens, limits, coverage }
      placed = null
    },
    give(next) {
      input = next
      placed = null
    },
    point(next) {
      overlay = next
    },
    resize(width, height) {
      size = { width, height }
      placed = null
    },
    paint,
    repaint: () => latest && paint(latest),
  }
}
