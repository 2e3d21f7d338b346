import type { CornerWindow } from './corner-window'
import { crosses } from './corner-window'

/** What meeting at a crossing costs a pair of chains, and what its corner costs a chain. */
export const COSTS = {
  /** The two runs do not cross. */
  unmet: 200,
  /** A crossing just outside the triangle, and the line spacings further out that cost one more, up to the most. */
  outside: 1,
  spacingsPerStep: 6,
  mostOutside: 10,
  /** No coupler at the corner. */
  noCorner: 2000,
  /** A corner this far from the diagonal costs nothing, then one for so many spacings, up to the most. */
  freeCorner: 6,
  spacingsPerCornerStep: 2,
  mostCorner: 40,
}

/**
 * Pair costs carry the number of unmet pairs in the bits above the cost itself, so that a sum tells both; with at most
 * 2048 chains neither part overflows.
 */
export const UNMET_UNIT = 1 << 19
export const COST_MASK = UNMET_UNIT - 1

/** Tables over the runs of a window. */
export interface PairCosts {
  readonly rows: number
  readonly width: number
  /** crossing[v·width + h] and transposed[h·rows + v]: a pair of chains that meets there. */
  readonly crossing: Int32Array
  readonly transposed: Int32Array
  /** corner[v·width + h]: a chain made of these two runs. */
  readonly corner: Uint16Array
}

/** Costs of all crossings of a window. */
export function pairCosts(window: CornerWindow): PairCosts {
  const rows = window.verticals.length
  const width = window.horizontals.length
  const crossing = new Int32Array(rows * width).fill(UNMET_UNIT + COSTS.unmet)
  const transposed = new Int32Array(rows * width).fill(UNMET_UNIT + COSTS.unmet)
  const corner = new Uint16Array(rows * width).fill(COSTS.noCorner)
  for (let v = 0; v < rows; v++)
    for (let h = 0; h < width; h++) {
      if (!crosses(window, v, h)) continue
      const off = window.u[v]! - window.t[h]!
      const steps = COSTS.outside + Math.floor(off / COSTS.spacingsPerStep)
      crossing[v * width + h] = transposed[h * rows + v] = off <= 0 ? 0 : Math.min(COSTS.mostOutside, steps)
      const astray = Math.max(0, Math.abs(off) - COSTS.freeCorner)
      corner[v * width + h] = Math.min(COSTS.mostCorner, Math.floor(astray / COSTS.spacingsPerCornerStep))
    }
  return { rows, width, crossing, transposed, corner }
}
