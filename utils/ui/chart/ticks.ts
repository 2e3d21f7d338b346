/** Readable ticks where the drawing library's own would be too few or fall between the values. */

const FINE = [1, 1.2, 1.5, 2, 2.5, 3, 4, 5, 6, 8]
const COARSE = [1, 2, 5]
const ROUGH = [1, 3]
const MOST_FINE = 12
/** More whole values than this are left to the library. */
const MOST_WHOLE = 16

function stepsWithin(min: number, max: number, steps: readonly number[]): number[] {
  const ticks: number[] = []
  for (let decade = Math.floor(Math.log10(min)); decade <= Math.ceil(Math.log10(max)); decade += 1) {
    for (const step of steps) {
      const value = Number((step * 10 ** decade).toPrecision(6))
      if (value >= min && value <= max) ticks.push(value)
    }
  }
  return ticks
}

/**
 * Ticks of a logarithmic axis between two positive ends: fine steps over a decade or less, then coarser, down to one a
 * decade.
 * @param most how many there is room for
 */
export function logTicks(min: number, max: number, most: number = MOST_FINE): number[] {
  if (!(min > 0) || !(max > min)) return []
  const candidates = [FINE, COARSE, ROUGH, [1]].map((steps) => stepsWithin(min, max, steps))
  return candidates.find((ticks) => ticks.length <= most) ?? candidates.at(-1) ?? []
}

/** A tick at every whole number when the values are few of them, such as gauges or counts of chains. */
export function wholeTicks(values: readonly number[]): number[] | undefined {
  if (values.length === 0 || !values.every(Number.isInteger)) return undefined
  const least = Math.min(...values)
  const count = Math.max(...values) - least + 1
  return count <= MOST_WHOLE ? Array.from({ length: count }, (_, index) => least + index) : undefined
}
