import type { Graph } from '../graph/graph'
import { annealPlacement } from '../graph/layout/anneal'
import { packParts } from '../graph/layout/pack'
import type { Random } from '../random'

/** Estimated qubits that a variable with so many interactions takes, itself included. */
export const estimatedQubits = (degree: number): number => 0.6 * degree + 1

/** How many sites there are, and how long to work on it. */
export interface PlacementOptions {
  readonly columns: number
  readonly rows: number
  /** Factor on the number of annealing moves; 0 leaves them out. */
  readonly effort: number
}

/** Where each variable is to go, as shares of the width and height of the region. */
export interface Placement {
  readonly x: Float32Array
  readonly y: Float32Array
}

/**
 * Places variables on the sites of a grid, at most one a site, so that those that interact are near each other.
 * Returns by variable the middle of its site, in (0, 1) × (0, 1); NaN for variables that are left out.
 * @param vertices the variables to place; null for all
 * @param shouldStop asked between temperatures; what has been reached by then is returned
 * @throws RangeError when there are more variables than sites
 */
export function placeProblem(
  problem: Graph,
  vertices: Int32Array | null,
  random: Random,
  { columns, rows, effort }: PlacementOptions,
  shouldStop: () => boolean,
): Placement {
  const kept = new Uint8Array(problem.order).fill(vertices ? 0 : 1)
  vertices?.forEach((v) => (kept[v] = 1))
  const start = packParts(problem, kept, columns, rows, random)
  const { column, row } = annealPlacement(start.graph, start.sites, random, effort, shouldStop).sites
  const x = new Float32Array(problem.order).fill(NaN)
  const y = new Float32Array(problem.order).fill(NaN)
  start.vertices.forEach((v, i) => {
    x[v] = (column[i]! + 0.5) / columns
    y[v] = (row[i]! + 0.5) / rows
  })
  return { x, y }
}
