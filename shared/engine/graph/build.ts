import type { Graph } from './graph'

/** Sorted keys a·order + b (a < b) of the distinct edges; exact for order ≤ 2²⁶. */
function distinctKeys(order: number, ends: ArrayLike<number>): Float64Array {
  const keys = new Float64Array(ends.length >> 1)
  for (let k = 0; k < keys.length; k++) {
    const a = ends[2 * k]!
    const b = ends[2 * k + 1]!
    if (!(Number.isInteger(a) && Number.isInteger(b)) || a < 0 || b < 0 || a >= order || b >= order)
      throw new RangeError(`edge ${k} joins ${a} and ${b}, outside 0 … ${order - 1}`)
    if (a === b) throw new RangeError(`edge ${k} joins ${a} to itself`)
    keys[k] = a < b ? a * order + b : b * order + a
  }
  keys.sort()
  let kept = 0
  for (let k = 0; k < keys.length; k++) if (k === 0 || keys[k] !== keys[k - 1]) keys[kept++] = keys[k]!
  return keys.subarray(0, kept)
}

/**
 * Builds the compact graph of `order` vertices from a flat list of edge ends (a0, b0, a1, b1, …), in any order and
 * direction; repeated edges are kept once.
 * @throws RangeError for a loop or an end outside 0 … order − 1
 */
export function graphFromEdges(order: number, ends: ArrayLike<number>): Graph {
  if (order > 2 ** 26) throw new RangeError(`a graph has at most ${2 ** 26} vertices, not ${order}`)
  const keys = distinctKeys(order, ends)
  const sorted = new Uint32Array(2 * keys.length)
  for (let k = 0; k < keys.length; k++) {
    const a = Math.floor(keys[k]! / order)
    sorted[2 * k] = a
    sorted[2 * k + 1] = keys[k]! - a * order
  }
  return graphFromSortedEdges(order, sorted)
}

/**
 * Builds the compact graph from edge ends that are already distinct, each with its lower end first, sorted by first
 * end and then second; `sorted` becomes part of the graph. Linear time, unchecked: for lists taken from a `Graph`.
 */
export function graphFromSortedEdges(order: number, sorted: Uint32Array): Graph {
  const offsets = new Uint32Array(order + 1)
  for (let slot = 0; slot < sorted.length; slot++) offsets[sorted[slot]! + 1]!++
  for (let v = 0; v < order; v++) offsets[v + 1]! += offsets[v]!
  return fillSlots(sorted, offsets)
}

/** Fills neighbour slots: all lower neighbours of a vertex first (edges sorted by first end), then the higher ones. */
function fillSlots(ends: Uint32Array, offsets: Uint32Array): Graph {
  const order = offsets.length - 1
  const targets = new Uint32Array(ends.length)
  const edgeIds = new Uint32Array(ends.length)
  const next = offsets.slice(0, order)
  const size = ends.length / 2
  for (let k = 0; k < size; k++) {
    const slot = next[ends[2 * k + 1]!]!++
    targets[slot] = ends[2 * k]!
    edgeIds[slot] = k
  }
  for (let k = 0; k < size; k++) {
    const slot = next[ends[2 * k]!]!++
    targets[slot] = ends[2 * k + 1]!
    edgeIds[slot] = k
  }
  return { order, ends, offsets, targets, edgeIds }
}

/** The edge between a and b, or −1; binary search over the neighbours of a. */
export function edgeBetween(graph: Graph, a: number, b: number): number {
  let low = graph.offsets[a]!
  let high = graph.offsets[a + 1]!
  while (low < high) {
    const middle = (low + high) >> 1
    if (graph.targets[middle]! < b) low = middle + 1
    else high = middle
  }
  return low < graph.offsets[a + 1]! && graph.targets[low] === b ? graph.edgeIds[low]! : -1
}
