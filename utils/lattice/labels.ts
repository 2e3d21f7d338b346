import { coveredIn } from './coverage'
import type { Coverage } from './coverage'
import type { Band } from './bands'
import type { Box, View } from './types'

/** A tag waiting for a place. Positions are in lattice coordinates, best first among equals. */
export interface TagRequest {
  readonly key: number
  /** Higher is placed earlier. */
  readonly priority: number
  /** Size in pixels. */
  readonly width: number
  readonly height: number
  readonly spots: readonly TagSpot[]
  /** Placed even where it covers many bands. */
  readonly insist: boolean
}

export interface TagSpot {
  readonly x: number
  readonly y: number
  /** Shift in pixels from that point, in units of half the tag's own size: (0, −1) puts the tag just above. */
  readonly ox: number
  readonly oy: number
  /** Length of the band beneath, in line spacings, when the tag lies on it: a short band would vanish. */
  readonly room: number
}

export interface PlacedTag {
  readonly key: number
  readonly box: Box
  readonly spot: TagSpot
}

export const TAG_DEFAULTS = {
  /** Free pixels around a tag. */
  gap: 3,
  /** Foreign band cells a tag may hide for each thousand square pixels of its own. */
  tolerance: 17,
  /** Most tags at once. */
  most: 90,
  /** Share of the viewport that tags may cover together; those that insist are placed all the same. */
  share: 0.1,
}

/** As bad as hiding so many cells of other bands. */
const HIDDEN_BAND_COST = 12

const ONE_LINE = 1
/** Half heights of a tag from the middle of a disc at which it is clear of the largest. */
const CLEAR_OF_DISC = 2.3

/** Spots on and beside a band: its middle first, then quarters, then beyond its ends. */
export function spotsOf(band: Pick<Band, 'x1' | 'y1' | 'x2' | 'y2'>): TagSpot[] {
  const length = Math.hypot(band.x2 - band.x1, band.y2 - band.y1)
  const at = (t: number, ox = 0, oy = 0): TagSpot => ({
    x: band.x1 + t * (band.x2 - band.x1),
    y: band.y1 + t * (band.y2 - band.y1),
    ox,
    oy,
    room: ox === 0 && oy === 0 ? length : Infinity,
  })
  const upright = Math.abs(band.x2 - band.x1) < Math.abs(band.y2 - band.y1)
  const ends = upright ? [at(0, 0, -1.2), at(1, 0, 1.2)] : [at(0, -1.1, 0), at(1, 1.1, 0)]
  // A single disc has room above and below it as well, where its neighbours along the row are not covered.
  if (length < ONE_LINE) ends.push(at(0.5, 0, -CLEAR_OF_DISC), at(0.5, 0, CLEAR_OF_DISC))
  return [at(0.5), at(0.3), at(0.7), at(0.14), at(0.86), ...ends]
}

/**
 * Greedy placing: tags in order of priority, each at the spot inside the viewport that hides the least and does not
 * touch a tag already placed; a tag that would hide too much is left out unless it insists.
 *
 * @param held boxes in pixels that tags must keep clear of
 */
export function placeTags(
  requests: readonly TagRequest[],
  view: View,
  viewport: Box,
  coverage: Coverage | null,
  held: readonly Box[] = [],
  { gap, tolerance, most, share }: typeof TAG_DEFAULTS = TAG_DEFAULTS,
): PlacedTag[] {
  let room = share * (viewport.x2 - viewport.x1) * (viewport.y2 - viewport.y1)
  const taken = new BoxGrid(held)
  const placed: PlacedTag[] = []
  const ordered = [...requests].sort((a, b) => b.priority - a.priority || a.key - b.key)
  for (const request of ordered) {
    if (placed.length >= most) break
    const area = request.width * request.height
    if (!request.insist && area > room) continue
    const limit = request.insist ? Infinity : (tolerance * area) / 1000
    let best: Box | null = null
    let bestSpot: TagSpot | null = null
    let bestCost = Infinity
    for (const spot of request.spots) {
      const box = boxOfSpot(spot, request, view)
      if (!isInside(box, viewport) || taken.touches(box, gap)) continue
      const hidesBand = spot.room * view.scale < 1.6 * request.width
      const cost = (coverage ? coveredIn(coverage, toLattice(box, view)) : 0) + (hidesBand ? HIDDEN_BAND_COST : 0)
      if (cost < bestCost - 0.5 && cost <= limit) {
        best = box
        bestSpot = spot
        bestCost = cost
      }
    }
    if (!best || !bestSpot) continue
    taken.add(best)
    room -= area
    placed.push({ key: request.key, box: best, spot: bestSpot })
  }
  return placed
}

/**
 * Tags placed for another view, where they belong now: each keeps its spot, and those that would now touch one of higher
 * priority are left out. Tags are in order of priority.
 */
export function carryTags(tags: readonly PlacedTag[], view: View, { gap } = TAG_DEFAULTS): PlacedTag[] {
  const carried: PlacedTag[] = []
  for (const tag of tags) {
    const { box, spot } = tag
    const moved = boxOfSpot(spot, { width: box.x2 - box.x1, height: box.y2 - box.y1 }, view)
    if (!carried.some((other) => overlap(moved, other.box, gap))) carried.push({ ...tag, box: moved })
  }
  return carried
}

function boxOfSpot(spot: TagSpot, { width, height }: Pick<TagRequest, 'width' | 'height'>, view: View): Box {
  const x = view.x + view.scale * spot.x + (spot.ox * width) / 2
  const y = view.y + view.scale * spot.y + (spot.oy * height) / 2
  return { x1: x - width / 2, y1: y - height / 2, x2: x + width / 2, y2: y + height / 2 }
}

/** Boxes by the cells of a coarse grid that they touch, so that few need comparing. */
class BoxGrid {
  private readonly cells = new Map<string, Box[]>()

  constructor(boxes: readonly Box[]) {
    for (const box of boxes) this.add(box)
  }

  add(box: Box): void {
    for (const key of keysOf(box, 0)) {
      const cell = this.cells.get(key)
      if (cell) cell.push(box)
      else this.cells.set(key, [box])
    }
  }

  touches(box: Box, gap: number): boolean {
    return keysOf(box, gap).some((key) => this.cells.get(key)?.some((other) => overlap(box, other, gap)))
  }
}

const CELL_PIXELS = 64

function keysOf({ x1, y1, x2, y2 }: Box, gap: number): string[] {
  const keys: string[] = []
  for (let row = Math.floor((y1 - gap) / CELL_PIXELS); row <= Math.floor((y2 + gap) / CELL_PIXELS); row++)
    for (let column = Math.floor((x1 - gap) / CELL_PIXELS); column <= Math.floor((x2 + gap) / CELL_PIXELS); column++)
      keys.push(`${column} ${row}`)
  return keys
}

const toLattice = (box: Box, { scale, x, y }: View): Box => ({
  x1: (box.x1 - x) / scale,
  y1: (box.y1 - y) / scale,
  x2: (box.x2 - x) / scale,
  y2: (box.y2 - y) / scale,
})

const isInside = (box: Box, outer: Box) =>
  box.x1 >= outer.x1 && box.y1 >= outer.y1 && box.x2 <= outer.x2 && box.y2 <= outer.y2

const overlap = (a: Box, b: Box, gap: number) =>
  a.x1 < b.x2 + gap && b.x1 < a.x2 + gap && a.y1 < b.y2 + gap && b.y1 < a.y2 + gap
