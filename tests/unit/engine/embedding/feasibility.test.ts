import { describe, expect, it } from 'vitest'
import { provedInfeasible } from '../../../../shared/engine/embedding/feasibility'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import { createRandom } from '../../../../shared/engine/random'
import { chimeraGraph, completeGraph, cycleGraph, gridGraph, kingGraph, taskOf } from '../../../fixtures/graphs'

const allOf = (order: number): Uint8Array => new Uint8Array(order).fill(1)

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

  it('never refuses a graph that was made by contracting parts of the machine', () => {
    const random = createRandom(21)
    const machines = [gridGraph(4, 4), kingGraph(4, 4), chimeraGraph(2, 2, 3), cycleGraph(10)]
    for (let round = 0; round < 400; round++) {
      const machine = machines[round % machines.length]!
      const usable = Uint8Array.from({ length: machine.order }, () => (random.float() < 0.15 ? 0 : 1))
      const label = Int32Array.from({ length: machine.order }, (_, q) => q)
      for (let k = 0; k < machine.ends.length / 2; k++) {
        const [a, b] = [machine.ends[2 * k]!, machine.ends[2 * k + 1]!]
        if (!usable[a] || !usable[b] || random.float() < 0.75) continue
        const [from, to] = [label[b]!, label[a]!]
        label.forEach((name, q) => name === from && (label[q] = to))
      }
      const names = [...new Set([...label].filter((_, q) => usable[q]))]
      const ends: number[] = []
      for (let k = 0; k < machine.ends.length / 2; k++) {
        const [a, b] = [machine.ends[2 * k]!, machine.ends[2 * k + 1]!]
        if (usable[a] && usable[b] && label[a] !== label[b])
          ends.push(names.indexOf(label[a]!), names.indexOf(label[b]!))
      }
      expect(provedInfeasible(taskOf(graphFromEdges(names.length, ends), machine, usable))).toBeNull()
    }
  })

  it('accepts empty graphs', () => {
    expect(provedInfeasible(taskOf(graphFromEdges(0, []), graphFromEdges(0, [])))).toBeNull()
  })
})
