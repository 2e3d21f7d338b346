/**
 * Large cliques by branch and bound: the vertices after v in an order of least degree first hold every clique whose
 * first vertex is v, and a colouring bounds what a branch can still reach (Tomita & Seki, An efficient
 * branch-and-bound algorithm for finding a maximum clique, DMTCS 2003; Eppstein, Löffler & Strash 2010).
 */
import { degreeOf, type Graph } from '../graph/graph'
import { DegreeBuckets } from './degree-buckets'

export interface CliqueLimits {
  /** Smaller cliques are of no interest; at least 1. */
  readonly atLeast: number
  /** Words of bit rows that may be read before the largest until then is returned. */
  readonly maxWork: number
}

const DEFAULTS: CliqueLimits = { atLeast: 1, maxWork: 2_000_000 }

/** For each vertex its neighbours that outlast it while vertices of least degree are deleted. */
function laterNeighbours(graph: Graph): (v: number) => number[] {
  const { order, offsets, targets } = graph
  const buckets = new DegreeBuckets(Int32Array.from({ length: order }, (_, v) => degreeOf(graph, v)))
  const position = new Int32Array(order).fill(order)
  for (let step = 0; step < order; step++) {
    const v = buckets.leastVertex()
    buckets.remove(v)
    position[v] = step
    for (let p = offsets[v]!; p < offsets[v + 1]!; p++)
      if (position[targets[p]!] === order) buckets.change(targets[p]!, -1)
  }
  return (v) => Array.from(targets.subarray(offsets[v], offsets[v + 1])).filter((w) => position[w]! > position[v]!)
}

/** Looks for the largest clique among some vertices; indices are places in the list of these vertices. */
class BranchAndBound {
  best: number[] = []
  work = 0
  private readonly words: number
  private readonly rows: Int32Array
  private readonly chosen: number[] = []

  constructor(
    graph: Graph,
    private readonly members: readonly number[],
    private readonly atLeast: number,
    private readonly maxWork: number,
  ) {
    this.words = (members.length + 31) >>> 5
    this.rows = new Int32Array(members.length * this.words)
    const placeOf = new Map(members.map((v, i) => [v, i]))
    members.forEach((v, i) => {
      for (let p = graph.offsets[v]!; p < graph.offsets[v + 1]!; p++) {
        const j = placeOf.get(graph.targets[p]!)
        if (j !== undefined) this.rows[i * this.words + (j >>> 5)]! |= 1 << (j & 31)
      }
      this.work += degreeOf(graph, v)
    })
    if (this.work > maxWork || members.length < atLeast) return
    const all = new Int32Array(this.words)
    for (let i = 0; i < members.length; i++) all[i >>> 5]! |= 1 << (i & 31)
    this.expand(all)
  }

  /** Colours the candidates one class after the other; a clique has at most one vertex of each. */
  private colour(candidates: Int32Array): { places: number[]; colours: number[] } {
    const places: number[] = []
    const colours: number[] = []
    const left = candidates.slice()
    const open = new Int32Array(this.words)
    for (let colour = 1; left.some((word) => word !== 0); colour++) {
      open.set(left)
      for (let w = 0; w < this.words; w++)
        while (open[w] !== 0) {
          const bit = open[w]! & -open[w]!
          const place = 32 * w + 31 - Math.clz32(bit)
          left[w]! &= ~bit
          open[w]! &= ~bit
          for (let x = w; x < this.words; x++) open[x]! &= ~this.rows[place * this.words + x]!
          places.push(place)
          colours.push(colour)
        }
      this.work += this.words
    }
    this.work += places.length * this.words
    return { places, colours }
  }

  private expand(candidates: Int32Array): void {
    const { places, colours } = this.colour(candidates)
    // As many colours as vertices: all of them are joined to each other.
    if ((colours.at(-1) ?? 0) === places.length) {
      this.keep([...this.chosen, ...places])
      return
    }
    for (let i = places.length - 1; i >= 0 && this.work <= this.maxWork; i--) {
      const place = places[i]!
      if (this.chosen.length + colours[i]! < Math.max(this.atLeast, this.best.length + 1)) return
      this.chosen.push(place)
      this.expand(candidates.map((word, w) => word & this.rows[place * this.words + w]!))
      this.chosen.pop()
      candidates[place >>> 5]! &= ~(1 << (place & 31))
    }
  }

  private keep(places: readonly number[]): void {
    if (places.length >= this.atLeast && places.length > this.best.length)
      this.best = places.map((place) => this.members[place]!)
  }
}

/**
 * The largest clique found, as ascending vertices; empty when none of at least `atLeast` was. The largest of all unless
 * the work ran out; the effort is counted, so the same graph and limits always give the same answer.
 */
export function largeClique(graph: Graph, limits: Partial<CliqueLimits> = {}): number[] {
  const { atLeast, maxWork } = { ...DEFAULTS, ...limits }
  const later = laterNeighbours(graph)
  const groups = Array.from({ length: graph.order }, (_, v) => ({ v, after: later(v) }))
  groups.sort((a, b) => b.after.length - a.after.length || a.v - b.v)
  let best: number[] = []
  let work = 0
  for (const { v, after } of groups) {
    const wanted = Math.max(atLeast, best.length + 1)
    if (after.length + 1 < wanted || work > maxWork) break
    const search = new BranchAndBound(graph, after, wanted - 1, maxWork - work)
    work += search.work
    if (search.best.length + 1 >= wanted) best = [v, ...search.best]
  }
  return best.sort((a, b) => a - b)
}
