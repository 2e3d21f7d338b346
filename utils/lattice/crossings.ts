import type { Band } from './bands'

/** Where a horizontal and a vertical band of different chains cross. */
export interface Crossing {
  /** Indices of the bands. */
  readonly horizontal: number
  readonly vertical: number
  readonly x: number
  readonly y: number
}

const TOLERANCE = 1e-3

type Strip = Pick<Band, 'chain' | 'x1' | 'y1' | 'x2' | 'y2'>

const isHorizontal = (band: Strip) => Math.abs(band.y2 - band.y1) < TOLERANCE
const isVertical = (band: Strip) => Math.abs(band.x2 - band.x1) < TOLERANCE

/**
 * All crossings of horizontal with vertical bands, by a sweep over x: O(b log b + verticals · horizontals open at once).
 * Bands of the same chain are left out: there a coupler, not an over or under, says how they meet.
 */
export function crossingsOf(bands: readonly Strip[]): Crossing[] {
  const horizontals = indicesOf(bands, isHorizontal).sort((a, b) => left(bands[a]!) - left(bands[b]!))
  const verticals = indicesOf(bands, isVertical).sort((a, b) => bands[a]!.x1 - bands[b]!.x1)
  const crossings: Crossing[] = []
  let open: number[] = []
  let next = 0
  for (const vertical of verticals) {
    const v = bands[vertical]!
    while (next < horizontals.length && left(bands[horizontals[next]!]!) <= v.x1) open.push(horizontals[next++]!)
    open = open.filter((h) => Math.max(bands[h]!.x1, bands[h]!.x2) >= v.x1)
    const top = Math.min(v.y1, v.y2)
    const bottom = Math.max(v.y1, v.y2)
    for (const horizontal of open) {
      const h = bands[horizontal]!
      if (h.chain !== v.chain && h.y1 >= top && h.y1 <= bottom)
        crossings.push({ horizontal, vertical, x: v.x1, y: h.y1 })
    }
  }
  return crossings
}

/**
 * Whether the horizontal band passes over the vertical one: over and under alternate along every line, as in a woven
 * trellis, so that no band is cut into dashes by all those that cross it.
 */
export const passesOver = (crossing: Pick<Crossing, 'x' | 'y'>): boolean =>
  (Math.round(crossing.x) + Math.round(crossing.y)) % 2 === 0

const left = (band: Strip) => Math.min(band.x1, band.x2)

function indicesOf(bands: readonly Strip[], test: (band: Strip) => boolean): number[] {
  const found: number[] = []
  // A point counts as horizontal only, lest it cross itself.
  bands.forEach((band, i) => {
    if (test(band) && (test === isHorizontal || !isHorizontal(band))) found.push(i)
  })
  return found
}
