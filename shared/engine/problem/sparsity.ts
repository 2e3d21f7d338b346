import { bandwidthOf, placesOf, reverseCuthillMcKee } from '../graph/cuthill-mckee'
import { interactionGraph } from './interaction-graph'
import type { Problem } from './problem'

/** Variables as given, or so that interactions lie near the diagonal. */
export type SparsityOrder = 'given' | 'banded'

export interface SparsityOptions {
  readonly order: SparsityOrder
  /** Most bins a side; each stands for a run of places. */
  readonly bins: number
  /** Bytes that the counts may take; fewer bins are made until they do. */
  readonly budget: number
}

type Counts = Uint8Array | Uint16Array | Uint32Array

/** Interactions counted in a square raster over the places, symmetric: only the upper triangle is kept. */
export interface SparsityRaster {
  /** Bins a side. Bin q holds the places from ⌈q·n/bins⌉ up to, but not, ⌈(q + 1)·n/bins⌉. */
  readonly bins: number
  /** Interactions between the places of bins p ≤ q, row by row: see `cellOf`. */
  readonly counts: Counts
}

export interface Sparsity {
  /** order[place] is a variable. */
  readonly order: Uint32Array
  readonly raster: SparsityRaster
  /** Greatest distance from the diagonal, in places; in this order, and in the order given. */
  readonly bandwidth: number
  readonly givenBandwidth: number
  /** Interactions by their distance from the diagonal: upper ends 1, 2, 4, 8, …, the last the greatest there can be. */
  readonly distances: readonly { readonly from: number; readonly to: number; readonly count: number }[]
}

/** Where the count of bins p ≤ q stands. */
export const cellOf = (bins: number, p: number, q: number): number => p * bins - (p * (p - 1)) / 2 + (q - p)

/** The first place of bin q. */
export const firstPlaceOf = (bins: number, n: number, q: number): number => Math.ceil((q * n) / bins)

const cellsOf = (bins: number): number => (bins * (bins + 1)) / 2

/** Pairs of places in bins p and q; no place pairs with itself. */
export function pairsIn(bins: number, n: number, p: number, q: number): number {
  const [inP, inQ] = [p, q].map((bin) => firstPlaceOf(bins, n, bin + 1) - firstPlaceOf(bins, n, bin)) as [
    number,
    number,
  ]
  return p === q ? (inP * (inP - 1)) / 2 : inP * inQ
}

function countInto(problem: Problem, places: Uint32Array, bins: number): Uint32Array {
  const binOf = new Uint32Array(problem.n)
  for (let q = 0; q < bins; q++) binOf.fill(q, firstPlaceOf(bins, problem.n, q), firstPlaceOf(bins, problem.n, q + 1))
  const counts = new Uint32Array(cellsOf(bins))
  for (let k = 0; k < problem.rows.length; k++) {
    const a = binOf[places[problem.rows[k]!]!]!
    const b = binOf[places[problem.cols[k]!]!]!
    counts[a < b ? cellOf(bins, a, b) : cellOf(bins, b, a)]!++
  }
  return counts
}

function narrowest(counts: Uint32Array): Counts {
  const most = counts.reduce((a, b) => Math.max(a, b), 0)
  if (most < 2 ** 8) return Uint8Array.from(counts)
  return most < 2 ** 16 ? Uint16Array.from(counts) : counts
}

/** At most as many bins as asked for and as there are variables, fewer where the counts would not fit the budget. */
function rasterOf(problem: Problem, places: Uint32Array, { bins: asked, budget }: SparsityOptions): SparsityRaster {
  for (let bins = Math.min(asked, problem.n); ;) {
    const counts = narrowest(countInto(problem, places, bins))
    if (counts.byteLength <= budget || bins <= 1) return { bins, counts }
    // Cells grow with the square of the bins; one less where the estimate would stand still.
    bins = Math.max(1, Math.min(bins - 1, Math.floor(bins * Math.sqrt(budget / counts.byteLength))))
  }
}

function distancesOf(problem: Problem, places: Uint32Array): Sparsity['distances'] {
  const ends: number[] = []
  for (let end = 1; end < problem.n - 1; end *= 2) ends.push(end)
  if (problem.n > 1) ends.push(problem.n - 1)
  const counts = new Array<number>(ends.length).fill(0)
  for (let k = 0; k < problem.rows.length; k++) {
    const distance = Math.abs(places[problem.rows[k]!]! - places[problem.cols[k]!]!)
    counts[Math.min(ends.length - 1, distance <= 1 ? 0 : 32 - Math.clz32(distance - 1))]!++
  }
  return ends.map((to, i) => ({ from: i === 0 ? 1 : ends[i - 1]! + 1, to, count: counts[i]! }))
}

/**
 * The pattern of a problem's interactions as a raster, its bandwidth, and how far from the diagonal they lie. Tenths of
 * a second for a million interactions.
 * @throws RangeError unless bins and budget are positive
 */
export function sparsityOf(problem: Problem, options: SparsityOptions): Sparsity {
  if (!(options.bins >= 1 && options.budget >= 1)) throw new RangeError('a raster has at least one bin and one byte')
  const graph = interactionGraph(problem)
  const given = Uint32Array.from({ length: problem.n }, (_, v) => v)
  const order = options.order === 'banded' ? reverseCuthillMcKee(graph) : given
  const places = placesOf(order)
  return {
    order,
    raster: rasterOf(problem, places, options),
    bandwidth: bandwidthOf(graph, places),
    givenBandwidth: bandwidthOf(graph, given),
    distances: distancesOf(problem, places),
  }
}
