import { THIN_SPACE } from '../digits'

/*
 * The longest chains that the engine needs on a machine, by size and density of the problem: which problems are tried, and
 * what is to be expected in between.
 */

export const CHAIN_LENGTH_GRID = {
  densities: [0.05, 0.1, 0.25, 0.5, 1],
  /** Smallest problem, as a share of the square root of the working qubits; each next one is `step` times as large. */
  from: 0.5,
  step: Math.SQRT2,
  /** Mean number of interactions below which a size is left out: such problems are mostly loose ends. */
  leastDegree: 2,
} as const

/** What was measured at one size and density. */
export interface MeasuredPoint {
  readonly variables: number
  readonly density: number
  readonly found: number
  readonly longestChain: { readonly median: number; readonly least: number; readonly most: number } | null
}

/**
 * Sizes to try at a density, ascending. The largest complete graph that a planar machine carries grows with the square
 * root of its qubits, so sizes are reckoned from that; none has more variables than the machine has qubits.
 */
export function sizesAt(density: number, workingQubits: number): number[] {
  const { from, step, leastDegree } = CHAIN_LENGTH_GRID
  const sizes: number[] = []
  for (let size = Math.max(4, from * Math.sqrt(workingQubits)); size <= workingQubits; size *= step) {
    const n = Math.round(size)
    if (density * (n - 1) >= leastDegree) sizes.push(n)
  }
  return sizes
}

export interface Expectation {
  readonly median: number
  readonly least: number
  readonly most: number
}

/** Either what is to be expected, or why nothing can be said. */
export type Expected =
  { readonly value: Expectation; readonly refusal: null } | { readonly value: null; readonly refusal: string }

const refused = (refusal: string): Expected => ({ value: null, refusal })
const mix = (a: number, b: number, share: number): number => a + share * (b - a)
const blend = (a: Expectation, b: Expectation, share: number): Expectation => ({
  median: mix(a.median, b.median, share),
  least: mix(a.least, b.least, share),
  most: mix(a.most, b.most, share),
})

const percent = (density: number): string => `${Number((100 * density).toPrecision(3))}${THIN_SPACE}%`

/** Between the two sizes around n at one density, evenly in log n. */
function alongSizes(points: readonly MeasuredPoint[], density: number, n: number): Expected {
  const found = points
    .filter((point) => point.density === density && point.longestChain)
    .sort((a, b) => a.variables - b.variables)
  const [first, last] = [found[0], found.at(-1)]
  if (!first || !last) return refused(`no embedding was found at density ${percent(density)}`)
  if (n < first.variables || n > last.variables)
    return refused(
      `at density ${percent(density)} embeddings were measured from ${first.variables} to ${last.variables} variables`,
    )
  const above = found.findIndex(({ variables }) => variables >= n)
  const [low, high] = [found[Math.max(0, above - 1)]!, found[above]!]
  const share =
    low === high || n === high.variables ? 1 : Math.log(n / low.variables) / Math.log(high.variables / low.variables)
  return { value: blend(low.longestChain!, high.longestChain!, share), refusal: null }
}

/**
 * The longest chain to be expected of an embedding of n variables at a density, between measured points: evenly in the
 * logarithm of n, then evenly between the densities around. Nothing is said outside of what was measured and found.
 * @param n variables, at least 1
 * @param density share of all pairs that interact, 0 … 1
 */
export function expectedLongestChain(points: readonly MeasuredPoint[], n: number, density: number): Expected {
  const densities = [...new Set(points.map((point) => point.density))].sort((a, b) => a - b)
  const [first, last] = [densities[0], densities.at(-1)]
  if (first === undefined || last === undefined) return refused('nothing was measured')
  if (!(density >= first && density <= last))
    return refused(`densities were measured from ${percent(first)} to ${percent(last)}`)
  const above = densities.find((one) => one >= density)!
  const below = densities.findLast((one) => one <= density)!
  const high = alongSizes(points, above, n)
  if (above === below || !high.value) return high
  const low = alongSizes(points, below, n)
  if (!low.value) return low
  return { value: blend(low.value, high.value, (density - below) / (above - below)), refusal: null }
}

/** The middle of a list of numbers, of the two in the middle where their number is even. */
export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b)
  const half = sorted.length >> 1
  return sorted.length % 2 ? sorted[half]! : (sorted[half - 1]! + sorted[half]!) / 2
}
