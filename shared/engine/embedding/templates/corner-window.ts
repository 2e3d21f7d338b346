import type { Crossings, RunSet } from './crossings'

/**
 * A part of the machine seen so that a complete graph lies below its diagonal: runs that have crossings in it, in the
 * order of `u` (vertical runs) and of `t` (horizontal runs), both from 0. Mirrorings decide from which side they count.
 * The crossing of a vertical run at u and a horizontal one at t is inside the triangle when t ≥ u.
 */
export interface CornerWindow {
  readonly crossings: Crossings
  /** Runs by local number, as numbers of `crossings`. */
  readonly verticals: Int32Array
  readonly horizontals: Int32Array
  readonly u: Float32Array
  readonly t: Float32Array
  /** How far the vertical run reaches towards large t, and the horizontal one towards small u. */
  readonly reachT: Float32Array
  readonly reachU: Float32Array
}

export interface WindowPlace {
  /** Coordinate of the first line of either orientation, and the number of lines' spacings that the window takes. */
  readonly x: number
  readonly y: number
  readonly size: number
  /** Bit 0: u counts from the right. Bit 1: t counts from below. */
  readonly mirror: number
}

interface Side {
  readonly runs: Int32Array
  readonly position: Float32Array
  readonly reach: Float32Array
}

/** Runs of a set with something inside the window, in mirrored order. */
function side(
  set: RunSet,
  acrossFirst: number,
  alongFirst: number,
  size: number,
  mirrored: boolean,
  reachOf: (r: number) => number,
): Side {
  const runs: number[] = []
  for (let r = 0; r < set.count; r++) {
    const place = set.across[r]! - acrossFirst
    if (place < 0 || place >= size) continue
    if (set.to[r]! < alongFirst || set.from[r]! > alongFirst + size - 1) continue
    runs.push(r)
  }
  if (mirrored) runs.reverse()
  const position = (r: number): number => {
    const place = set.across[r]! - acrossFirst
    return mirrored ? size - 1 - place : place
  }
  return {
    runs: Int32Array.from(runs),
    position: Float32Array.from(runs, position),
    reach: Float32Array.from(runs, reachOf),
  }
}

/** Cuts a square window out of the machine. */
export function cutWindow(crossings: Crossings, { x, y, size, mirror }: WindowPlace): CornerWindow {
  const { vertical, horizontal } = crossings
  const fromRight = (mirror & 1) !== 0
  const fromBelow = (mirror & 2) !== 0
  const up = side(vertical, x, y, size, fromRight, (r) =>
    fromBelow ? size - 1 - (vertical.from[r]! - y) : vertical.to[r]! - y,
  )
  const flat = side(horizontal, y, x, size, fromBelow, (r) =>
    fromRight ? size - 1 - (horizontal.to[r]! - x) : horizontal.from[r]! - x,
  )
  return {
    crossings,
    verticals: up.runs,
    horizontals: flat.runs,
    u: up.position,
    t: flat.position,
    reachT: up.reach,
    reachU: flat.reach,
  }
}

/** Whether local runs v and h are joined by a coupler. */
export function crosses({ crossings, verticals, horizontals }: CornerWindow, v: number, h: number): boolean {
  return crossings.alongVertical[verticals[v]! * crossings.horizontal.count + horizontals[h]!]! >= 0
}

/** The same window with its diagonal moved to where the corners of the given chains lie in the middle. */
export function centreDiagonal(
  window: CornerWindow,
  pairing: { readonly verticals: Int32Array; readonly horizontals: Int32Array },
): CornerWindow {
  const offsets = Float32Array.from(
    pairing.verticals,
    (v, i) => window.t[pairing.horizontals[i]!]! - window.u[v]!,
  ).sort()
  const shift = offsets[offsets.length >> 1] ?? 0
  return { ...window, t: window.t.map((t) => t - shift), reachT: window.reachT.map((reach) => reach - shift) }
}
