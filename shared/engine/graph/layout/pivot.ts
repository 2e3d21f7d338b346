import type { Random } from '../../random'
import type { Graph } from '../graph'
import type { Layout } from './sites'
import { symmetricEigen } from './symmetric-eigen'

export const PIVOT_DEFAULTS = {
  /** Vertices from which distances are measured. */
  pivots: 24,
} as const

/** Breadth-first distances from `source` within its connected part; other entries stay as they were. */
function distancesFrom(graph: Graph, source: number, distance: Float64Array, queue: Int32Array): void {
  const { offsets, targets } = graph
  distance.fill(-1)
  queue[0] = source
  distance[source] = 0
  let count = 1
  for (let i = 0; i < count; i++) {
    const v = queue[i]!
    const next = distance[v]! + 1
    for (let p = offsets[v]!; p < offsets[v + 1]!; p++) {
      const w = targets[p]!
      if (distance[w]! >= 0) continue
      distance[w] = next
      queue[count++] = w
    }
  }
  if (count < graph.order) throw new RangeError(`a connected graph is needed: ${count} of ${graph.order} are joined`)
}

/** Distances to pivots, each the vertex farthest from those before it; the first is farthest from a random vertex. */
function pivotDistances(graph: Graph, random: Random, count: number): Float64Array[] {
  const queue = new Int32Array(graph.order)
  const nearest = new Float64Array(graph.order)
  distancesFrom(graph, random.below(graph.order), nearest, queue)
  const columns: Float64Array[] = []
  while (columns.length < count) {
    let pivot = 0
    for (let v = 1; v < graph.order; v++) if (nearest[v]! > nearest[pivot]!) pivot = v
    if (nearest[pivot] === 0) break
    const distance = new Float64Array(graph.order)
    distancesFrom(graph, pivot, distance, queue)
    const first = columns.length === 0
    for (let v = 0; v < graph.order; v++) if (first || distance[v]! < nearest[v]!) nearest[v] = distance[v]!
    columns.push(distance)
  }
  return columns
}

/** Replaces distances by −½ their squares with the mean of every row and column taken away. */
function doubleCentre(columns: readonly Float64Array[]): void {
  const order = columns[0]?.length ?? 0
  for (const column of columns) {
    let sum = 0
    for (let v = 0; v < order; v++) sum += column[v] = -0.5 * column[v]! * column[v]!
    const mean = sum / order
    for (let v = 0; v < order; v++) column[v]! -= mean
  }
  for (let v = 0; v < order; v++) {
    let sum = 0
    for (const column of columns) sum += column[v]!
    for (const column of columns) column[v]! -= sum / columns.length
  }
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!
  return sum
}

/** Column k of the square matrix `vectors` as weights of the distance columns, for every vertex. */
function project(columns: readonly Float64Array[], vectors: Float64Array, k: number, axis: Float64Array): void {
  columns.forEach((column, i) => {
    const weight = vectors[i * columns.length + k]!
    for (let v = 0; v < axis.length; v++) axis[v]! += weight * column[v]!
  })
}

/**
 * Draws a connected graph so that distances in the plane follow those in the graph, by the two longest principal axes
 * of the vertices' distances to some pivots; linear in the graph for each pivot (Brandes & Pich, Eigensolver methods for
 * progressive multidimensional scaling of large data, GD 2006; Harel & Koren, Graph drawing by high-dimensional
 * embedding, JGAA 2004). The middle is the origin; the unit is arbitrary, the same for both axes.
 * @throws RangeError when the graph is not connected
 */
export function pivotLayout(graph: Graph, random: Random, { pivots }: { pivots: number } = PIVOT_DEFAULTS): Layout {
  const layout = { x: new Float64Array(graph.order), y: new Float64Array(graph.order) }
  if (graph.order < 2) return layout
  const columns = pivotDistances(graph, random, Math.min(pivots, graph.order))
  doubleCentre(columns)
  const size = columns.length
  const products = new Float64Array(size * size)
  for (let i = 0; i < size; i++)
    for (let j = i; j < size; j++) products[i * size + j] = products[j * size + i] = dot(columns[i]!, columns[j]!)
  const { vectors } = symmetricEigen(products, size)
  project(columns, vectors, 0, layout.x)
  if (size > 1) project(columns, vectors, 1, layout.y)
  return layout
}
