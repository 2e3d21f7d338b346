import type { CornerWindow } from './corner-window'
import { crosses } from './corner-window'
import type { Pairing } from './matching'

/** A pairing of as many chains as wanted, and the runs that are left to exchange. */
export interface FilledPairing extends Pairing {
  readonly spareVerticals: Int32Array
  readonly spareHorizontals: Int32Array
}

/** Runs that cross a smaller share of the window's other runs are of no use. */
const LEAST_CROSSED = 0.2

/** By run, how many of the other orientation it crosses in the window. */
function crossingCounts(window: CornerWindow): { vertical: Int32Array; horizontal: Int32Array } {
  const vertical = new Int32Array(window.verticals.length)
  const horizontal = new Int32Array(window.horizontals.length)
  for (let v = 0; v < vertical.length; v++)
    for (let h = 0; h < horizontal.length; h++) {
      if (!crosses(window, v, h)) continue
      vertical[v]!++
      horizontal[h]!++
    }
  return { vertical, horizontal }
}

/** Splits the runs that are not taken into the `wanted` best connected, in order of the window, and the useful rest. */
function bestUnused(taken: Int32Array, counts: Int32Array, wanted: number): { chosen: number[]; spare: number[] } {
  const unused = Array.from(counts.keys()).filter((r) => !taken.includes(r))
  unused.sort((a, b) => counts[b]! - counts[a]! || a - b)
  const most = counts.reduce((a, b) => Math.max(a, b), 0)
  return {
    chosen: unused.slice(0, wanted).sort((a, b) => a - b),
    spare: unused.slice(wanted).filter((r) => counts[r]! >= LEAST_CROSSED * most),
  }
}

/**
 * Adds chains of the best connected unused runs, paired in order, until there are n.
 * @returns null when the window has too few runs
 */
export function fillPairing(window: CornerWindow, start: Pairing, n: number): FilledPairing | null {
  if (Math.min(window.verticals.length, window.horizontals.length) < n) return null
  const verticals = start.verticals.slice(0, n)
  const horizontals = start.horizontals.slice(0, n)
  const counts = crossingCounts(window)
  const up = bestUnused(verticals, counts.vertical, n - verticals.length)
  const flat = bestUnused(horizontals, counts.horizontal, n - horizontals.length)
  return {
    verticals: Int32Array.from([...verticals, ...up.chosen]),
    horizontals: Int32Array.from([...horizontals, ...flat.chosen]),
    spareVerticals: Int32Array.from(up.spare),
    spareHorizontals: Int32Array.from(flat.spare),
  }
}
