import { boxOfSegments, squaredDistanceToSegment } from './segments'

/** A coarse grid over the plane that lists the segments passing through each cell. */
export interface SegmentIndex {
  readonly segments: Float32Array
  readonly cell: number
  readonly x: number
  readonly y: number
  readonly columns: number
  readonly rows: number
  /** Segments of cell k are items[starts[k] … starts[k + 1] − 1]. */
  readonly starts: Uint32Array
  readonly items: Uint32Array
}

/** Index for nearest-segment questions: O(length of all segments / cell) to build. */
export function indexSegments(segments: Float32Array, cell = 4): SegmentIndex {
  const box = boxOfSegments(segments) ?? { x1: 0, y1: 0, x2: 0, y2: 0 }
  const columns = Math.floor((box.x2 - box.x1) / cell) + 1
  const rows = Math.floor((box.y2 - box.y1) / cell) + 1
  const frame = { segments, cell, x: box.x1, y: box.y1, columns, rows }
  const starts = new Uint32Array(columns * rows + 1)
  forEachCell(frame, (_, k) => starts[k + 1]!++)
  for (let k = 0; k < columns * rows; k++) starts[k + 1]! += starts[k]!
  const items = new Uint32Array(starts[columns * rows]!)
  const filled = starts.slice()
  forEachCell(frame, (segment, k) => (items[filled[k]!++] = segment))
  return { ...frame, starts, items }
}

type Grid = Omit<SegmentIndex, 'starts' | 'items'>

function forEachCell({ segments, cell, x, y, columns }: Grid, visit: (segment: number, cell: number) => void) {
  for (let s = 0; 4 * s < segments.length; s++) {
    const c1 = Math.floor((Math.min(segments[4 * s]!, segments[4 * s + 2]!) - x) / cell)
    const c2 = Math.floor((Math.max(segments[4 * s]!, segments[4 * s + 2]!) - x) / cell)
    const r1 = Math.floor((Math.min(segments[4 * s + 1]!, segments[4 * s + 3]!) - y) / cell)
    const r2 = Math.floor((Math.max(segments[4 * s + 1]!, segments[4 * s + 3]!) - y) / cell)
    for (let r = r1; r <= r2; r++) for (let c = c1; c <= c2; c++) visit(s, r * columns + c)
  }
}

/**
 * The segment nearest to (px, py) and at most `reach` away, or −1. `bonus` (line spacings) is taken off the distance of
 * the segments it is given for, so that what is drawn broad is also easier to hit. Ties go to the lower index.
 */
export function nearestSegment(
  index: SegmentIndex,
  px: number,
  py: number,
  reach: number,
  bonus: (segment: number) => number = () => 0,
): number {
  const { segments, cell, columns, rows, starts, items } = index
  const c1 = Math.max(0, Math.floor((px - reach - index.x) / cell))
  const c2 = Math.min(columns - 1, Math.floor((px + reach - index.x) / cell))
  const r1 = Math.max(0, Math.floor((py - reach - index.y) / cell))
  const r2 = Math.min(rows - 1, Math.floor((py + reach - index.y) / cell))
  let best = -1
  let bestScore = Infinity
  for (let r = r1; r <= r2; r++) {
    for (let c = c1; c <= c2; c++) {
      for (let k = starts[r * columns + c]!; k < starts[r * columns + c + 1]!; k++) {
        const s = items[k]!
        const at = 4 * s
        const distance = Math.sqrt(
          squaredDistanceToSegment(px, py, segments[at]!, segments[at + 1]!, segments[at + 2]!, segments[at + 3]!),
        )
        if (distance > reach) continue
        const score = distance - bonus(s)
        if (score < bestScore || (score === bestScore && s < best)) {
          best = s
          bestScore = score
        }
      }
    }
  }
  return best
}
