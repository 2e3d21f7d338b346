/**
 * Orders in which a sweep would eliminate a machine's qubits. Any order proves an upper bound on treewidth; a front
 * that moves over the machine line by line is as good as is known on the published families.
 */
import type { Graph } from '../../graph/graph'

/** The way a front moves over the plane. */
export type SweepDirection = 'rightwards' | 'leftwards' | 'downwards' | 'upwards'

/** Most places that positions are told apart by; beyond, neighbouring ones are taken together. */
const MOST_PLACES = 2 ** 17

/** Positions as whole numbers from 0, one for each `unit`, or coarser where that would be too many. */
function quantised(positions: Float64Array, unit: number): Uint32Array {
  let least = Infinity
  let most = -Infinity
  for (const position of positions) {
    least = Math.min(least, position)
    most = Math.max(most, position)
  }
  const step = Math.max(unit, (most - least) / (MOST_PLACES - 1))
  const places = new Uint32Array(positions.length)
  for (let i = 0; i < places.length; i++) places[i] = Math.floor((positions[i]! - least) / step)
  return places
}

/** `items` by ascending `places[item]`, equal ones in the order given (counting sort). */
function sortedBy(items: Uint32Array, places: Uint32Array): Uint32Array {
  const next = new Uint32Array(places.reduce((most, place) => Math.max(most, place), 0) + 2)
  for (const item of items) next[places[item]! + 1]!++
  for (let place = 1; place < next.length; place++) next[place]! += next[place - 1]!
  const sorted = new Uint32Array(items.length)
  for (const item of items) sorted[next[places[item]!]!++] = item
  return sorted
}

/** The vertices marked with 1, ascending. */
function marked(usable: Uint8Array): Uint32Array {
  const vertices = new Uint32Array(usable.length)
  let count = 0
  for (let v = 0; v < usable.length; v++) if (usable[v] !== 0) vertices[count++] = v
  return vertices.subarray(0, count)
}

/**
 * The usable qubits as a front passes them in strips of `strip` line spacings: in each strip first the qubits that lie
 * in the front, along it, then those that cross it and end there.
 * @param segments four numbers a qubit, as in `Fabric.segments`
 */
export function sweepOrder(
  segments: Float32Array,
  usable: Uint8Array,
  direction: SweepDirection,
  strip: number,
): Uint32Array {
  const axis = direction === 'rightwards' || direction === 'leftwards' ? 0 : 1
  const sign = direction === 'rightwards' || direction === 'downwards' ? 1 : -1
  const passed = new Float64Array(usable.length)
  const along = new Float64Array(usable.length)
  const crosses = new Uint32Array(usable.length)
  for (let q = 0; q < usable.length; q++) {
    const from = sign * segments[4 * q + axis]!
    const to = sign * segments[4 * q + 2 + axis]!
    passed[q] = Math.max(from, to)
    along[q] = segments[4 * q + 1 - axis]! + segments[4 * q + 3 - axis]!
    crosses[q] = from === to ? 0 : 1
  }
  const alongFront = sortedBy(marked(usable), quantised(along, 0.5))
  return sortedBy(sortedBy(alongFront, crosses), quantised(passed, strip))
}

/** Appends to `queue` all that is joined to its entry `from`, nearest first; returns the new length. */
function breadthFirst(graph: Graph, usable: Uint8Array, seen: Uint8Array, queue: Uint32Array, from: number): number {
  let length = from + 1
  for (let head = from; head < length; head++) {
    const v = queue[head]!
    for (let p = graph.offsets[v]!; p < graph.offsets[v + 1]!; p++) {
      const w = graph.targets[p]!
      if (usable[w] === 0 || seen[w] !== 0) continue
      seen[w] = 1
      queue[length++] = w
    }
  }
  return length
}

/**
 * The usable qubits of every part of the machine from the farthest to the nearest, seen from a qubit at the part's
 * edge (reverse breadth-first order: Cuthill & McKee 1969, George 1971, without their sorting by degree).
 */
export function farToNear(graph: Graph, usable: Uint8Array): Uint32Array {
  const queue = new Uint32Array(graph.order)
  const seen = new Uint8Array(graph.order)
  let length = 0
  for (let q = 0; q < graph.order; q++) {
    if (usable[q] === 0 || seen[q] !== 0) continue
    const from = length
    queue[from] = q
    seen[q] = 1
    // Seen from anywhere, the farthest qubit lies at an edge.
    const end = breadthFirst(graph, usable, seen, queue, from)
    for (let i = from; i < end; i++) seen[queue[i]!] = 0
    queue[from] = queue[end - 1]!
    seen[queue[from]!] = 1
    length = breadthFirst(graph, usable, seen, queue, from)
  }
  return queue.subarray(0, length).reverse()
}
