import { describe, expect, it } from 'vitest'
import { familyTreewidth } from '../../../../../shared/engine/embedding/bounds/family-treewidth'
import { machineTreewidthBound } from '../../../../../shared/engine/embedding/bounds/machine-treewidth'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import { buildFabric } from '../../../../../shared/engine/machine/build-fabric'
import { applyDefects } from '../../../../../shared/engine/machine/defects'
import type { PublishedFamily } from '../../../../../shared/engine/machine/fabric'
import { createRandom } from '../../../../../shared/engine/random'
import { cycleGraph, gridGraph, randomGraph, taskOf, usableExcept } from '../../../../fixtures/graphs'
import { exactTreewidth } from '../../../../fixtures/treewidth'

const FAMILIES: PublishedFamily[] = [
  ...[1, 2, 3, 5, 9].map((m): PublishedFamily => ({ kind: 'chimera', m, n: m, t: 4 })),
  { kind: 'chimera', m: 3, n: 8, t: 2 },
  { kind: 'chimera', m: 7, n: 2, t: 3 },
  { kind: 'chimera', m: 24, n: 20, t: 1 },
  ...[3, 4, 5, 8, 16].flatMap((m): PublishedFamily[] => [
    { kind: 'pegasus', m, trimmed: true },
    { kind: 'pegasus', m, trimmed: false },
  ]),
  ...[1, 2, 3, 6, 12].map((m): PublishedFamily => ({ kind: 'zephyr', m, t: 4 })),
  ...[1, 2, 3, 6].map((t): PublishedFamily => ({ kind: 'zephyr', m: 4, t })),
  ...[3, 6, 15].map((width): PublishedFamily => ({ kind: 'king', width, height: 9 })),
  ...[2, 6, 15].map((width): PublishedFamily => ({ kind: 'square', width, height: 9 })),
  ...[2, 6, 15].map((depth): PublishedFamily => ({ kind: 'cubic', width: 7, height: 9, depth })),
]
/** Their closed form is below what a sweep reaches: the front goes back and forth, which sweeps do not. */
const HEAVY_HEXAGONS = [
  [1, 1],
  [1, 4],
  [4, 1],
  [2, 3],
  [3, 3],
  [9, 9],
  [20, 6],
  [6, 20],
].map(([rows, columns]): PublishedFamily => ({ kind: 'heavy-hex', rows: rows!, columns: columns! }))

const machineOf = (family: PublishedFamily) => {
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
      // From a corner of a box the front is slanting, and smaller than a layer.
      if (family.kind === 'cubic') continue
      if (machine.machine.order > 512) expect(machineTreewidthBound(machine).width).toBe(familyTreewidth(family))
    }
  })

  it('comes within one of the closed form of heavy hexagons', () => {
    for (const family of HEAVY_HEXAGONS) {
      const { width } = machineTreewidthBound(machineOf(family))
      expect(width, JSON.stringify(family)).toBeLessThanOrEqual(familyTreewidth(family) + 1)
    }
  })

  it('the closed forms are no less than the exact treewidth of small cubic grids and heavy hexagons', () => {
    for (const family of [
      { kind: 'cubic', width: 2, height: 2, depth: 2 },
      { kind: 'cubic', width: 2, height: 2, depth: 3 },
      { kind: 'cubic', width: 1, height: 3, depth: 4 },
      { kind: 'heavy-hex', rows: 1, columns: 1 },
    ] as PublishedFamily[])
      expect(familyTreewidth(family), JSON.stringify(family)).toBeGreaterThanOrEqual(
        exactTreewidth(machineOf(family).machine),
      )
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
