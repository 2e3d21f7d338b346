import type { Network } from './max-flow'

const UNSEEN = 0xffffffff

/** Components of the nodes looked at; a component comes after all those that it leads to. */
export interface StrongComponents {
  readonly count: number
  /** Component of each node; 0xffffffff where it was left out. */
  readonly componentOf: Uint32Array
}

/**
 * Strongly connected components along the open arcs among the nodes not left out (Tarjan, SIAM J. Comput. 1, 1972),
 * without recursion. O(nodes + arcs).
 */
export function strongComponents(network: Network, isOpen: Uint8Array, isLeftOut: Uint8Array): StrongComponents {
  const { nodes: order, heads, offsets, arcs } = network
  const componentOf = new Uint32Array(order).fill(UNSEEN)
  const seenAt = new Uint32Array(order).fill(UNSEEN)
  const lowest = new Uint32Array(order)
  const next = offsets.slice(0, order)
  const stack: number[] = []
  const path: number[] = []
  let seen = 0
  let count = 0
  const enter = (v: number): void => {
    seenAt[v] = lowest[v] = seen++
    stack.push(v)
    path.push(v)
  }
  const leave = (v: number): void => {
    path.pop()
    const parent = path[path.length - 1]
    if (parent !== undefined) lowest[parent] = Math.min(lowest[parent]!, lowest[v]!)
    if (lowest[v] !== seenAt[v]) return
    let u: number
    do {
      u = stack.pop()!
      componentOf[u] = count
    } while (u !== v)
    count++
  }
  const look = (v: number): void => {
    while (next[v]! < offsets[v + 1]!) {
      const e = arcs[next[v]!++]!
      const u = heads[e]!
      if (isOpen[e] === 0 || isLeftOut[u] === 1) continue
      if (seenAt[u] === UNSEEN) return enter(u)
      if (componentOf[u] === UNSEEN) lowest[v] = Math.min(lowest[v]!, seenAt[u]!)
    }
    leave(v)
  }
  for (let start = 0; start < order; start++) {
    if (isLeftOut[start] === 1 || seenAt[start] !== UNSEEN) continue
    enter(start)
    while (path.length > 0) look(path[path.length - 1]!)
  }
  return { count, componentOf }
}
