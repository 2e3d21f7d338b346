import type { CornerWindow } from './corner-window'

/** Chains to be: chain i takes vertical run verticals[i] and horizontal run horizontals[i], as local numbers. */
export interface Pairing {
  readonly verticals: Int32Array
  readonly horizontals: Int32Array
}

/** Where chains have to reach: the vertical arms down to `t`, the horizontal ones back to `u`. */
interface Ends {
  readonly t: number
  readonly u: number
}

/** Reaches that fewer than this share of the runs have are not tried as ends, nor more than so many of them. */
const LEAST_COMMON = 0.1
const MOST_ENDS = 4

/** The values that the reaches take most often. */
function commonest(reaches: Float32Array, cap: (reach: number) => number): number[] {
  const counts = new Map<number, number>()
  for (const reach of reaches) counts.set(cap(reach), (counts.get(cap(reach)) ?? 0) + 1)
  return [...counts]
    .filter(([, count]) => count >= LEAST_COMMON * reaches.length)
    .sort(([a, countA], [b, countB]) => countB - countA || a - b)
    .slice(0, MOST_ENDS)
    .map(([reach]) => reach)
}

/** Ends worth trying: those at which many runs of the window stop, and the window's own. */
function candidateEnds({ t, u, reachT, reachU }: CornerWindow): Ends[] {
  const lastT = t[t.length - 1]!
  const firstU = u[0]!
  const ends: Ends[] = []
  for (const endT of commonest(reachT, (reach) => Math.min(lastT, Math.floor(reach))))
    for (const endU of commonest(reachU, (reach) => Math.max(firstU, Math.ceil(reach)))) ends.push({ t: endT, u: endU })
  return ends
}

/** 1 where runs v and h are joined at a corner within the ends, from which each arm reaches its end. */
function cornerTable(
  { crossings, verticals, horizontals, u, t, reachT, reachU }: CornerWindow,
  ends: Ends,
): Uint8Array {
  const width = horizontals.length
  const table = new Uint8Array(verticals.length * width)
  const { alongVertical } = crossings
  for (let v = 0; v < verticals.length; v++) {
    if (reachT[v]! < ends.t || u[v]! < ends.u) continue
    const row = verticals[v]! * crossings.horizontal.count
    for (let h = 0; h < width && t[h]! <= ends.t; h++)
      if (reachU[h]! <= ends.u && alongVertical[row + horizontals[h]!]! >= 0) table[v * width + h] = 1
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

/** Reads a largest set of corners off the table, from the last backwards. */
function trace(best: Uint16Array, rows: number, width: number): Pairing {
  const verticals: number[] = []
  const horizontals: number[] = []
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
  return { verticals: Int32Array.from(verticals.reverse()), horizontals: Int32Array.from(horizontals.reverse()) }
}

/**
 * The largest set of chains made of one vertical and one horizontal run each, in the same order along both, so that all
 * of them meet pairwise below the diagonal: a maximum order-preserving matching by dynamic programming, in time and
 * memory proportional to the product of the numbers of runs, for each of a few pairs of ends. Chains in the order of
 * the diagonal.
 */
export function matchInOrder(window: CornerWindow): Pairing {
  const rows = window.verticals.length
  const width = window.horizontals.length
  let largest: Pairing = { verticals: new Int32Array(0), horizontals: new Int32Array(0) }
  if (rows === 0 || width === 0) return largest
  for (const ends of candidateEnds(window)) {
    const best = matchingTable(cornerTable(window, ends), rows, width)
    if (best[best.length - 1]! > largest.verticals.length) largest = trace(best, rows, width)
  }
  return largest
}
