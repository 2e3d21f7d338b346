import type { Random } from '../../random'
import type { CornerWindow, WindowPlace } from './corner-window'
import { centreDiagonal, cutWindow } from './corner-window'
import type { Crossings } from './crossings'
import { matchInOrder } from './matching'
import type { Pairing } from './matching'

/** A window with the chains that fit below its diagonal as they are. */
export interface MatchedWindow {
  readonly window: CornerWindow
  readonly pairing: Pairing
}

/** The part of the plane that lines stand in. */
export interface Extent {
  readonly left: number
  readonly top: number
  /** Lines of either orientation that there is room for, and the larger of the two. */
  readonly width: number
  readonly height: number
  readonly size: number
}

/** Measures the lines of a machine that has some of either orientation. */
export function extentOf({ vertical, horizontal }: Crossings): Extent {
  const [left, right] = [vertical.across[0]!, vertical.across[vertical.count - 1]!]
  const [top, bottom] = [horizontal.across[0]!, horizontal.across[horizontal.count - 1]!]
  const [width, height] = [right - left + 1, bottom - top + 1]
  return { left, top, width, height, size: Math.max(width, height) }
}

/** Evenly spread whole numbers from `first` to `last`, `count` at most, in steps of at least 1. */
function spread(first: number, last: number, count: number): number[] {
  const steps = Math.max(1, Math.min(count, last - first + 1))
  return Array.from({ length: steps }, (_, k) =>
    steps === 1 ? Math.round((first + last) / 2) : Math.round(first + ((last - first) * k) / (steps - 1)),
  )
}

/** Places of a window of one size: an even grid in random order, mirrored all ways. */
function places({ left, top, size: all }: Extent, size: number, limit: number, random: Random): WindowPlace[] {
  const each = Math.max(1, Math.floor(Math.sqrt(limit / 4)))
  const list: WindowPlace[] = []
  for (const x of spread(0, all - size, each))
    for (const y of spread(0, all - size, each))
      for (let mirror = 0; mirror < 4; mirror++) list.push({ x: left + x, y: top + y, size, mirror })
  for (let i = list.length - 1; i > 0; i--) {
    const j = random.below(i + 1)
    ;[list[i], list[j]] = [list[j]!, list[i]!]
  }
  return list
}

/**
 * Looks at about `limit` windows of one size and returns those that hold most chains as they are, best first; of equals
 * the earlier in an order drawn at random.
 */
export function rankWindows(
  crossings: Crossings,
  extent: Extent,
  size: number,
  limit: number,
  random: Random,
): MatchedWindow[] {
  const matched = places(extent, size, limit, random).map((place): MatchedWindow => {
    const window = cutWindow(crossings, place)
    const pairing = matchInOrder(window)
    return { window: centreDiagonal(window, pairing), pairing }
  })
  return matched.sort((a, b) => b.pairing.verticals.length - a.pairing.verticals.length)
}
