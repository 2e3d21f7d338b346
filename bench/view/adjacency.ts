export interface Adjacency {
  /** Neighbours of qubit q are items[starts[q] … starts[q + 1] − 1]. */
  readonly starts: Uint32Array
  readonly items: Uint32Array
}

export function adjacency(order: number, ends: Uint32Array): Adjacency {
  const starts = new Uint32Array(order + 1)
  for (const end of ends) starts[end + 1]!++
  for (let q = 0; q < order; q++) starts[q + 1]! += starts[q]!
  const items = new Uint32Array(ends.length)
  const next = starts.slice()
  for (let c = 0; c < ends.length; c += 2) {
    items[next[ends[c]!]!++] = ends[c + 1]!
    items[next[ends[c + 1]!]!++] = ends[c]!
  }
  return { starts, items }
}
