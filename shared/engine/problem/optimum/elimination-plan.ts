/**
 * What dynamic programming along an elimination order will meet, found out before it begins: the neighbours that each
 * variable has when its turn comes, and what time and memory the tables take.
 */
import type { Graph } from '../../graph/graph'
import { leastFillOrder } from '../treewidth'

/** A tree decomposition as an elimination order with the bags it makes. */
export interface EliminationPlan {
  /** Variables in the order in which they are eliminated. */
  readonly order: Uint32Array
  /** Per place in the order: the places of the neighbours that are left, ascending. */
  readonly scopes: readonly Uint32Array[]
  /** The most neighbours; the table of such a variable has 2^width entries. */
  readonly width: number
  /** Table entries computed or read, over all variables. */
  readonly work: number
  /** Most bytes of tables held at a time, and of choices kept for the way back. */
  readonly bytes: number
}

/** Places of the later neighbours of each place, with the fill of earlier ones. */
function scopesOf(graph: Graph, order: Uint32Array, maxWidth: number): Uint32Array[] | null {
  const placeOf = new Uint32Array(order.length)
  order.forEach((v, place) => (placeOf[v] = place))
  const later = Array.from(order, (v, place) => {
    const places = new Set<number>()
    for (let p = graph.offsets[v]!; p < graph.offsets[v + 1]!; p++) {
      const other = placeOf[graph.targets[p]!]!
      if (other > place) places.add(other)
    }
    return places
  })
  const scopes: Uint32Array[] = []
  for (const places of later) {
    if (places.size > maxWidth) return null
    const scope = Uint32Array.from(places).sort()
    // Only the first of them needs to be told: the clique of the others reaches each when its turn comes.
    for (const other of scope.subarray(1)) later[scope[0]!]!.add(other)
    scopes.push(scope)
  }
  return scopes
}

const BYTES_AN_ENTRY = 8

function costs(scopes: readonly Uint32Array[]): Pick<EliminationPlan, 'width' | 'work' | 'bytes'> {
  const held = new Float64Array(scopes.length)
  let width = 0
  let work = 0
  let bytes = 0
  let choices = 0
  let tables = 0
  scopes.forEach((scope, place) => {
    const size = 2 ** scope.length
    width = Math.max(width, scope.length)
    work += 2 * size
    choices += size / 8
    // The new table and its twin for the other value stand beside those that came to this variable.
    bytes = Math.max(bytes, tables + 2 * BYTES_AN_ENTRY * size + choices)
    tables -= held[place]!
    if (scope.length === 0) return
    // Read once more where it is used, at the size of the table it goes into.
    work += 2 * 2 ** scopes[scope[0]!]!.length
    held[scope[0]!]! += BYTES_AN_ENTRY * size
    tables += BYTES_AN_ENTRY * size
  })
  return { width, work, bytes }
}

/** An order that takes a vertex of fewest neighbours each time, for sparse graphs of any size. */
function leastDegreeOrder(graph: Graph, maxWidth: number): Uint32Array | null {
  const { order: count, offsets, targets } = graph
  const beside = Array.from({ length: count }, (_, v) => new Set(targets.subarray(offsets[v]!, offsets[v + 1]!)))
  const waiting: number[][] = Array.from({ length: maxWidth + 1 }, () => [])
  beside.forEach(({ size }, v) => waiting[size]?.push(v))
  const done = new Uint8Array(count)
  const order = new Uint32Array(count)
  let degree = 0
  for (let k = 0; k < count; k++) {
    let v = -1
    while (v < 0) {
      while (degree <= maxWidth && waiting[degree]!.length === 0) degree++
      if (degree > maxWidth) return null
      const next = waiting[degree]!.pop()!
      // Entries of before its degree changed are stale.
      if (done[next] === 0 && beside[next]!.size === degree) v = next
    }
    done[v] = 1
    order[k] = v
    const around = [...beside[v]!]
    for (const u of around) {
      beside[u]!.delete(v)
      for (const w of around) if (w !== u) beside[u]!.add(w)
      waiting[beside[u]!.size]?.push(u)
      degree = Math.min(degree, beside[u]!.size)
    }
  }
  return order
}

/**
 * A plan for the graph by least fill, by least degree where the graph is too large for that; null where it would be
 * wider than `maxWidth`.
 */
export function planElimination(graph: Graph, maxWidth: number): EliminationPlan | null {
  const byFill = leastFillOrder(graph)
  if (byFill && byFill.width > maxWidth) return null
  const order = byFill?.order ?? leastDegreeOrder(graph, maxWidth)
  const scopes = order && scopesOf(graph, order, maxWidth)
  return scopes && order ? { order, scopes, ...costs(scopes) } : null
}
