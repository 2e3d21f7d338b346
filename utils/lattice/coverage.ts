import type { Band } from './bands'
import type { Box } from './types'

/** How much drawn band lies in any box: a summed-area table over cells of one line spacing. */
export interface Coverage {
  readonly x: number
  readonly y: number
  readonly columns: number
  readonly rows: number
  readonly sums: Uint32Array
}

/** Every cell that a band touches counts once for that band. O(cells + total band length). */
export function coverageOf(bands: readonly Band[], box: Box): Coverage {
  const columns = Math.max(1, Math.ceil(box.x2 - box.x1) + 1)
  const rows = Math.max(1, Math.ceil(box.y2 - box.y1) + 1)
  const sums = new Uint32Array((columns + 1) * (rows + 1))
  const count = (column: number, row: number) => {
    if (column >= 0 && row >= 0 && column < columns && row < rows) sums[(row + 1) * (columns + 1) + column + 1]!++
  }
  for (const band of bands) {
    const steps = Math.ceil(Math.hypot(band.x2 - band.x1, band.y2 - band.y1))
    for (let k = 0; k <= steps; k++) {
      const t = steps === 0 ? 0 : k / steps
      count(
        Math.round(band.x1 + t * (band.x2 - band.x1) - box.x1),
        Math.round(band.y1 + t * (band.y2 - band.y1) - box.y1),
      )
    }
  }
  for (let r = 1; r <= rows; r++)
    for (let c = 1; c <= columns; c++)
      sums[r * (columns + 1) + c]! +=
        sums[(r - 1) * (columns + 1) + c]! + sums[r * (columns + 1) + c - 1]! - sums[(r - 1) * (columns + 1) + c - 1]!
  return { x: box.x1, y: box.y1, columns, rows, sums }
}

/** Band cells inside the box, in lattice coordinates. */
export function coveredIn({ x, y, columns, rows, sums }: Coverage, box: Box): number {
  const c1 = clampTo(Math.round(box.x1 - x), columns)
  const c2 = clampTo(Math.round(box.x2 - x) + 1, columns)
  const r1 = clampTo(Math.round(box.y1 - y), rows)
  const r2 = clampTo(Math.round(box.y2 - y) + 1, rows)
  const at = (row: number, column: number) => sums[row * (columns + 1) + column]!
  return at(r2, c2) - at(r1, c2) - at(r2, c1) + at(r1, c1)
}

const clampTo = (value: number, limit: number) => Math.min(limit, Math.max(0, value))
