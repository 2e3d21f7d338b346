import type { CornerWindow } from './corner-window'

/** Chains to be: chain i takes vertical run verticals[i] and horizontal run horizontals[i], as local numbers. */
export interface Pairing {
  readonly verticals: Int32Array
  readonly horizontals: Int32Array
}

/**
 * 1 where runs v and h are joined at a corner from which the one reaches the last horizontal run of the window and the
 * other the first vertical one.
 */
function cornerTable({ crossings, verticals, horizontals, u, t, reachT, reachU }: CornerWindow): Uint8Array {
  const width = horizontals.length
  const table = new Uint8Array(verticals.length * width)
  const { alongVertical } = crossings
  for (let v = 0; v < verticals.length; v++) {
    if (reachT[v]! < t[width - 1]!) continue
    const row = verticals[v]! * crossings.horizontal.count
    for (let h = 0; h < width; h++)
      if (reachU[h]! <= u[0]! && alongVertical[row + horizontals[h]!]! >= 0) table[v * width + h] = 1
  }
  return table
}

/** best[v][h]: most chains from the first v vertical and h horizontal runs; (rows + 1) × (width + 1). */
function matchingTable(corners: Uint8Array, rows: number, width: number): Uint16Array {
  const stride = width + 1
  const best = new Uint16Array((rows + 1) * stride)
  for (let v = 1; v <= rows; v++) {
    const row = v * stride
    for (let h = 1; h <= width; h++) {
      const above = best[row - stride + h]!
      const left = best[row + h - 1]!
      const joined = best[row - stride + h - 1]! + corners[(v - 1) * width + h - 1]!
      const without = above > left ? above : left
      best[row + h] = joined > without ? joined : without
    }
  }
  return best
}

/**
 * The largest set of chains made of one vertical and one horizontal run each, in the same order along both, so that all
 * of them meet pairwise below the diagonal: a maximum order-preserving matching by dynamic programming, in time and
 * memory proportional to the product of the numbers of runs. Chains in the order of the diagonal.
 */
export function matchInOrder(window: CornerWindow): Pairing {
  const rows = window.verticals.length
  const width = window.horizontals.length
  const verticals: number[] = []
  const horizontals: number[] = []
  if (rows > 0 && width > 0) {
    const best = matchingTable(cornerTable(window), rows, width)
    const stride = width + 1
    for (let v = rows, h = width; v > 0 && h > 0;) {
      const here = best[v * stride + h]!
      if (here === best[(v - 1) * stride + h]) v--
      else if (here === best[v * stride + h - 1]) h--
      else {
        verticals.push(--v)
        horizontals.push(--h)
      }
    }
  }
  return { verticals: Int32Array.from(verticals.reverse()), horizontals: Int32Array.from(horizontals.reverse()) }
}
