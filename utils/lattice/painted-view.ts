import type { Box, View } from './types'

/** A picture that was painted from some point of view, larger than the viewport by a margin on every side. */
export interface Painted {
  readonly view: View
  /** Size of the picture, and what lies beyond the viewport to the left and above, in CSS pixels. */
  readonly width: number
  readonly height: number
  readonly marginX: number
  readonly marginY: number
  readonly ratio: number
}

export const PAINTED_DEFAULTS = {
  /** Margin on each side as a share of the viewport, and the most it may be in pixels. */
  margin: 0.35,
  largestMargin: 280,
  /** Stretch of the picture beyond which another is wanted even while the camera moves. */
  mostStretched: 1.7,
  leastStretched: 0.75,
  /** Share of the margin that may be used up before another is wanted. */
  reserve: 0.55,
}

export const marginOf = (extent: number): number =>
  Math.round(Math.min(PAINTED_DEFAULTS.largestMargin, extent * PAINTED_DEFAULTS.margin))

/** Where the picture lies in the viewport now, in pixels. */
export function boxNow({ view: then, width, height, marginX, marginY }: Painted, now: View): Box & { stretch: number } {
  const stretch = now.scale / then.scale
  const x1 = now.x - stretch * (then.x + marginX)
  const y1 = now.y - stretch * (then.y + marginY)
  return { x1, y1, x2: x1 + stretch * width, y2: y1 + stretch * height, stretch }
}

export const covers = (box: Box, width: number, height: number): boolean =>
  box.x1 <= 0.5 && box.y1 <= 0.5 && box.x2 >= width - 0.5 && box.y2 >= height - 0.5

/** Whether the picture should be painted anew although the camera still moves. */
export function isUsedUp(painted: Painted, now: View, width: number, height: number): boolean {
  const { mostStretched, leastStretched, reserve } = PAINTED_DEFAULTS
  const box = boxNow(painted, now)
  if (box.stretch > mostStretched || box.stretch < leastStretched) return true
  const left = (1 - reserve) * painted.marginX
  const top = (1 - reserve) * painted.marginY
  return box.x1 > -left || box.y1 > -top || box.x2 < width + left || box.y2 < height + top
}

/** To a hundredth of a pixel: cameras reckon in other units and come back with rounding errors. */
export const isSameView = (a: View, b: View): boolean =>
  Math.abs(a.scale - b.scale) < 1e-5 * a.scale && Math.abs(a.x - b.x) < 0.01 && Math.abs(a.y - b.y) < 0.01
