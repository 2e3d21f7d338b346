/**
 * Signs of the couplings of an Ising problem. A coupling below zero is satisfied by equal spins, one above by opposite
 * spins; where all can be satisfied at once the couplings are *balanced* (Harary, On the notion of balance of a signed
 * graph, Michigan Math. J. 2, 1953), else the problem is frustrated (Toulouse, Commun. Phys. 2, 1977).
 */
import { degreeOf, type Graph } from '../graph/graph'

const DEFAULTS = {
  /** Neighbours that the count of triangles may look at: a few tenths of a second. */
  maxWork: 40_000_000,
}

/** Whether all couplings can be satisfied at once; always so without cycles. Linear time. */
export function isBalanced(graph: Graph, couplings: ArrayLike<number>): boolean {
  const { order, offsets, targets, edgeIds } = graph
  const spin = new Int8Array(order)
  const queue = new Uint32Array(order)
  for (let start = 0; start < order; start++) {
    if (spin[start] !== 0) continue
    spin[start] = 1
    queue[0] = start
    for (let head = 0, length = 1; head < length; head++) {
      const v = queue[head]!
      for (let p = offsets[v]!; p < offsets[v + 1]!; p++) {
        const u = targets[p]!
        const wanted = couplings[edgeIds[p]!]! < 0 ? spin[v]! : -spin[v]!
        if (spin[u] === 0) {
          spin[u] = wanted
          queue[length++] = u
        } else if (spin[u] !== wanted) return false
      }
    }
  }
  return true
}

/** Triangles of interactions, and those of them in which one of the three couplings cannot be satisfied. */
export interface Triangles {
  readonly count: number
  readonly frustrated: number
}

/**
 * All triangles, counted through neighbours that come later by degree, in O(edges^1.5); null where that would be too
 * much work. The effort is counted, not timed.
 */
export function triangles(graph: Graph, couplings: ArrayLike<number>, maxWork = DEFAULTS.maxWork): Triangles | null {
  const { order, offsets, targets, edgeIds } = graph
  const isLater = (u: number, v: number): boolean =>
    degreeOf(graph, u) - degreeOf(graph, v) > 0 || (degreeOf(graph, u) === degreeOf(graph, v) && u > v)
  const edgeTo = new Int32Array(order).fill(-1)
  let [count, frustrated, work] = [0, 0, 0]
  for (let v = 0; v < order; v++) {
    for (let p = offsets[v]!; p < offsets[v + 1]!; p++) if (isLater(targets[p]!, v)) edgeTo[targets[p]!] = edgeIds[p]!
    for (let p = offsets[v]!; p < offsets[v + 1]!; p++) {
      const u = targets[p]!
      if (!isLater(u, v)) continue
      work += degreeOf(graph, u)
      if (work > maxWork) return null
      for (let q = offsets[u]!; q < offsets[u + 1]!; q++) {
        const third = edgeTo[targets[q]!]!
        if (third < 0 || !isLater(targets[q]!, u)) continue
        count++
        const negative = [edgeIds[p]!, edgeIds[q]!, third].filter((e) => couplings[e]! < 0).length
        if (negative % 2 === 0) frustrated++
      }
    }
    for (let p = offsets[v]!; p < offsets[v + 1]!; p++) edgeTo[targets[p]!] = -1
  }
  return { count, frustrated }
}
