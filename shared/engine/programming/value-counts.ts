import type { Range } from './ranges'

const DEFAULTS = { mostBins: 96, leastBins: 48 }
/** Rounding of the ends of a range must not hide that 0 falls on an edge. */
const ON_AN_EDGE = 1e-9

/** Equal bins over a range, as many as put an edge at 0 where some number from 96 down to 48 does. */
export function binsOver([least, greatest]: Range): number {
  for (let bins = DEFAULTS.mostBins; bins >= DEFAULTS.leastBins; bins--) {
    const below = (-least * bins) / (greatest - least)
    if (Math.abs(below - Math.round(below)) < ON_AN_EDGE) return bins
  }
  return DEFAULTS.mostBins
}

/**
 * Programmed values counted in `bins` equal bins over the range that they lie in; each bin has its lower edge, the last
 * one both.
 * @throws RangeError for a range of no width, or a value outside it
 */
export function valueCounts(values: Iterable<number>, range: Range, bins = binsOver(range)): number[] {
  const [least, greatest] = range
  if (!(greatest > least)) throw new RangeError(`a range from ${least} to ${greatest} holds no bins`)
  const counts = new Array<number>(bins).fill(0)
  for (const value of values) {
    if (!(value >= least && value <= greatest)) throw new RangeError(`${value} is outside ${least} to ${greatest}`)
    // Rounding must not put a value that sits on an edge, such as 0.3 of ten bins, into the bin below.
    const place = ((value - least) / (greatest - least)) * bins
    const bin = Math.abs(place - Math.round(place)) < ON_AN_EDGE ? Math.round(place) : Math.floor(place)
    counts[Math.min(bins - 1, bin)]!++
  }
  return counts
}
