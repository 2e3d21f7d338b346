import { describe, expect, it } from 'vitest'
import { buildFabric } from '../../../../shared/engine/machine/build-fabric'
import { applyDefects, defectIssues, normaliseDefects } from '../../../../shared/engine/machine/defects'
import type { Defects, Fabric, WorkingGraph } from '../../../../shared/engine/machine/fabric'
import { createRandom } from '../../../../shared/engine/random'

const alder = buildFabric({ kind: 'pegasus', m: 3, trimmed: true })

/** The couplers of a graph by published number, as text, in order. */
const couplersOf = ({ ids }: Fabric, { graph }: Pick<WorkingGraph, 'graph'>): string[] =>
  Array.from({ length: graph.ends.length / 2 }, (_, k) => `${ids[graph.ends[2 * k]!]}-${ids[graph.ends[2 * k + 1]!]}`)

/** A random list with repeats and couplers written either way round. */
function randomDefects(fabric: Fabric, seed: number): Defects {
  const random = createRandom(seed)
  const all = couplersOf(fabric, fabric).map((pair) => pair.split('-').map(Number) as [number, number])
  const qubits = Array.from({ length: 6 }, () => fabric.ids[random.below(fabric.ids.length)]!)
  const couplers = Array.from({ length: 40 }, () => all[random.below(all.length)]!)
  return {
    qubits: [...qubits, qubits[0]!],
    couplers: couplers.flatMap(([a, b], k): [number, number][] =>
      k % 3 === 0
        ? [
            [b, a],
            [a, b],
          ]
        : [[b, a]],
    ),
  }
}

describe('applyDefects', () => {
  it.each([1, 2, 3])('takes out what a filter by published number takes out (seed %i)', (seed) => {
    const defects = randomDefects(alder, seed)
    const working = applyDefects(alder, defects)
    const gone = new Set(defects.couplers.flatMap(([a, b]) => [`${a}-${b}`, `${b}-${a}`]))
    const missing = new Set(defects.qubits.map(String))
    const expected = couplersOf(alder, alder).filter(
      (pair) => !gone.has(pair) && !pair.split('-').some((id) => missing.has(id)),
    )
    expect(couplersOf(alder, working)).toEqual(expected)
    expect([...working.usable]).toEqual([...alder.ids].map((id) => (missing.has(String(id)) ? 0 : 1)))
    expect(working.graph.order).toBe(alder.graph.order)
  })

  it('gives the whole machine back for an empty list, and leaves the fabric alone', () => {
    const before = structuredClone(alder)
    expect(applyDefects(alder, { qubits: [], couplers: [] }).graph).toEqual(alder.graph)
    applyDefects(alder, randomDefects(alder, 7))
    expect(alder).toEqual(before)
  })

  it('throws on a list that does not fit the fabric', () => {
    expect(() => applyDefects(alder, { qubits: [alder.ids[0]!, 0], couplers: [] })).toThrow(
      new RangeError('qubits.1: P(3) has no qubit 0'),
    )
  })
})

describe('defectIssues', () => {
  it('names unknown qubits and couplers with their place in the list', () => {
    const square = buildFabric({ kind: 'square', width: 3, height: 3 })
    const defects: Defects = {
      qubits: [4, 9, 4, 0.5],
      couplers: [
        [1, 0],
        [0, 4],
        [3, 12],
        [2, 2],
        [0, 1],
      ],
    }
    expect(defectIssues(square, defects)).toEqual([
      { path: 'qubits.1', message: 'square grid 3×3 has no qubit 9' },
      { path: 'qubits.3', message: 'square grid 3×3 has no qubit 0.5' },
      { path: 'couplers.1', message: 'square grid 3×3 has no coupler 0-4' },
      { path: 'couplers.2', message: 'square grid 3×3 has no qubit 12' },
      { path: 'couplers.3', message: '2-2: a coupler joins two different qubits' },
    ])
  })

  it('counts the numbers that trimming took away as unknown', () => {
    expect(defectIssues(buildFabric({ kind: 'pegasus', m: 3, trimmed: false }), { qubits: [0], couplers: [] })).toEqual(
      [],
    )
    expect(defectIssues(alder, { qubits: [0], couplers: [] })).toHaveLength(1)
  })
})

describe('normaliseDefects', () => {
  const square = buildFabric({ kind: 'square', width: 4, height: 3 })

  it('sorts by number, drops repeats and the couplers of missing qubits', () => {
    const list: Defects = {
      qubits: [10, 2, 10],
      couplers: [
        [9, 8],
        [8, 9],
        [1, 0],
        [6, 10],
        [4, 0],
        [3, 2],
        [0, 1],
      ],
    }
    expect(normaliseDefects(square, list)).toEqual({
      qubits: [2, 10],
      couplers: [
        [0, 1],
        [0, 4],
        [8, 9],
      ],
    })
  })

  it.each([4, 5, 6])('changes nothing about the machine, and nothing when applied twice (seed %i)', (seed) => {
    const defects = randomDefects(alder, seed)
    const normal = normaliseDefects(alder, defects)
    expect(applyDefects(alder, normal)).toEqual(applyDefects(alder, defects))
    expect(normaliseDefects(alder, normal)).toEqual(normal)
  })

  it('throws on a list that does not fit the fabric', () => {
    expect(() => normaliseDefects(square, { qubits: [], couplers: [[0, 11]] })).toThrow(
      new RangeError('couplers.0: square grid 4×3 has no coupler 0-11'),
    )
  })
})
