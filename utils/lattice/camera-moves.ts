import { viewOfBox } from './framing'
import type { Box, View } from './types'

export interface Extent {
  readonly width: number
  readonly height: number
}

/** The view zoomed by a factor about a pixel of the viewport, its middle unless another is given. */
export function zoomed(
  { scale, x, y }: View,
  factor: number,
  { width, height }: Extent,
  at?: { x: number; y: number },
) {
  const [cx, cy] = at ? [at.x, at.y] : [width / 2, height / 2]
  return { scale: scale * factor, x: cx - factor * (cx - x), y: cy - factor * (cy - y) }
}

/** What the viewport shows, in line spacings. */
export const seenBox = ({ scale, x, y }: View, { width, height }: Extent): Box => ({
  x1: -x / scale,
  y1: -y / scale,
  x2: (width - x) / scale,
  y2: (height - y) / scale,
})

/** The view with a point of the lattice in its middle. */
export const centred = ({ scale }: View, { width, height }: Extent, at: { x: number; y: number }): View => ({
  scale,
  x: width / 2 - scale * at.x,
  y: height / 2 - scale * at.y,
})

const middle = (box: Box) => ({ x: (box.x1 + box.x2) / 2, y: (box.y1 + box.y2) / 2 })

const around = (boxes: readonly Box[]): Box => ({
  x1: Math.min(...boxes.map((box) => Math.min(box.x1, box.x2))),
  y1: Math.min(...boxes.map((box) => Math.min(box.y1, box.y2))),
  x2: Math.max(...boxes.map((box) => Math.max(box.x1, box.x2))),
  y2: Math.max(...boxes.map((box) => Math.max(box.y1, box.y2))),
})

/** Pixels of the edge of the viewport in which a thing does not count as in sight. */
const BLIND_EDGE = 8

/** The view moved so that the parts are around its middle, or null when one of them is in sight already. */
export function broughtIntoSight(view: View, extent: Extent, parts: readonly Box[]): View | null {
  const seen = seenBox(view, extent)
  const edge = BLIND_EDGE / view.scale
  const isInSight = parts.some(
    (part) =>
      seen.x1 + edge < Math.max(part.x1, part.x2) &&
      seen.x2 - edge > Math.min(part.x1, part.x2) &&
      seen.y1 + edge < Math.max(part.y1, part.y2) &&
      seen.y2 - edge > Math.min(part.y1, part.y2),
  )
  return isInSight || parts.length === 0 ? null : centred(view, extent, middle(around(parts)))
}

export const REVEAL_DEFAULTS = {
  /** Pixels kept free around what is shown. */
  margin: 36,
  /** Line spacing in pixels from which a qubit is easy to tell from its neighbours, and the largest used. */
  legible: 14,
  largest: 30,
}

/**
 * A view that has the whole box in it. The zoom stays where it is when the box fits and single qubits can be told apart;
 * a view that has it all already is left alone.
 */
export function revealing(view: View, extent: Extent, box: Box): View {
  const { margin, legible, largest } = REVEAL_DEFAULTS
  const fitting = viewOfBox(box, extent.width, extent.height, margin, largest)
  const scale = Math.min(fitting.scale, Math.max(view.scale, Math.min(legible, fitting.scale)))
  const seen = seenBox(view, extent)
  const isSeen = seen.x1 <= box.x1 && seen.x2 >= box.x2 && seen.y1 <= box.y1 && seen.y2 >= box.y2
  return isSeen && scale === view.scale ? view : centred({ ...view, scale }, extent, middle(box))
}

/** Whether most of a machine is in view, so that a map of it would tell nothing. */
export function showsMost(view: View, extent: Extent, bounds: Box, share = 0.85): boolean {
  const seen = seenBox(view, extent)
  const within = (a1: number, a2: number, b1: number, b2: number) => Math.max(0, Math.min(a2, b2) - Math.max(a1, b1))
  const across = within(seen.x1, seen.x2, bounds.x1, bounds.x2) / (bounds.x2 - bounds.x1)
  const down = within(seen.y1, seen.y2, bounds.y1, bounds.y2) / (bounds.y2 - bounds.y1)
  return across >= share && down >= share
}

/** Size in pixels of a map of the whole machine, and the pixels of one line spacing in it. */
export function mapSize(bounds: Box, longest: number): { scale: number; width: number; height: number } {
  const [across, down] = [bounds.x2 - bounds.x1, bounds.y2 - bounds.y1]
  const scale = longest / Math.max(across, down)
  return { scale, width: Math.ceil(scale * across), height: Math.ceil(scale * down) }
}

/** Longest side of the map in a viewport, in pixels: large enough to be dragged in, small enough to hide little. */
export const mapLongest = ({ width, height }: Extent): number =>
  Math.round(Math.min(116, Math.max(56, 0.19 * Math.min(width, height))))

/** Corners of the frame in the order in which they are tried. */
export const CORNERS = ['bottom right', 'top right', 'bottom left', 'top left'] as const
export type Corner = (typeof CORNERS)[number]

/** The corner's rectangle of the given size, in pixels of the viewport. */
export function cornerBox(corner: Corner, { width, height }: Extent, size: Extent): Box {
  const x1 = corner.endsWith('right') ? width - size.width : 0
  const y1 = corner.startsWith('bottom') ? height - size.height : 0
  return { x1, y1, x2: x1 + size.width, y2: y1 + size.height }
}

/** The corner in which a map would hide the fewest bands. */
export function freestCorner(view: View, extent: Extent, size: Extent, hiddenIn: (box: Box) => number): Corner {
  let best: Corner = CORNERS[0]
  let least = Infinity
  for (const corner of CORNERS) {
    const { x1, y1, x2, y2 } = cornerBox(corner, extent, size)
    const { scale, x, y } = view
    const hidden = hiddenIn({ x1: (x1 - x) / scale, y1: (y1 - y) / scale, x2: (x2 - x) / scale, y2: (y2 - y) / scale })
    if (hidden < least) {
      best = corner
      least = hidden
    }
  }
  return best
}

/** What is in view, for those who cannot see it. */
export function describeView(view: View, extent: Extent, bounds: Box): string {
  if (showsMost(view, extent, bounds, 0.97)) return 'Whole machine in view.'
  const seen = seenBox(view, extent)
  const lines = (from: number, to: number, low: number, high: number) =>
    `${Math.ceil(Math.max(from, low))} to ${Math.floor(Math.min(to, high))}`
  const across = lines(seen.x1, seen.x2, bounds.x1, bounds.x2)
  const down = lines(seen.y1, seen.y2, bounds.y1, bounds.y2)
  return `In view: lines ${across} across, ${down} down.`
}
