import { describe, expect, it } from 'vitest'
import { adviseOn } from '../../../../shared/engine/embedding/advice'
import { largerMachine } from '../../../../shared/engine/embedding/advice/larger-machine'
import { chainOf, packChains } from '../../../../shared/engine/embedding/embedding'
import type { PartialEmbedding } from '../../../../shared/engine/embedding/method'
import type { EmbeddingTask } from '../../../../shared/engine/embedding/task'
import { verifyEmbedding } from '../../../../shared/engine/embedding/verify'
import { edgeBetween, graphFromEdges } from '../../../../shared/engine/graph/build'
import type { Graph } from '../../../../shared/engine/graph/graph'
import { buildFabric } from '../../../../shared/engine/machine/build-fabric'
import type { PublishedFamily } from '../../../../shared/engine/machine/fabric'
import { createRandom } from '../../../../shared/engine/random'
import { completeGraph, cycleGraph, gridGraph, randomGraph, taskOf } from '../../../fixtures/graphs'

/** The state that these chains are, with its conflicts counted from their definition. */
function stateOf({ problem, machine }: EmbeddingTask, lists: readonly (readonly number[])[]): PartialEmbedding {
  const uses = Array.from({ length: machine.order }, (_, q) => lists.filter((chain) => chain.includes(q)).length)
  const joined = (a: number, b: number): boolean =>
    lists[a]!.some((p) => lists[b]!.some((q) => edgeBetween(machine, p, q) >= 0))
  return {
    chains: packChains(lists),
    overlap: uses.reduce((sum, use) => sum + Math.max(0, use - 1), 0),
    overlappedQubits: uses.flatMap((use, q) => (use > 1 ? [q] : [])),
    unmet: Array.from({ length: problem.ends.length / 2 }, (_, k) => k).filter(
      (k) => !joined(problem.ends[2 * k]!, problem.ends[2 * k + 1]!),
    ),
    unplaced: lists.filter((chain) => chain.length === 0).length,
  }
}

function familyTask(problem: Graph, family: PublishedFamily): EmbeddingTask {
  const { graph, segments } = buildFabric(family)
  return { ...taskOf(problem, graph), segments, family }
}

// Points 0 1 2 / 3 4 5 / 6 7 8. The chains of 0 and 1 both go through the middle.
const crossing = taskOf(graphFromEdges(4, [0, 2, 0, 3, 1, 2, 1, 3]), gridGraph(3, 3))
const crossed = stateOf(crossing, [[3, 4, 5], [4, 7], [8], [6]])

describe('adviseOn', () => {
  it('says where chains overlap and which variables have most of it', () => {
    const advice = adviseOn(crossing, crossed)
    expect(crossed.overlap).toBe(1)
    expect(advice.overlappedQubits).toEqual([4])
    expect(advice.conflicts).toEqual([
      { variable: 0, sharedQubits: 1, unmet: 0 },
      { variable: 1, sharedQubits: 1, unmet: 0 },
    ])
    expect(advice.leaveOut).toEqual([0])
  })

  it('names the interaction whose loss lets a chain leave the shared qubit', () => {
    // Without 0 – 2 the chain of 0 is cut back to 3, beside 6; without 0 – 3, to 5, beside 8. Chain 1 keeps 7 for both.
    const { drop } = adviseOn(crossing, crossed)
    expect(drop).toHaveLength(1)
    expect(drop[0]).toEqual({ edge: 0, conflicts: 1 })
  })

  it('counts unmet interactions and variables without a chain', () => {
    const task = taskOf(completeGraph(3), gridGraph(3, 3))
    const state = stateOf(task, [[0], [8], []])
    const advice = adviseOn(task, state)
    expect(state.unmet).toEqual([0, 1, 2])
    expect(advice.conflicts.map(({ variable, unmet }) => [variable, unmet])).toEqual([
      [0, 2],
      [1, 2],
      [2, 2],
    ])
    expect(advice.drop.map(({ edge }) => edge)).toEqual([0, 1, 2])
    expect(advice.leaveOut).toHaveLength(2)
    expect(advice.room).toEqual({ needed: 3, usable: 9, ratio: 1 / 3, qubitsTooMany: 0, variablesTooMany: 0 })
  })

  it('leaves the rest of any state without conflicts, and never drops more than ten', () => {
    const random = createRandom(5)
    for (let round = 0; round < 60; round++) {
      const problem = randomGraph(6 + random.below(8), 0.3, random)
      const task = taskOf(problem, gridGraph(5, 5))
      // Straight random walks make connected chains that overlap.
      const lists = Array.from({ length: problem.order }, () => {
        const [row, from, length] = [random.below(5), random.below(3), 1 + random.below(3)]
        const across = random.float() < 0.5
        return Array.from({ length }, (_, i) => (across ? 5 * row + from + i : 5 * (from + i) + row))
      })
      const state = stateOf(task, lists)
      const { leaveOut, drop } = adviseOn(task, state)
      expect(drop.length).toBeLessThanOrEqual(10)
      expect(new Set(drop.map(({ edge }) => edge)).size).toBe(drop.length)
      for (const { conflicts } of drop) expect(conflicts).toBeGreaterThan(0)
      expect(leaveOut).not.toBeNull()
      const kept = lists.map((_, v) => v).filter((v) => !leaveOut!.includes(v))
      const ends = [...problem.ends].map((v) => kept.indexOf(v))
      const inner = ends.filter((_, i) => ends[i - (i % 2)]! >= 0 && ends[i - (i % 2) + 1]! >= 0)
      const rest = packChains(kept.map((v) => chainOf(state.chains, v)))
      expect(verifyEmbedding(graphFromEdges(kept.length, inner), task.machine, task.usable, rest)).toEqual([])
    }
  })

  it('does not list more variables to leave out than anyone would', () => {
    const task = taskOf(graphFromEdges(60, []), gridGraph(8, 8))
    const { leaveOut, items } = adviseOn(
      task,
      stateOf(
        task,
        Array.from({ length: 60 }, () => [0]),
      ),
    )
    expect(leaveOut).toBeNull()
    expect(items.map(({ kind }) => kind)).not.toContain('leave out variables')
  })

  it('estimates the room, and how much of the problem is too much', () => {
    const task = taskOf(cycleGraph(8), gridGraph(2, 4))
    const { room, items } = adviseOn(
      task,
      stateOf(
        task,
        Array.from({ length: 8 }, (_, v) => [v % 4, (v % 4) + 4]),
      ),
    )
    expect(room).toEqual({ needed: 16, usable: 8, ratio: 2, qubitsTooMany: 8, variablesTooMany: 4 })
    // A ring, with two interactions at each variable.
    expect(items.slice(0, 2).map(({ kind }) => kind)).toEqual(['more room', 'pre-solve'])
    expect(items[0]!.message).toContain('16 qubits, 200\u202f% of the 8 usable ones (an estimate)')
  })

  it('counts what pre-solving could take out', () => {
    // A triangle with a path of two at one corner, and a pair apart.
    const task = taskOf(graphFromEdges(7, [0, 1, 0, 2, 1, 2, 2, 3, 3, 4, 5, 6]), gridGraph(4, 4))
    const state = stateOf(task, [[0], [1], [4], [8], [12], [3], [3]])
    expect(adviseOn(task, state).presolve).toEqual({ degreeAtMostOne: 3, degreeTwo: 3, outsideCore: 4 })
  })

  it('names a larger machine of the family, with what it estimates', () => {
    const task = familyTask(completeGraph(8), { kind: 'chimera', m: 1, n: 1, t: 4 })
    const state = stateOf(
      task,
      Array.from({ length: 8 }, (_, v) => [v, v < 4 ? 4 : 0]),
    )
    const { larger, items } = adviseOn(task, state)
    expect(larger).toEqual({
      family: { kind: 'chimera', m: 2, n: 2, t: 4 },
      qubits: 32,
      share: 16 / 32,
      limitedBy: 'room',
    })
    expect(items[0]).toMatchObject({ kind: 'larger machine' })
    expect(items[0]!.message).toContain('C(2,2,4) may do')
  })

  it('speaks of estimates, and never of what is impossible or certain', () => {
    for (const { message } of adviseOn(crossing, crossed).items) {
      expect(message).toMatch(/\bmay\b/)
      expect(message).not.toMatch(/impossible|cannot|will |must/)
      expect(message.length).toBeLessThan(200)
    }
  })
})

describe('largerMachine', () => {
  it('asks for room and for treewidth', () => {
    const family: PublishedFamily = { kind: 'square', width: 10, height: 20 }
    expect(largerMachine(family, 190, 200, 3)).toMatchObject({ family: { width: 12, height: 22 }, limitedBy: 'room' })
    expect(largerMachine(family, 100, 200, 15)).toMatchObject({
      family: { width: 15, height: 25 },
      limitedBy: 'treewidth',
    })
  })

  it('expects as large a share to work as does', () => {
    const whole = largerMachine({ kind: 'pegasus', m: 4, trimmed: true }, 260, 264, 0)!
    const half = largerMachine({ kind: 'pegasus', m: 4, trimmed: true }, 260, 132, 0)!
    expect(whole.family).toMatchObject({ m: 5 })
    expect(half.family).toMatchObject({ m: 6 })
    expect(half.share).toBeCloseTo(260 / half.qubits)
  })

  it('is null where no size would do', () => {
    expect(largerMachine({ kind: 'king', width: 300, height: 300 }, 120_000, 90_000, 0)).toBeNull()
  })
})
