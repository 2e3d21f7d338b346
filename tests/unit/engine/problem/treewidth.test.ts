import { describe, expect, it } from 'vitest'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import { sizeOf } from '../../../../shared/engine/graph/graph'
import { treewidthUpperBound } from '../../../../shared/engine/problem/treewidth'
import { createRandom, type Random } from '../../../../shared/engine/random'

function randomEdges(random: Random, order: number, density: number): number[] {
  const ends: number[] = []
  for (let a = 0; a < order; a++) for (let b = a + 1; b < order; b++) if (random.float() < density) ends.push(a, b)
  return ends
}

/** Elimination by least fill on sets, every count made afresh; ties by degree, then number. */
function leastFillByRecounting(order: number, ends: readonly number[]): number {
  const around = Array.from({ length: order }, () => new Set<number>())
  for (let k = 0; k < ends.length; k += 2) {
    around[ends[k]!]!.add(ends[k + 1]!)
    around[ends[k + 1]!]!.add(ends[k]!)
  }
  const left = new Set(around.keys())
  let bound = 0
  while (left.size > 0) {
    const ranked = [...left].map((v) => {
      const near = [...around[v]!]
      const missing = near.flatMap((a, i) => near.slice(i + 1).filter((b) => !around[a]!.has(b)))
      return { v, near, fill: missing.length }
    })
    ranked.sort((p, q) => p.fill - q.fill || p.near.length - q.near.length || p.v - q.v)
    const { v, near } = ranked[0]!
    bound = Math.max(bound, near.length)
    for (const a of near) {
      for (const b of near) if (a !== b) around[a]!.add(b)
      around[a]!.delete(v)
    }
    left.delete(v)
  }
  return bound
}

/** Exact treewidth over all subsets (Bodlaender et al., On exact algorithms for treewidth, TALG 9, 2012). */
function exactTreewidth(order: number, ends: readonly number[]): number {
  const near = new Array<number>(order).fill(0)
  for (let k = 0; k < ends.length; k += 2) {
    near[ends[k]!]! |= 1 << ends[k + 1]!
    near[ends[k + 1]!]! |= 1 << ends[k]!
  }
  /** Vertices outside `gone` and other than v that v reaches through `gone`. */
  const reach = (gone: number, v: number): number => {
    let inside = 1 << v
    for (let grown = -1; grown !== inside;) {
      grown = inside
      for (let u = 0; u < order; u++) if ((inside >> u) & 1) inside |= near[u]! & (gone | (1 << v))
    }
    let border = 0
    for (let u = 0; u < order; u++) if ((inside >> u) & 1) border |= near[u]!
    border &= ~(gone | (1 << v))
    return Array.from({ length: order }, (_, u) => (border >> u) & 1).reduce((sum, bit) => sum + bit, 0)
  }
  const best = new Array<number>(2 ** order).fill(0)
  for (let set = 1; set < 2 ** order; set++) {
    best[set] = Infinity
    for (let v = 0; v < order; v++)
      if ((set >> v) & 1) {
        const rest = set & ~(1 << v)
        best[set] = Math.min(best[set]!, Math.max(best[rest]!, reach(rest, v)))
      }
  }
  return best[2 ** order - 1]!
}

const bound = (order: number, ends: readonly number[]): number | null =>
  treewidthUpperBound(graphFromEdges(order, ends))

describe('treewidthUpperBound', () => {
  it('is exact for trees, cycles, cliques and k-trees', () => {
    const random = createRandom(4)
    const tree = Array.from({ length: 59 }, (_, i) => [i + 1, random.below(i + 1)]).flat()
    const cycle = Array.from({ length: 40 }, (_, i) => [i, (i + 1) % 40]).flat()
    expect(bound(60, tree)).toBe(1)
    expect(bound(40, cycle)).toBe(2)
    expect(bound(9, randomEdges(random, 9, 1))).toBe(8)
    expect(bound(3, [])).toBe(0)
    expect(bound(0, [])).toBe(0)
    // A k-tree: each new vertex joins a clique of size k. Chordal, so elimination without fill exists; treewidth k.
    const k = 4
    const cliques = [[0, 1, 2, 3]]
    const ends = randomEdges(random, k, 1)
    for (let v = k; v < 70; v++) {
      const base = cliques[random.below(cliques.length)]!
      for (const u of base) ends.push(u, v)
      for (const left of base) cliques.push([...base.filter((u) => u !== left), v])
    }
    expect(bound(70, ends)).toBe(k)
  })

  it('equals least-fill elimination with every count made afresh', () => {
    const random = createRandom(6)
    for (let trial = 0; trial < 60; trial++) {
      const order = 1 + random.below(45)
      const ends = randomEdges(random, order, random.float() * 0.4)
      expect(bound(order, ends)).toBe(leastFillByRecounting(order, ends))
    }
  })

  it('is never below the exact treewidth', () => {
    const random = createRandom(10)
    for (let trial = 0; trial < 25; trial++) {
      const ends = randomEdges(random, 9, 0.2 + 0.5 * random.float())
      expect(bound(9, ends)).toBeGreaterThanOrEqual(exactTreewidth(9, ends))
    }
  })

  it('gives no bound beyond its limits', () => {
    expect(bound(2049, [0, 1])).toBeNull()
    const graph = graphFromEdges(40, randomEdges(createRandom(1), 40, 0.5))
    expect(treewidthUpperBound(graph, { maxOrder: 40, maxWork: 100 })).toBeNull()
    // Enough for the first counts (two words for each end of an edge), not for what follows.
    expect(treewidthUpperBound(graph, { maxOrder: 40, maxWork: 4 * sizeOf(graph) })).toBeNull()
    expect(treewidthUpperBound(graph, { maxOrder: 39, maxWork: 1e9 })).toBeNull()
    expect(treewidthUpperBound(graph, { maxOrder: 40, maxWork: 1e9 })).not.toBeNull()
  })
})
