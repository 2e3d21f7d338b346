/**
 * The compact undirected graph that every engine topic works on (CSR).
 * Vertices are dense indices 0 … order − 1; there are no loops and no parallel edges.
 */
export interface Graph {
  /** Number of vertices. */
  readonly order: number
  /** Edge k joins ends[2k] < ends[2k + 1]; sorted by first end, then second. Length 2·size. */
  readonly ends: Uint32Array
  /** Neighbours of v are targets[offsets[v] … offsets[v + 1] − 1], ascending. Length order + 1. */
  readonly offsets: Uint32Array
  readonly targets: Uint32Array
  /** edgeIds[p] is the edge that slot p of `targets` belongs to. */
  readonly edgeIds: Uint32Array
}

/** Number of edges. */
export const sizeOf = (graph: Graph): number => graph.ends.length / 2

/** Number of neighbours of vertex v. */
export const degreeOf = (graph: Graph, v: number): number => graph.offsets[v + 1]! - graph.offsets[v]!
