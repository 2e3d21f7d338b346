/**
 * Cliques of a graph that share no edge, and nearly complete sets grown from them. Greedy: vertices by ascending degree,
 * since the neighbourhood of one of low degree is most nearly the union of its cliques; its first partner is the one
 * that it shares most neighbours with, the next ones those with most neighbours among the candidates left.
 */
import { degreeOf, sizeOf, type Graph } from '../../graph/graph'

export const CLIQUE_DEFAULTS = {
  /** Fewest members. */
  least: 3,
  /** Share of a set's members that a vertex outside must be joined to for joining the set. */
  joined: 2 / 3,
}

export interface CliqueCover {
  /** Members of each set, ascending. */
  readonly sets: number[][]
  /** Edges inside each set: all its pairs, less those that lack. */
  readonly edges: number[]
  /** List entries read. */
  readonly work: number
  /** Whether every edge was looked at before the work was spent. */
  readonly complete: boolean
}

class Cover {
  readonly sets: number[][] = []
  readonly edges: number[] = []
  work = 0
  /** 1 for edges in a set, or in none that could be. */
  private readonly spent: Uint8Array
  /** Rounds in which a vertex was marked as a candidate. */
  private readonly mark: Int32Array
  private readonly hits: Int32Array
  private round = 0

  constructor(private readonly graph: Graph) {
    this.spent = new Uint8Array(sizeOf(graph))
    this.mark = new Int32Array(graph.order)
    this.hits = new Int32Array(graph.order)
  }

  freeNeighbours(v: number): number[] {
    const { offsets, targets, edgeIds } = this.graph
    const found: number[] = []
    for (let p = offsets[v]!; p < offsets[v + 1]!; p++) if (this.spent[edgeIds[p]!] === 0) found.push(targets[p]!)
    this.work += degreeOf(this.graph, v)
    return found
  }

  private markAll(vertices: readonly number[]): number {
    this.round++
    for (const v of vertices) this.mark[v] = this.round
    return this.round
  }

  /** The candidate with most free neighbours among the candidates, and those neighbours; the first of several. */
  private bestOf(candidates: readonly number[]): { vertex: number; shared: number[] } {
    const round = this.markAll(candidates)
    let best = { vertex: -1, shared: [] as number[] }
    for (const v of candidates) {
      const shared = this.freeNeighbours(v).filter((u) => this.mark[u] === round)
      if (best.vertex < 0 || shared.length > best.shared.length) best = { vertex: v, shared }
    }
    return best
  }

  /** A maximal clique of free edges around v; two members where no triangle is left there. */
  cliqueAround(v: number, neighbours: readonly number[]): number[] {
    const clique = [v]
    for (let candidates = neighbours; candidates.length > 0;) {
      const { vertex, shared } = this.bestOf(candidates)
      clique.push(vertex)
      candidates = shared
    }
    return clique
  }

  /** Takes in, one by one, vertices joined to most members, best first. */
  extend(members: number[], joined: number): void {
    const seen = new Set<number>()
    const isMember = new Set(members)
    const addHits = (member: number): void => {
      for (const u of this.freeNeighbours(member)) {
        this.hits[u]!++
        seen.add(u)
      }
    }
    members.forEach(addHits)
    for (;;) {
      let best = -1
      for (const u of seen)
        if (
          !isMember.has(u) &&
          (best < 0 || this.hits[u]! > this.hits[best]! || (this.hits[u] === this.hits[best] && u < best))
        )
          best = u
      this.work += seen.size
      if (best < 0 || this.hits[best]! < joined * members.length) break
      members.push(best)
      isMember.add(best)
      addHits(best)
    }
    for (const u of seen) this.hits[u] = 0
  }

  take(members: number[]): void {
    const round = this.markAll(members)
    const { offsets, targets, edgeIds } = this.graph
    let inside = 0
    for (const v of members)
      for (let p = offsets[v]!; p < offsets[v + 1]!; p++) {
        if (this.mark[targets[p]!] !== round || this.spent[edgeIds[p]!] === 1) continue
        this.spent[edgeIds[p]!] = 1
        inside++
      }
    this.sets.push(members.sort((a, b) => a - b))
    this.edges.push(inside)
  }

  /** No set is left around v. */
  giveUp(v: number): void {
    const { offsets, edgeIds } = this.graph
    for (let p = offsets[v]!; p < offsets[v + 1]!; p++) this.spent[edgeIds[p]!] = 1
  }
}

/**
 * Covers the graph's edges by cliques of three vertices or more that share no edge, each widened by vertices joined to
 * two thirds of its members. Edges that fit no such set are left out.
 * @param maxWork list entries that may be read; what was found until then is kept
 */
export function coverByCliques(graph: Graph, maxWork: number, options = CLIQUE_DEFAULTS): CliqueCover {
  const cover = new Cover(graph)
  const byDegree = Uint32Array.from({ length: graph.order }, (_, v) => v).sort(
    (a, b) => degreeOf(graph, a) - degreeOf(graph, b) || a - b,
  )
  let complete = true
  for (const v of byDegree) {
    for (let left = cover.freeNeighbours(v); left.length >= options.least - 1; left = cover.freeNeighbours(v)) {
      if (cover.work > maxWork) {
        complete = false
        break
      }
      const members = cover.cliqueAround(v, left)
      if (members.length < options.least) break
      cover.extend(members, options.joined)
      cover.take(members)
    }
    if (!complete) break
    cover.giveUp(v)
  }
  return { sets: cover.sets, edges: cover.edges, work: cover.work, complete }
}
