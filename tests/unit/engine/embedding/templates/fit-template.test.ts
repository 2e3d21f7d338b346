import { describe, expect, it } from 'vitest'
import { qualityOf } from '../../../../../shared/engine/embedding/objective'
import { fitTemplate } from '../../../../../shared/engine/embedding/templates/fit-template'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import type { Graph } from '../../../../../shared/engine/graph/graph'
import type { PublishedFamily } from '../../../../../shared/engine/machine/fabric'
import { createRandom } from '../../../../../shared/engine/random'
import { completeGraph, cycleGraph, gridGraph, randomGraph, regularGraph } from '../../../../fixtures/graphs'
import { attemptOn, bipartiteGraph, machineOf, taskOn } from './attempts'
import type { MachineOnly } from './attempts'

const SMALL: readonly PublishedFamily[] = [
  { kind: 'chimera', m: 4, n: 5, t: 4 },
  { kind: 'pegasus', m: 3, trimmed: true },
  { kind: 'pegasus', m: 4, trimmed: false },
  { kind: 'zephyr', m: 2, t: 4 },
  { kind: 'zephyr', m: 3, t: 2 },
  { kind: 'king', width: 14, height: 12 },
]

function offersOf(problem: Graph, machine: MachineOnly, seed = 1) {
  const task = taskOn(problem, machine)
  const { attempt, offers } = attemptOn(task, seed)
  expect(fitTemplate(task, attempt)).toBeNull()
  return offers
}

describe('fitTemplate', () => {
  const problems: readonly [string, Graph][] = [
    ['K_1', completeGraph(1)],
    ['K_2', completeGraph(2)],
    ['K_5', completeGraph(5)],
    ['K_9', completeGraph(9)],
    ['C_9', cycleGraph(9)],
    ['grid 3 × 3', gridGraph(3, 3)],
    ['K_{4,5}', bipartiteGraph(4, 5)],
    ['G(10, 0.5)', randomGraph(10, 0.5, createRandom(4))],
    ['3-regular 10', regularGraph(10, 3, createRandom(5))],
    ['two parts and isolated variables', graphFromEdges(11, [0, 2, 2, 4, 4, 0, 6, 7, 7, 9])],
    ['no interactions', graphFromEdges(4, [])],
  ]

  it.each(problems)('fits %s on every small machine, whole and with defects', (_, problem) => {
    for (const family of SMALL) {
      expect(offersOf(problem, machineOf(family)).length).toBeGreaterThan(0)
      const offers = offersOf(problem, machineOf(family, 0.02, 0.01))
      // The network needs a whole part of the board.
      if (family.kind !== 'king') expect(offers.length).toBeGreaterThan(0)
    }
  })

  it('offers only valid embeddings under heavy defects, whatever fits', () => {
    const random = createRandom(9)
    for (let k = 0; k < 8; k++) {
      const family = SMALL[random.below(SMALL.length)]!
      const n = 2 + random.below(11)
      const machine = machineOf(family, 0.3 * random.float(), 0.3 * random.float(), k)
      offersOf(randomGraph(n, random.float(), random), machine, k)
    }
  })

  it('cuts chains to the interactions of the problem', () => {
    const machine = machineOf({ kind: 'pegasus', m: 4, trimmed: true })
    const best = (problem: Graph): number =>
      Math.min(...offersOf(problem, machine).map((offer) => qualityOf(offer).total))
    expect(best(cycleGraph(20))).toBeLessThan(best(completeGraph(20)) / 2)
    expect(best(graphFromEdges(20, [3, 5]))).toBe(20)
  })

  it('makes the same offers from the same random numbers', () => {
    const machine = machineOf({ kind: 'zephyr', m: 3, t: 4 }, 0.03, 0.02)
    const problem = randomGraph(14, 0.6, createRandom(2))
    expect(offersOf(problem, machine, 3)).toEqual(offersOf(problem, machine, 3))
  })

  it('uses neither broken qubits nor lines on machines of points, and finds nothing where nothing fits', () => {
    expect(offersOf(completeGraph(4), machineOf({ kind: 'square', width: 9, height: 9 }))).toEqual([])
    expect(offersOf(completeGraph(40), machineOf({ kind: 'chimera', m: 2, n: 2, t: 4 }))).toEqual([])
    expect(offersOf(completeGraph(13), machineOf({ kind: 'king', width: 12, height: 12 }))).toEqual([])
    const dead = machineOf({ kind: 'chimera', m: 2, n: 2, t: 4 }, 1)
    expect(offersOf(completeGraph(2), dead)).toEqual([])
    const unknown = { ...machineOf({ kind: 'chimera', m: 2, n: 2, t: 4 }), segments: null, family: null }
    expect(offersOf(completeGraph(3), unknown)).toEqual([])
  })

  it('ends soon after it is asked to', () => {
    const task = taskOn(completeGraph(30), machineOf({ kind: 'pegasus', m: 4, trimmed: true }, 0.02, 0.01))
    for (const looks of [0, 1, 3, 10]) {
      const { attempt } = attemptOn(task, 1, looks)
      fitTemplate(task, attempt)
      expect(attempt.watch.stopped).toBe('cancelled')
    }
  })

  it('gives one side vertical and the other horizontal lines when the problem has two sides', () => {
    // K_{4m,4m} on C(m,m,4): every variable has a whole line of m qubits, and no qubit is left.
    const offers = offersOf(bipartiteGraph(16, 16), machineOf({ kind: 'chimera', m: 4, n: 4, t: 4 }))
    expect(offers.map(qualityOf)).toContainEqual({ longest: 4, total: 128, changed: 0 })
  })
})
