import { describe, expect, it } from 'vitest'
import { familyTreewidth } from '../../../../../shared/engine/embedding/bounds/family-treewidth'
import { machineTreewidthBound } from '../../../../../shared/engine/embedding/bounds/machine-treewidth'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import { buildFabric } from '../../../../../shared/engine/machine/build-fabric'
import { applyDefects } from '../../../../../shared/engine/machine/defects'
import type { Family } from '../../../../../shared/engine/machine/fabric'
import { createRandom } from '../../../../../shared/engine/random'
import { cycleGraph, gridGraph, randomGraph, taskOf, usableExcept } from '../../../../fixtures/graphs'
import { exactTreewidth } from '../../../../fixtures/treewidth'

const FAMILIES: Family[] = [
  ...[1, 2, 3, 5, 9].map((m): Family => ({ kind: 'chimera', m, n: m, t: 4 })),
  { kind: 'chimera', m: 3, n: 8, t: 2 },
  { kind: 'chimera', m: 7, n: 2, t: 3 },
  { kind: 'chimera', m: 24, n: 20, t: 1 },
  ...[3, 4, 5, 8, 16].flatMap((m): Family[] => [
    { kind: 'pegasus', m, trimmed: true },
    { kind: 'pegasus', m, trimmed: false },
  ]),
  ...[1, 2, 3, 6, 12].map((m): Family => ({ kind: 'zephyr', m, t: 4 })),
  ...[1, 2, 3, 6].map((t): Family => ({ kind: 'zephyr', m: 4, t })),
  ...[3, 6, 15].map((width): Family => ({ kind: 'king', width, height: 9 })),
  ...[2, 6, 15].map((width): Family => ({ kind: 'square', width, height: 9 })),
]

const machineOf = (family: Family) => {
  const { graph, segments } = buildFabric(family)
  return { machine: graph, segments, usable: new Uint8Array(graph.order).fill(1) }
}

describe('machineTreewidthBound', () => {
  it('reaches the closed form of every family', () => {
    for (const family of FAMILIES)
      expect(machineTreewidthBound(machineOf(family)).width, JSON.stringify(family)).toBeLessThanOrEqual(
        familyTreewidth(family),
      )
  })

  it('is the closed form, where least fill is not tried', () => {
    for (const family of FAMILIES) {
      const machine = machineOf(family)
      if (machine.machine.order > 512) expect(machineTreewidthBound(machine).width).toBe(familyTreewidth(family))
    }
  })

  it('is never below the exact treewidth, with unusable qubits and without geometry', () => {
    const random = createRandom(4)
    for (let round = 0; round < 100; round++) {
      const machine = randomGraph(9, random.float(), random)
      const usable = usableExcept(9, 0.2, random)
      const names = [...usable.keys()].filter((q) => usable[q])
      const ends = [...machine.ends].map((q) => names.indexOf(q))
      const kept = ends.filter((_, i) => ends[i - (i % 2)]! >= 0 && ends[i - (i % 2) + 1]! >= 0)
      const { width } = machineTreewidthBound(taskOf(machine, machine, usable))
      expect(width).toBeGreaterThanOrEqual(exactTreewidth(graphFromEdges(names.length, kept)))
    }
  })

  it('finds the treewidth of small custom graphs', () => {
    expect(machineTreewidthBound(taskOf(cycleGraph(3), cycleGraph(20))).width).toBe(2)
    expect(machineTreewidthBound(taskOf(cycleGraph(3), gridGraph(5, 4))).width).toBe(4)
    expect(machineTreewidthBound(taskOf(cycleGraph(3), graphFromEdges(0, []))).width).toBe(0)
  })

  it('falls with missing lines', () => {
    const fabric = buildFabric({ kind: 'square', width: 9, height: 9 })
    // A column missing in the middle leaves two parts of 4 × 9.
    const { graph, usable } = applyDefects(fabric, {
      qubits: Array.from({ length: 9 }, (_, y) => 9 * y + 4),
      couplers: [],
    })
    expect(machineTreewidthBound({ machine: graph, usable, segments: fabric.segments }).width).toBe(4)
  })
})
