import { describe, expect, it } from 'vitest'
import type { Control } from '../../../../shared/engine/control'
import { findEmbedding } from '../../../../shared/engine/embedding/search'
import type { SearchProgress } from '../../../../shared/engine/embedding/progress'
import type { SearchOptions, SearchResult } from '../../../../shared/engine/embedding/search'
import { embeddingStats } from '../../../../shared/engine/embedding/stats'
import { verifyEmbedding } from '../../../../shared/engine/embedding/verify'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import type { Graph } from '../../../../shared/engine/graph/graph'
import { createRandom } from '../../../../shared/engine/random'
import {
  chimeraGraph,
  completeGraph,
  cycleGraph,
  gridGraph,
  kingGraph,
  permutation,
  randomGraph,
  regularGraph,
  relabelled,
  taskOf,
  usableExcept,
} from '../../../fixtures/graphs'

const allOf = (graph: Graph): Uint8Array => new Uint8Array(graph.order).fill(1)

/** A clock that stands still, so that only the work decides. */
function stillControl(): Control<SearchProgress> & { reports: SearchProgress[] } {
  const reports: SearchProgress[] = []
  return { now: () => 0, cancelled: () => false, report: (progress) => reports.push(progress), reports }
}

function search(
  problem: Graph,
  machine: Graph,
  options: Partial<SearchOptions>,
  usable = allOf(machine),
): SearchResult {
  const result = findEmbedding(taskOf(problem, machine, usable), { timeLimitSeconds: 1, ...options }, stillControl())
  if (result.embedding) expect(verifyEmbedding(problem, machine, usable, result.embedding)).toEqual([])
  return result
}

describe('findEmbedding', () => {
  it('embeds complete graphs', () => {
    for (const n of [1, 2, 3, 5, 8]) {
      const result = search(completeGraph(n), chimeraGraph(6, 6, 4), { seed: n, tries: 2 })
      expect(result.status).toBe('found')
      expect(result.partial).toBeNull()
    }
  })

  it('finds a graph in itself when chains of one qubit suffice', () => {
    const result = search(cycleGraph(4), chimeraGraph(1, 1, 2), { tries: 3 })
    expect(result.status).toBe('found')
    expect(result.embedding!.qubits).toHaveLength(4)
  })

  it('never gives an invalid embedding nor a qubit that is not usable, on random graphs and machines', () => {
    const random = createRandom(31)
    const machines = [chimeraGraph(4, 4, 4), kingGraph(9, 9), gridGraph(12, 12), chimeraGraph(8, 3, 2)]
    let found = 0
    for (let round = 0; round < 40; round++) {
      const plain = machines[round % machines.length]!
      const machine = relabelled(plain, permutation(plain.order, random))
      const usable = usableExcept(machine.order, 0.1 * random.float(), random)
      const problem = randomGraph(1 + random.below(14), random.float() * 0.6, random)
      const result = search(problem, machine, { seed: round, tries: 1 }, usable)
      if (result.status === 'found') found++
      else expect(result).toMatchObject({ status: 'none found', embedding: null })
    }
    expect(found).toBeGreaterThan(25)
  })

  it('embeds every seed of an easy instance, also on a renamed machine', () => {
    const random = createRandom(32)
    const machine = chimeraGraph(8, 8, 4)
    for (let seed = 0; seed < 10; seed++) {
      const problem = regularGraph(30, 3, random)
      const renamed = relabelled(machine, permutation(machine.order, random))
      expect(search(problem, renamed, { seed, tries: 1 }).status).toBe('found')
    }
  })

  it('gives isolated variables a qubit each and handles problems without interactions', () => {
    const machine = gridGraph(4, 3)
    const usable = allOf(machine)
    usable[5] = 0
    const empty = search(graphFromEdges(11, []), machine, { tries: 1 }, usable)
    expect(empty.embedding!.qubits).toHaveLength(11)
    const mixed = search(graphFromEdges(6, [1, 4, 4, 5, 1, 5]), machine, { tries: 1 }, usable)
    expect(mixed.status).toBe('found')
    expect(search(graphFromEdges(0, []), machine, { tries: 1 }).status).toBe('found')
  })

  it('places connected parts of the problem in different parts of the machine when it must', () => {
    // Four separate cells of K_{2,2}, four separate cycles of four.
    const cells = (count: number): number[] =>
      Array.from({ length: count }, (_, c) => [0, 1, 1, 2, 2, 3, 3, 0].map((v) => 4 * c + v)).flat()
    const result = search(graphFromEdges(16, cells(4)), graphFromEdges(16, cells(4)), { tries: 4 })
    expect(result.status).toBe('found')
  })

  it('stops at once when a bound forbids any embedding', () => {
    const result = search(completeGraph(9), gridGraph(2, 4), {})
    expect(result).toMatchObject({ status: 'none found', tryNumber: 0, partial: null })
  })

  it('reports the best overlapping state when none is found', () => {
    // K_5 is no minor of a planar grid (Wagner 1937), though no bound that is checked first forbids it.
    const machine = gridGraph(5, 5)
    const result = search(completeGraph(5), machine, { tries: 2 })
    expect(result.status).toBe('none found')
    const { chains, overlap, overlappedQubits, unmet, unplaced } = result.partial!
    const use = new Map<number, number>()
    for (const q of chains.qubits) use.set(q, (use.get(q) ?? 0) + 1)
    const shared = [...use].filter(([, count]) => count > 1).sort(([a], [b]) => a - b)
    expect(overlappedQubits).toEqual(shared.map(([q]) => q))
    expect(overlap).toBe(shared.reduce((sum, [, count]) => sum + count - 1, 0))
    expect(overlap).toBeGreaterThan(0)
    expect([unmet, unplaced]).toEqual([[], 0])
    const rules = new Set(verifyEmbedding(completeGraph(5), machine, allOf(machine), chains).map(({ rule }) => rule))
    expect(rules).toEqual(new Set(['shared qubit']))
  })

  it('gives the same embedding for the same seed and tries, whatever the clock says', () => {
    const problem = regularGraph(24, 3, createRandom(33))
    const machine = chimeraGraph(6, 6, 4)
    const ticking = {
      ...stillControl(),
      now: (
        (t) => () =>
          (t += 1e-4)
      )(0),
    }
    const first = search(problem, machine, { seed: 5, tries: 2, timeLimitSeconds: 5 })
    const second = findEmbedding(taskOf(problem, machine), { seed: 5, tries: 2, timeLimitSeconds: 5 }, ticking)
    expect(second.embedding).toEqual(first.embedding)
    expect(search(problem, machine, { seed: 6, tries: 2 }).embedding).not.toEqual(first.embedding)
  })

  it('keeps the best of its tries by longest chain, then total', () => {
    const machine = chimeraGraph(6, 6, 4)
    let improved = 0
    for (let seed = 0; seed < 3; seed++) {
      const problem = regularGraph(40, 3, createRandom(34, seed))
      const measure = (tries: number): number[] => {
        const stats = embeddingStats(
          search(problem, machine, { seed, tries, timeLimitSeconds: 0.5 * tries }).embedding!,
          problem,
          machine,
        )
        return [stats.chainLength.max, stats.qubitsUsed]
      }
      const ranks = [1, 2, 3].map(measure)
      const sorted = [...ranks].sort(([a, b], [c, d]) => c! - a! || d! - b!)
      expect(ranks).toEqual(sorted)
      if (String(ranks[2]) !== String(ranks[0])) improved++
    }
    expect(improved).toBeGreaterThan(0)
  })

  it('refuses options out of range', () => {
    const machine = gridGraph(3, 3)
    for (const options of [
      { tries: 0 },
      { seed: -1 },
      { seed: 0.5 },
      { timeLimitSeconds: 0 },
      { timeLimitSeconds: NaN },
    ])
      expect(() => search(cycleGraph(3), machine, options)).toThrow(RangeError)
    expect(() => search(cycleGraph(3), machine, {}, new Uint8Array(8))).toThrow(RangeError)
  })
})

describe('progress and stopping', () => {
  const problem = regularGraph(24, 3, createRandom(35))
  const machine = chimeraGraph(6, 6, 4)

  it('reports a fraction that never falls and ends at 1, with the phases in order', () => {
    // A clock that moves on with every look, so that there are reports from within passes too.
    const control = {
      ...stillControl(),
      now: (
        (t) => () =>
          (t += 0.03)
      )(0),
    }
    findEmbedding(taskOf(problem, machine), { tries: 3, timeLimitSeconds: 1e6 }, control)
    for (const number of [1, 2, 3]) {
      const fractions = control.reports.filter(({ tryNumber }) => tryNumber === number).map(({ fraction }) => fraction)
      expect(fractions).toEqual([...fractions].sort((a, b) => a - b))
      expect(fractions[0]).toBeGreaterThanOrEqual(0)
      expect(fractions.at(-1)).toBeLessThanOrEqual(1)
    }
    expect(new Set(control.reports.map(({ tryNumber }) => tryNumber))).toEqual(new Set([1, 2, 3]))
    expect(new Set(control.reports.map(({ phase }) => phase))).toEqual(new Set(['placing', 'rerouting', 'shortening']))
    expect(control.reports.at(-1)!.longestChain).toBeGreaterThan(0)
  })

  it('gives the best partial state when it is cancelled before any embedding', () => {
    let calls = 0
    const control = { ...stillControl(), cancelled: () => ++calls > 4 }
    const result = findEmbedding(taskOf(completeGraph(12), machine), { method: 'search' }, control)
    expect(result).toMatchObject({ status: 'cancelled', embedding: null, stoppedEarly: true, tryNumber: 1 })
    expect(result.partial!.chains.offsets).toHaveLength(13)
  })

  it('keeps the embedding that it has when it is cancelled or out of time later', () => {
    const untilFound = (): { control: Control<SearchProgress>; found: () => boolean } => {
      let found = false
      const report = ({ phase, tryNumber }: SearchProgress): void => {
        found ||= phase === 'shortening' || tryNumber > 1
      }
      return { control: { now: () => 0, cancelled: () => found, report }, found: () => found }
    }
    const cancelled = findEmbedding(taskOf(problem, machine), { tries: 50 }, untilFound().control)
    expect(cancelled).toMatchObject({ status: 'found', stoppedEarly: true, tryNumber: 1 })
    expect(verifyEmbedding(problem, machine, allOf(machine), cancelled.embedding!)).toEqual([])
    const late = untilFound()
    const clock = { ...late.control, cancelled: () => false, now: () => (late.found() ? 100 : 0) }
    const timedOut = findEmbedding(taskOf(problem, machine), { tries: 50, timeLimitSeconds: 60 }, clock)
    expect(timedOut).toMatchObject({ status: 'found', stoppedEarly: true, seconds: 100 })
  })

  it('is valid at whatever moment the clock cuts it short', () => {
    for (let limit = 20; limit < 600; limit += 31) {
      let t = 0
      const control = { ...stillControl(), now: () => t++ }
      const result = findEmbedding(taskOf(problem, machine), { tries: 2, timeLimitSeconds: limit }, control)
      if (result.embedding) expect(verifyEmbedding(problem, machine, allOf(machine), result.embedding)).toEqual([])
      else expect(result).toMatchObject({ status: 'timed out', stoppedEarly: true })
    }
  })
})
