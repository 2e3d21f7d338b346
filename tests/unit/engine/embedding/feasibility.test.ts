import { describe, expect, it } from 'vitest'
import { AT_ONCE, provedInfeasible, THOROUGH } from '../../../../shared/engine/embedding/feasibility'
import type { EmbeddingTask } from '../../../../shared/engine/embedding/task'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import type { Graph } from '../../../../shared/engine/graph/graph'
import { buildFabric } from '../../../../shared/engine/machine/build-fabric'
import { applyDefects } from '../../../../shared/engine/machine/defects'
import type { PublishedFamily } from '../../../../shared/engine/machine/fabric'
import { createRandom } from '../../../../shared/engine/random'
import { completeGraph, cycleGraph, gridGraph, regularGraph, taskOf, usableExcept } from '../../../fixtures/graphs'
import { densestMinor, randomMinor } from '../../../fixtures/treewidth'

const allOf = (order: number): Uint8Array => new Uint8Array(order).fill(1)

function familyTask(problem: Graph, family: PublishedFamily): EmbeddingTask {
  const { graph, segments } = buildFabric(family)
  return { ...taskOf(problem, graph), segments, family }
}

describe('provedInfeasible', () => {
  it('counts variables against usable qubits and says by how much', () => {
    const usable = allOf(16)
    usable[3] = 0
    const proof = provedInfeasible(taskOf(graphFromEdges(18, []), gridGraph(4, 4), usable))
    expect(proof).toMatchObject({ code: 'more variables than qubits', by: 3 })
    expect(proof!.message).toContain('18 variables')
    expect(proof!.message).toContain('15 usable qubits')
  })

  it('counts interactions against couplers between usable qubits', () => {
    // 4 × 4 grid: 24 couplers, 2 at the corner; K_8 has 28 interactions.
    const usable = allOf(16)
    usable[0] = 0
    expect(provedInfeasible(taskOf(completeGraph(8), gridGraph(4, 4), usable))).toMatchObject({
      code: 'more interactions than couplers',
      by: 6,
    })
  })

  it('adds up the least chain lengths that degrees ask for', () => {
    // Degree 17 on qubits of degree 4 needs ⌈15 / 2⌉ = 8 qubits: with 17 leaves 25 qubits, the grid has 20.
    const star = graphFromEdges(18, Array.from({ length: 17 }, (_, i) => [0, i + 1]).flat())
    expect(provedInfeasible(taskOf(star, gridGraph(5, 4)))).toMatchObject({
      code: 'degrees need more qubits',
      by: 5,
    })
    expect(provedInfeasible(taskOf(star, gridGraph(5, 5)))).toBeNull()
  })

  it('knows that chains on a ring touch only two others', () => {
    const star = graphFromEdges(4, [0, 1, 0, 2, 0, 3])
    expect(provedInfeasible(taskOf(star, cycleGraph(9)))).toMatchObject({ code: 'degrees need more qubits', by: 1 })
  })

  it('needs one part of the machine that is large enough for a connected set', () => {
    const usable = allOf(15)
    for (const q of [2, 7, 12]) usable[q] = 0
    const path = graphFromEdges(8, Array.from({ length: 7 }, (_, i) => [i, i + 1]).flat())
    expect(provedInfeasible(taskOf(path, gridGraph(5, 3), usable))).toMatchObject({
      code: 'no connected part large enough',
      by: 2,
    })
  })

  it('counts independent cycles', () => {
    // A tree has none.
    const machine = graphFromEdges(7, [0, 1, 0, 2, 0, 3, 3, 4, 4, 5, 4, 6])
    expect(provedInfeasible(taskOf(cycleGraph(3), machine))).toMatchObject({
      code: 'more independent cycles than the machine has',
      by: 1,
    })
  })

  it('compares treewidths, and gives both numbers', () => {
    const expander = regularGraph(220, 5, createRandom(2))
    const refused = provedInfeasible(familyTask(expander, { kind: 'chimera', m: 5, n: 6, t: 4 }))
    expect(refused).toMatchObject({ code: 'treewidth too large', available: 20 })
    expect(refused!.needed).toBeGreaterThan(20)
    expect(refused!.by).toBe(refused!.needed - 20)
    expect(refused!.message).toContain(`at least ${refused!.needed}, the machine’s at most 20: ${refused!.by} too much`)
  })

  it('names the clique that is too large', () => {
    const clique = completeGraph(20)
    const problem = graphFromEdges(40, [...clique.ends, ...Array.from({ length: 20 }, (_, i) => [i, 20 + i]).flat()])
    const family: PublishedFamily = { kind: 'chimera', m: 4, n: 9, t: 4 }
    const proof = provedInfeasible(familyTask(problem, family))
    expect(proof).toMatchObject({
      code: 'clique larger than the machine can hold',
      needed: 20,
      available: 17,
      by: 3,
    })
    expect(proof!.message).toContain('20 variables that all interact')
    expect(provedInfeasible(familyTask(completeGraph(17), family))).toBeNull()
  })

  it('counts defects in: a machine that lost its lines holds less', () => {
    const family = { kind: 'king', width: 12, height: 12 } as const
    const fabric = buildFabric(family)
    const defects = { qubits: Array.from({ length: 12 }, (_, x) => 12 * 6 + x), couplers: [] }
    const { graph, usable } = applyDefects(fabric, defects)
    const whole = familyTask(completeGraph(12), family)
    expect(provedInfeasible(whole)).toBeNull()
    expect(provedInfeasible({ ...whole, machine: graph, usable })).toMatchObject({ needed: 12, available: 8 })
  })

  it('knows that minors of a square grid are planar', () => {
    const family: PublishedFamily = { kind: 'square', width: 20, height: 20 }
    expect(provedInfeasible(familyTask(completeGraph(4), family))).toBeNull()
    expect(provedInfeasible(familyTask(completeGraph(5), family))).toMatchObject({
      code: 'too many interactions for a planar machine',
      needed: 10,
      available: 9,
      by: 1,
    })
    // Petersen: 15 interactions of 10 variables are not too many, but it contracts to K_5.
    const petersen = graphFromEdges(
      10,
      Array.from({ length: 5 }, (_, i) => [i, (i + 1) % 5, i, i + 5, i + 5, ((i + 2) % 5) + 5]).flat(),
    )
    expect(provedInfeasible(familyTask(petersen, family))).toMatchObject({
      code: 'too many interactions for a planar machine',
    })
    expect(provedInfeasible(familyTask(gridGraph(9, 9), family))).toBeNull()
  })

  it('finds more proofs with more work', () => {
    const expander = regularGraph(600, 6, createRandom(3))
    const task = familyTask(expander, { kind: 'chimera', m: 12, n: 12, t: 4 })
    expect(provedInfeasible(task, { contractionWork: 0, routingWork: 1000, cliqueWork: 0 })).toBeNull()
    expect(provedInfeasible(task, THOROUGH)).toMatchObject({ code: 'treewidth too large' })
  })

  it('never refuses a minor of the machine, made by contracting, deleting and renaming', () => {
    const random = createRandom(21)
    const families: PublishedFamily[] = [
      { kind: 'square', width: 6, height: 6 },
      { kind: 'king', width: 5, height: 6 },
      { kind: 'chimera', m: 2, n: 3, t: 3 },
      { kind: 'chimera', m: 3, n: 3, t: 2 },
      { kind: 'pegasus', m: 2, trimmed: true },
      { kind: 'zephyr', m: 1, t: 2 },
      { kind: 'cubic', width: 3, height: 4, depth: 3 },
      { kind: 'heavy-hex', rows: 2, columns: 2 },
    ]
    const fabrics = families.map(buildFabric)
    for (let round = 0; round < 2400; round++) {
      const family = families[round % families.length]!
      const { graph, segments } = fabrics[round % fabrics.length]!
      const usable = usableExcept(graph.order, 0.2 * random.float(), random)
      const problem = randomMinor(graph, usable, random)
      const known = round % 4 < 2
      const task = { ...taskOf(problem, graph, usable), ...(known ? { segments, family } : {}) }
      expect(provedInfeasible(task, round % 3 ? AT_ONCE : THOROUGH)).toBeNull()
    }
  })

  it('never refuses the densest minors that contraction makes of larger machines', () => {
    const random = createRandom(22)
    const families: PublishedFamily[] = [
      { kind: 'chimera', m: 6, n: 6, t: 4 },
      { kind: 'pegasus', m: 4, trimmed: true },
      { kind: 'zephyr', m: 3, t: 4 },
      { kind: 'king', width: 16, height: 16 },
      { kind: 'square', width: 16, height: 16 },
    ]
    for (const family of families) {
      const { graph, segments } = buildFabric(family)
      for (let round = 0; round < 12; round++) {
        const usable = usableExcept(graph.order, 0.05, random)
        const problem = densestMinor(graph, usable, 0.1 + 0.8 * random.float())
        for (const known of [family, null])
          expect(provedInfeasible({ ...taskOf(problem, graph, usable), segments, family: known })).toBeNull()
      }
    }
  })

  it('accepts empty graphs', () => {
    expect(provedInfeasible(taskOf(graphFromEdges(0, []), graphFromEdges(0, [])))).toBeNull()
  })
})
