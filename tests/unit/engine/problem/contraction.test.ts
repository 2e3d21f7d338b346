import { describe, expect, it } from 'vitest'
import { Contraction } from '../../../../shared/engine/problem/contraction'
import type { Graph } from '../../../../shared/engine/graph/graph'
import { createRandom } from '../../../../shared/engine/random'
import { completeGraph, randomGraph } from '../../../fixtures/graphs'

/** Neighbours of each vertex as sets; contracts v into the neighbour that shares fewest, of equals of least degree. */
class BySets {
  readonly beside: Map<number, Set<number>>

  constructor(graph: Graph) {
    this.beside = new Map(
      Array.from({ length: graph.order }, (_, v) => [
        v,
        new Set(graph.targets.slice(graph.offsets[v], graph.offsets[v + 1])),
      ]),
    )
  }

  contract(v: number): void {
    const around = this.beside.get(v)!
    this.beside.delete(v)
    if (around.size === 0) return
    const shared = (w: number): number => [...around].filter((x) => this.beside.get(w)!.has(x)).length
    const fewest = Math.min(...[...around].map(shared))
    const kept = this.degrees().length
    for (const w of around) this.beside.get(w)!.delete(v)
    const into = [...around].find((w) => shared(w) === fewest)!
    for (const w of around) {
      if (w === into) continue
      this.beside.get(w)!.add(into)
      this.beside.get(into)!.add(w)
    }
    expect(this.degrees()).toHaveLength(kept)
  }

  degrees(): number[] {
    return [...this.beside.values()].map(({ size }) => size).sort((a, b) => a - b)
  }

  edges(): number {
    return this.degrees().reduce((sum, degree) => sum + degree, 0) / 2
  }
}

describe('Contraction', () => {
  it('loses with every step one edge and one for each common neighbour, the fewest possible', () => {
    const random = createRandom(7)
    for (let round = 0; round < 80; round++) {
      const graph = randomGraph(3 + random.below(20), 0.1 + 0.7 * random.float(), random)
      const contraction = new Contraction(graph)
      const sets = new BySets(graph)
      // Only as long as both pick vertices that lead to the same counts; ties make them part afterwards.
      const v = contraction.buckets.leastVertex()
      contraction.contractLeast(Infinity)
      sets.contract(v)
      expect(contraction.edges).toBe(sets.edges())
      expect(contraction.vertices).toBe(sets.beside.size)
    }
  })

  it('counts distinct neighbours and edges alike down to the last vertex', () => {
    const random = createRandom(17)
    for (let round = 0; round < 60; round++) {
      const graph = randomGraph(2 + random.below(30), random.float(), random)
      const contraction = new Contraction(graph)
      const alive = new Set(Array.from({ length: graph.order }, (_, v) => v))
      while (contraction.vertices > 0) {
        const { degree } = contraction.buckets
        const sum = [...alive].reduce((total, v) => total + degree[v]!, 0)
        expect(sum).toBe(2 * contraction.edges)
        for (const v of alive) expect(degree[v]!).toBeLessThan(contraction.vertices)
        alive.delete(contraction.buckets.leastVertex())
        contraction.contractLeast(round % 3 === 0 ? 0 : Infinity)
      }
      expect(contraction.edges).toBe(0)
    }
  })

  it('keeps a complete graph complete', () => {
    const contraction = new Contraction(completeGraph(9))
    for (let n = 9; n > 1; n--) {
      expect(contraction.edges).toBe((n * (n - 1)) / 2)
      expect(contraction.buckets.secondDegree()).toBe(n - 1)
      contraction.contractLeast(Infinity)
    }
  })
})
