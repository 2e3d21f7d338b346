import { describe, expect, it } from 'vitest'
import { machineTreewidthBound, provedInfeasible } from '../../shared/engine/embedding/feasibility'
import type { EmbeddingTask } from '../../shared/engine/embedding/task'
import { graphFromEdges } from '../../shared/engine/graph/build'
import type { Graph } from '../../shared/engine/graph/graph'
import { buildFabric } from '../../shared/engine/machine/build-fabric'
import type { PublishedFamily } from '../../shared/engine/machine/fabric'
import { treewidthUpperBound } from '../../shared/engine/problem/treewidth'
import { treewidthLowerBound } from '../../shared/engine/problem/treewidth-lower'
import { completeGraph, gridGraph, taskOf } from '../fixtures/graphs'
import { exactTreewidth } from '../fixtures/treewidth'

/** Vertices 0 … 2ᵈ − 1, joined where they differ in one bit. */
function hypercube(d: number): Graph {
  const ends: number[] = []
  for (let v = 0; v < 2 ** d; v++) for (let bit = 1; bit < 2 ** d; bit *= 2) if (!(v & bit)) ends.push(v, v | bit)
  return graphFromEdges(2 ** d, ends)
}

const petersen = graphFromEdges(
  10,
  Array.from({ length: 5 }, (_, i) => [i, (i + 1) % 5, i, i + 5, i + 5, ((i + 2) % 5) + 5]).flat(),
)

function familyTask(problem: Graph, family: PublishedFamily): EmbeddingTask {
  const { graph, segments } = buildFabric(family)
  return { ...taskOf(problem, graph), segments, family }
}

describe('published treewidths lie between the bounds', () => {
  it.each([
    // Bodlaender, A partial k-arboretum of graphs with bounded treewidth, Theor. Comput. Sci. 209 (1998): cliques, grids.
    ['K_5', completeGraph(5), 4],
    ['K_40', completeGraph(40), 39],
    ['grid 4 × 4', gridGraph(4, 4), 4],
    ['grid 7 × 7', gridGraph(7, 7), 7],
    ['grid 5 × 12', gridGraph(12, 5), 5],
    // Petersen graph: Weisstein, "Treewidth", MathWorld (from memory); also by the exact computation below.
    ['Petersen', petersen, 4],
    // Hypercubes: Chandran & Kavitha, The treewidth and pathwidth of hypercubes, Discrete Math. 306 (2006).
    ['Q_3', hypercube(3), 3],
    ['Q_4', hypercube(4), 6],
  ] as const)('%s', (_name, graph, treewidth) => {
    expect(treewidthLowerBound(graph)).toBeLessThanOrEqual(treewidth)
    expect(treewidthUpperBound(graph)!).toBeGreaterThanOrEqual(treewidth)
    expect(machineTreewidthBound(taskOf(graph, graph)).width).toBeGreaterThanOrEqual(treewidth)
    if (graph.order <= 16) expect(exactTreewidth(graph)).toBe(treewidth)
  })

  it('are met by the lower bound on cliques, Petersen and Q_3', () => {
    expect(treewidthLowerBound(completeGraph(40))).toBe(39)
    expect(treewidthLowerBound(petersen)).toBe(4)
    expect(treewidthLowerBound(hypercube(3))).toBe(3)
  })

  it('are met by the machine bound on square grids', () => {
    for (const side of [4, 9, 30]) {
      const { graph, segments } = buildFabric({ kind: 'square', width: side, height: side })
      expect(machineTreewidthBound({ ...taskOf(graph, graph), segments }).width).toBe(side)
    }
  })
})

describe('complete graphs on Chimera', () => {
  // C(m, m, t) has treewidth t·m (Klymko, Sullivan & Humble, Adiabatic quantum programming: minor embedding with hard
  // faults, Quantum Inf. Process. 13, 2014; Boothby, King & Roy, Fast clique minor generation in Chimera qubit
  // connectivity graphs, 15, 2016), so no more than K_{t·m + 1}.
  it.each([1, 2, 4, 8, 16])('C(m, m, 4) with m = %i: K_{4m + 2} is impossible, K_{4m + 1} is not refused', (m) => {
    const family: PublishedFamily = { kind: 'chimera', m, n: m, t: 4 }
    expect(machineTreewidthBound(familyTask(completeGraph(2), family)).width).toBe(4 * m)
    expect(provedInfeasible(familyTask(completeGraph(4 * m + 2), family))).not.toBeNull()
    if (m > 1) expect(provedInfeasible(familyTask(completeGraph(4 * m + 1), family))).toBeNull()
  })

  it('names the clique on larger ones', () => {
    expect(provedInfeasible(familyTask(completeGraph(66), { kind: 'chimera', m: 16, n: 16, t: 4 }))).toMatchObject({
      code: 'clique larger than the machine can hold',
      needed: 66,
      available: 65,
      by: 1,
    })
  })
})

describe('complete graphs on Pegasus and Zephyr', () => {
  // Constructions with short equal chains reach K_{12m − 10} on P(m) (Boothby et al., arXiv:2003.00133, 2020) and
  // K_{16m − 8} on Z(m, 4) (Boothby, King & Raymond, Zephyr topology, 2021): no bound may refuse those.
  it.each([3, 6, 16])('P(%i)', (m) => {
    const family: PublishedFamily = { kind: 'pegasus', m, trimmed: true }
    expect(provedInfeasible(familyTask(completeGraph(12 * m - 10), family))).toBeNull()
    expect(provedInfeasible(familyTask(completeGraph(12 * m - 2), family))).not.toBeNull()
  })

  it.each([2, 6, 15])('Z(%i, 4)', (m) => {
    const family: PublishedFamily = { kind: 'zephyr', m, t: 4 }
    expect(provedInfeasible(familyTask(completeGraph(16 * m - 8), family))).toBeNull()
    expect(provedInfeasible(familyTask(completeGraph(16 * m + 10), family))).not.toBeNull()
  })
})

describe('planar machines', () => {
  // Kuratowski 1930, Wagner 1937: K_5 is no minor of a planar graph; a planar graph has at most 3n − 6 edges (Euler).
  it('refuse K_5 and the Petersen graph, and take K_4 and the cube', () => {
    const family: PublishedFamily = { kind: 'square', width: 30, height: 30 }
    expect(provedInfeasible(familyTask(completeGraph(5), family))).not.toBeNull()
    expect(provedInfeasible(familyTask(petersen, family))).not.toBeNull()
    expect(provedInfeasible(familyTask(completeGraph(4), family))).toBeNull()
    expect(provedInfeasible(familyTask(hypercube(3), family))).toBeNull()
  })
})
