import type { Box, View } from './types'

/** The view that shows the whole box, centred, with a margin in pixels. */
export function viewOfBox(box: Box, width: number, height: number, margin: number, widest = Infinity): View {
  const scale = Math.min(
    widest,
    Math.max(1, width - 2 * margin) / Math.max(1e-6, box.x2 - box.x1),
    Math.max(1, height - 2 * margin) / Math.max(1e-6, box.y2 - box.y1),
  )
  return {
    scale,
    x: width / 2 - (scale * (box.x1 + box.x2)) / 2,
    y: height / 2 - (scale * (box.y1 + box.y2)) / 2,
  }
}

/**
 * The view that shows the box as large as `widest` lets it; where the whole of `bounds` has room at that scale, with
 * that in the middle.
 */
export function viewWithin(box: Box, bounds: Box, width: number, height: number, margin: number, widest: number): View {
  const view = viewOfBox(box, width, height, margin, widest)
  const whole = viewOfBox(bounds, width, height, margin, view.scale)
  return whole.scale < view.scale ? view : whole
}

export const padBox = ({ x1, y1, x2, y2 }: Box, by: number): Box => ({
  x1: x1 - by,
  y1: y1 - by,
  x2: x2 + by,
  y2: y2 + by,
})

/** Full width of a band in pixels, casing included: most of a line's room, never too thin to see nor thicker than a tag. */
export const bandWidth = (scale: number): number => Math.min(13, Math.max(2.3, 0.64 * scale + 0.6))
