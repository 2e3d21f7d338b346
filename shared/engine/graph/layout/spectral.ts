import { createRandom } from '../../random'
import type { Graph } from '../graph'
import type { Layout } from './sites'
import { symmetricEigen } from './symmetric-eigen'

export interface SpectralOptions {
  /** Rounds of filtering. */
  readonly rounds: number
  /** Degree of the filter for n vertices: degreeBase + degreeByRoot·√n. */
  readonly degreeBase: number
  readonly degreeByRoot: number
}

export const SPECTRAL_DEFAULTS: SpectralOptions = { rounds: 2, degreeBase: 60, degreeByRoot: 2 }

/**
 * Most that a filter magnifies eigenvalue 0. Beyond it, what rounding leaves of the constant vector would outgrow the
 * wanted ones, and those would run together.
 */
const LARGEST_GROWTH = 1e7

/** Vectors that are iterated together, interleaved: entry k of vertex v is block[4v + k]. The kernels are unrolled. */
const WIDTH = 4

/** Below this share of a vector's length that is left after projection it counts as dependent on the others. */
const DEPENDENT = 1e-9

/** Anderson & Morley's bound on the Laplacian's eigenvalues, Σ of the degrees at an edge, with room for rounding. */
function eigenvalueBound({ ends, offsets }: Graph): number {
  let most = 0
  for (let k = 0; k < ends.length; k += 2) {
    const [a, b] = [ends[k]!, ends[k + 1]!]
    most = Math.max(most, offsets[a + 1]! - offsets[a]! + offsets[b + 1]! - offsets[b]!)
  }
  return 1.01 * most
}

/** out = factor·(L − shift)·block − back·out, for the unnormalised Laplacian L of the graph. */
function applyShifted(
  { order, offsets, targets }: Graph,
  block: Float64Array,
  out: Float64Array,
  shift: number,
  factor: number,
  back: number,
): void {
  for (let v = 0; v < order; v++) {
    const end = offsets[v + 1]!
    const at = WIDTH * v
    const own = end - offsets[v]! - shift
    let s0 = own * block[at]!
    let s1 = own * block[at + 1]!
    let s2 = own * block[at + 2]!
    let s3 = own * block[at + 3]!
    for (let p = offsets[v]!; p < end; p++) {
      const from = WIDTH * targets[p]!
      s0 -= block[from]!
      s1 -= block[from + 1]!
      s2 -= block[from + 2]!
      s3 -= block[from + 3]!
    }
    out[at] = factor * s0 - back * out[at]!
    out[at + 1] = factor * s1 - back * out[at + 1]!
    out[at + 2] = factor * s2 - back * out[at + 2]!
    out[at + 3] = factor * s3 - back * out[at + 3]!
  }
}

/**
 * Multiplies what `block` holds of eigenvectors in [cut, bound] down and of those below `cut` up, by a Chebyshev
 * polynomial of at most the given degree, scaled to 1 at eigenvalue 0. Returns the result; both arrays are overwritten.
 */
function filter(graph: Graph, block: Float64Array, spare: Float64Array, cut: number, bound: number, degree: number) {
  const half = (bound - cut) / 2
  const centre = (bound + cut) / 2
  const steps = Math.min(degree, Math.ceil(Math.acosh(LARGEST_GROWTH) / Math.acosh(centre / half)))
  let sigma = -half / centre
  const tau = 2 / sigma
  let [previous, current] = [block, spare]
  applyShifted(graph, previous, current, centre, sigma / half, 0)
  for (let k = 2; k <= steps; k++) {
    const next = 1 / (tau - sigma)
    applyShifted(graph, current, previous, centre, (2 * next) / half, sigma * next)
    ;[previous, current] = [current, previous]
    sigma = next
  }
  return current
}

function dotOf(a: Float64Array, i: number, b: Float64Array, j: number): number {
  let sum = 0
  for (let at = 0; at < a.length; at += WIDTH) sum += a[at + i]! * b[at + j]!
  return sum
}

/** Takes the mean and the vectors before it away from vector k. Returns the share of its length that is left. */
function project(block: Float64Array, k: number): number {
  const before = Math.sqrt(dotOf(block, k, block, k))
  let sum = 0
  for (let at = k; at < block.length; at += WIDTH) sum += block[at]!
  const mean = (sum * WIDTH) / block.length
  for (let at = k; at < block.length; at += WIDTH) block[at]! -= mean
  for (let j = 0; j < k; j++) {
    const along = dotOf(block, k, block, j)
    for (let at = 0; at < block.length; at += WIDTH) block[at + k]! -= along * block[at + j]!
  }
  const after = Math.sqrt(dotOf(block, k, block, k))
  for (let at = k; after > 0 && at < block.length; at += WIDTH) block[at]! /= after
  return before > 0 ? after / before : 0
}

/** Makes the vectors orthonormal and orthogonal to the constant one; dependent ones are replaced by arbitrary ones. */
function orthonormalise(block: Float64Array): void {
  const random = createRandom(block.length)
  for (let k = 0; k < WIDTH; k++) {
    while (project(block, k) < DEPENDENT)
      for (let at = k; at < block.length; at += WIDTH) block[at] = random.float() - 0.5
    project(block, k)
  }
}

/** Turns the orthonormal vectors into the approximate eigenvectors that they span, in ascending order; returns the values. */
function rayleighRitz(graph: Graph, block: Float64Array, spare: Float64Array): Float64Array {
  spare.fill(0)
  applyShifted(graph, block, spare, 0, -1, 0)
  const products = new Float64Array(WIDTH * WIDTH)
  for (let i = 0; i < WIDTH; i++)
    for (let j = i; j < WIDTH; j++) products[i * WIDTH + j] = products[j * WIDTH + i] = dotOf(block, i, spare, j)
  const { values, vectors } = symmetricEigen(products, WIDTH)
  const turned = new Float64Array(WIDTH)
  for (let at = 0; at < block.length; at += WIDTH) {
    for (let k = 0; k < WIDTH; k++) {
      turned[k] = 0
      for (let i = 0; i < WIDTH; i++) turned[k]! += block[at + i]! * vectors[i * WIDTH + k]!
    }
    block.set(turned, at)
  }
  return values.map((value) => -value)
}

/** The two axes and two products of them, which resemble the next vibrations of a plate. */
function startBlock({ x, y }: Layout): Float64Array {
  const block = new Float64Array(WIDTH * x.length)
  for (let v = 0; v < x.length; v++) {
    const at = WIDTH * v
    block[at] = x[v]!
    block[at + 1] = y[v]!
    block[at + 2] = x[v]! * y[v]!
    block[at + 3] = x[v]! * x[v]! - y[v]! * y[v]!
  }
  return block
}

/**
 * Approximate eigenvectors of a connected graph's unnormalised Laplacian with the smallest eigenvalues above 0,
 * ascending, each of length 1: Chebyshev-filtered subspace iteration (Zhou, Saad, Tiago & Chelikowsky, Self-consistent
 * field calculations using Chebyshev-filtered subspace iteration, J. Comput. Phys. 219:172, 2006) from a drawing of the
 * graph. O(edges·√vertices) a round. None for graphs of fewer than six vertices.
 */
export function lowestModes(graph: Graph, start: Layout, options = SPECTRAL_DEFAULTS): Float64Array[] {
  if (graph.order < WIDTH + 2) return []
  const bound = eigenvalueBound(graph)
  const degree = Math.round(options.degreeBase + options.degreeByRoot * Math.sqrt(graph.order))
  let block: Float64Array = startBlock(start)
  let spare: Float64Array = new Float64Array(block.length)
  orthonormalise(block)
  let values = rayleighRitz(graph, block, spare)
  for (let round = 0; round < options.rounds; round++) {
    spare.fill(0)
    const filtered = filter(graph, block, spare, Math.min(values[WIDTH - 1]!, bound / 2), bound, degree)
    if (filtered === spare) [block, spare] = [spare, block]
    orthonormalise(block)
    values = rayleighRitz(graph, block, spare)
  }
  return Array.from({ length: WIDTH }, (_, k) => block.filter((_, at) => at % WIDTH === k))
}

/**
 * Drawings of a connected graph by its lowest modes: the first against the second, and against the third and fourth,
 * one of which runs across where the graph is much longer than wide. None for graphs of fewer than six vertices.
 */
export function spectralLayouts(graph: Graph, start: Layout, options = SPECTRAL_DEFAULTS): Layout[] {
  const [x, ...others] = lowestModes(graph, start, options)
  return x ? others.map((y) => ({ x, y })) : []
}
