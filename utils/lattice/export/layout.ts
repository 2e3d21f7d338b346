import { viewOfBox } from '../framing'
import type { StageLook, StageSource } from '../stage-types'
import type { Box, View } from '../types'

/** What the screen shows at the moment, ready to be drawn elsewhere. */
export interface DrawnLattice {
  readonly source: StageSource
  readonly look: StageLook
  /** What the frame shows, in line spacings, and the pixels of one of them. */
  readonly seen: Box
  readonly scale: number
}

export type Extent = 'whole machine' | 'current view'

/** Where things lie in a saved picture, in its pixels. */
export interface PictureLayout {
  readonly width: number
  readonly height: number
  /** The frame within the picture. */
  readonly frame: Box
  /** Where the lattice lies within the frame. */
  readonly view: View
}

export const PICTURE_DEFAULTS = {
  /** Longest side of the frame around a whole machine in pixels; more where lines would lie too close for labels. */
  usualSide: 1600,
  longestSide: 4000,
  /** Line spacing at which most labels find room, and the largest there is. */
  roomyScale: 10,
  largestScale: 24,
  /** Paper around everything; ruler beside the frame; room for the words above and below it. */
  margin: 32,
  ruler: 24,
  head: 74,
  legendLine: 22,
  /** Width under which the words would not fit. */
  leastWidth: 720,
}

/** @param legendLines rows of the legend below the frame */
export function layoutOf(drawn: DrawnLattice, extent: Extent, legendLines: number): PictureLayout {
  const { margin, ruler, head, legendLine, leastWidth } = PICTURE_DEFAULTS
  const { width, height, view } = extent === 'current view' ? asSeen(drawn) : asWhole(drawn.source.bounds)
  const frame = { x1: margin + ruler, y1: margin + head + ruler, x2: 0, y2: 0 }
  frame.x2 = frame.x1 + width
  frame.y2 = frame.y1 + height
  return {
    width: Math.max(leastWidth, frame.x2 + margin),
    height: frame.y2 + 12 + legendLines * legendLine + margin,
    frame,
    view,
  }
}

function asSeen({ seen, scale }: DrawnLattice) {
  const width = Math.round(scale * (seen.x2 - seen.x1))
  const height = Math.round(scale * (seen.y2 - seen.y1))
  return { width, height, view: { scale, x: -scale * seen.x1, y: -scale * seen.y1 } }
}

function asWhole(bounds: Box) {
  const { usualSide, longestSide, roomyScale, largestScale } = PICTURE_DEFAULTS
  const [lines, rows] = [bounds.x2 - bounds.x1, bounds.y2 - bounds.y1]
  const longest = Math.max(lines, rows)
  const scale = Math.min(largestScale, Math.max(usualSide / longest, Math.min(roomyScale, longestSide / longest)))
  const width = Math.round(scale * lines)
  const height = Math.round(scale * rows)
  return { width, height, view: viewOfBox(bounds, width, height, 0, scale) }
}
