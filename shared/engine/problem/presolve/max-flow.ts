/**
 * Maximum flow by blocking flows on levels (Dinic, Soviet Math. Dokl. 11, 1970), with levels counted from the sink
 * (so that dead ends are never entered) and each node's next arc kept through a phase. Capacities are whole numbers held
 * in doubles; no sum of a pair of opposite arcs may exceed 2^53, and then all of it is exact.
 */

/** Arc e goes from heads[e ^ 1] to heads[e]; arcs e and e ^ 1 are opposite. */
export interface Network {
  readonly nodes: number
  readonly heads: Uint32Array
  /** Arcs that leave node v: arcs[offsets[v] … offsets[v + 1] − 1]. */
  readonly offsets: Uint32Array
  readonly arcs: Uint32Array
  readonly source: number
  readonly sink: number
}

/** The arcs that leave each node, ascending. O(nodes + arcs). */
export function networkOf(nodes: number, heads: Uint32Array, source: number, sink: number): Network {
  const offsets = new Uint32Array(nodes + 1)
  for (let e = 0; e < heads.length; e++) offsets[heads[e ^ 1]! + 1]!++
  for (let v = 0; v < nodes; v++) offsets[v + 1]! += offsets[v]!
  const next = offsets.slice(0, nodes)
  const arcs = new Uint32Array(heads.length)
  for (let e = 0; e < heads.length; e++) arcs[next[heads[e ^ 1]!]!++] = e
  return { nodes, heads, offsets, arcs, source, sink }
}

const FAR = 0xffffffff

/** Distances to the sink along arcs with capacity left, up to that of the source; whether there is a way. */
function findLevels(network: Network, residual: Float64Array, levels: Uint32Array, queue: Uint32Array): boolean {
  const { heads, offsets, arcs, source, sink } = network
  levels.fill(FAR)
  levels[sink] = 0
  queue[0] = sink
  let length = 1
  for (let head = 0; head < length; head++) {
    const v = queue[head]!
    if (v === source) return true
    for (let p = offsets[v]!; p < offsets[v + 1]!; p++) {
      const e = arcs[p]!
      const u = heads[e]!
      if (levels[u] !== FAR || residual[e ^ 1] === 0) continue
      levels[u] = levels[v]! + 1
      queue[length++] = u
    }
  }
  return false
}

interface Search {
  readonly levels: Uint32Array
  /** The next arc to look at, of each node. */
  readonly next: Uint32Array
  /** Arcs from the source to where the search stands. */
  readonly path: Uint32Array
}

/** The place in the path of the first arc that is full after as much as possible was sent along it. */
function augment(residual: Float64Array, path: Uint32Array, length: number): number {
  let amount = Infinity
  for (let k = 0; k < length; k++) amount = Math.min(amount, residual[path[k]!]!)
  let full = -1
  for (let k = length - 1; k >= 0; k--) {
    const e = path[k]!
    residual[e]! -= amount
    residual[e ^ 1]! += amount
    if (residual[e] === 0) full = k
  }
  return full
}

/** Sends flow along the levels until no way along them is left. */
function block(network: Network, residual: Float64Array, { levels, next, path }: Search): void {
  const { heads, offsets, arcs, source, sink } = network
  let v = source
  let length = 0
  for (;;) {
    if (v === sink) {
      length = augment(residual, path, length)
      v = heads[path[length]! ^ 1]!
    }
    let advanced = false
    for (; next[v]! < offsets[v + 1]!; next[v]!++) {
      const e = arcs[next[v]!]!
      // A node beyond the source's level is FAR: it may not be entered.
      if (residual[e] === 0 || levels[heads[e]!]! + 1 !== levels[v]) continue
      path[length++] = e
      v = heads[e]!
      advanced = true
      break
    }
    if (advanced) continue
    if (v === source) return
    v = heads[path[--length]! ^ 1]!
    next[v]!++
  }
}

/**
 * Turns the capacities in `residual` (one a arc, whole numbers ≥ 0) into what a maximum flow leaves of them.
 * @returns false when it was asked to stop: the flow is then valid, but may not be a maximum
 */
export function sendMaximumFlow(network: Network, residual: Float64Array, shouldStop: () => boolean): boolean {
  const search: Search = {
    levels: new Uint32Array(network.nodes),
    next: new Uint32Array(network.nodes),
    path: new Uint32Array(network.nodes),
  }
  const queue = new Uint32Array(network.nodes)
  while (findLevels(network, residual, search.levels, queue)) {
    if (shouldStop()) return false
    search.next.set(network.offsets.subarray(0, network.nodes))
    block(network, residual, search)
  }
  return true
}
