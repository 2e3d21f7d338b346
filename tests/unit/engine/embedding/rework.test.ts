import { describe, expect, it } from 'vitest'
import { chainOf, packChains } from '../../../../shared/engine/embedding/embedding'
import type { Embedding } from '../../../../shared/engine/embedding/embedding'
import { qualityOf } from '../../../../shared/engine/embedding/objective'
import { findEmbedding } from '../../../../shared/engine/embedding/search'
import type { SearchOptions } from '../../../../shared/engine/embedding/search'
import type { EmbeddingTask } from '../../../../shared/engine/embedding/task'
import { verifyEmbedding } from '../../../../shared/engine/embedding/verify'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import { createRandom } from '../../../../shared/engine/random'
import { chimeraGraph, cycleGraph, gridGraph, regularGraph, taskOf } from '../../../fixtures/graphs'

const control = { now: () => 0, cancelled: () => false, report: () => {} }
const run = (task: EmbeddingTask, options: Partial<SearchOptions>) =>
  findEmbedding(task, { timeLimitSeconds: 1, ...options }, control)
const none = (task: EmbeddingTask): Uint8Array => new Uint8Array(task.problem.order)

const machine = chimeraGraph(8, 8, 4)
const problem = regularGraph(40, 3, createRandom(51))
const task = taskOf(problem, machine)
const first = run(task, { method: 'search', seed: 3, tries: 1 }).embedding!

/** Variables whose chains differ. */
const changed = (a: Embedding, b: Embedding): number[] =>
  Array.from({ length: problem.order }, (_, v) => v).filter((v) => String(chainOf(a, v)) !== String(chainOf(b, v)))

describe('repair', () => {
  it('leaves an embedding that still holds as it is', () => {
    const result = run({ ...task, start: { chains: first, frozen: none(task) } }, { method: 'repair', tries: 1 })
    expect(result).toMatchObject({ status: 'found', method: 'repair' })
    expect(changed(first, result.embedding!)).toEqual([])
  })

  it('changes little where qubits have gone, and nothing that is frozen', () => {
    const random = createRandom(52)
    for (let round = 0; round < 12; round++) {
      const usable = task.usable.slice()
      for (let i = 0; i < 3; i++) usable[first.qubits[random.below(first.qubits.length)]!] = 0
      const hit = Array.from({ length: problem.order }, (_, v) => v).filter((v) =>
        [...chainOf(first, v)].some((q) => !usable[q]),
      )
      const frozen = none(task)
      for (let v = 0; v < problem.order; v++) if (!hit.includes(v) && random.float() < 0.3) frozen[v] = 1
      const result = run(
        { ...task, usable, start: { chains: first, frozen } },
        { method: 'repair', tries: 1, seed: round },
      )
      if (!result.embedding) continue
      expect(verifyEmbedding(problem, machine, usable, result.embedding)).toEqual([])
      const differing = changed(first, result.embedding)
      expect(differing).toEqual(expect.arrayContaining(hit))
      expect(differing.filter((v) => frozen[v])).toEqual([])
      expect(differing.length).toBeLessThan(problem.order / 2)
    }
  })

  it('moves about as many chains again as were hit, and no more', () => {
    const wide = regularGraph(60, 3, createRandom(51))
    const begin = taskOf(wide, machine)
    const { embedding: before } = run(begin, { method: 'search', seed: 3, tries: 1 })
    const random = createRandom(7)
    let [hits, others] = [0, 0]
    for (let round = 0; round < 15; round++) {
      const usable = begin.usable.slice()
      for (let i = 0; i < 8; i++) usable[before!.qubits[random.below(before!.qubits.length)]!] = 0
      const start = { chains: before!, frozen: none(begin) }
      const { embedding } = run({ ...begin, usable, start }, { method: 'repair', tries: 1, seed: round })
      for (let v = 0; v < wide.order; v++) {
        const chain = chainOf(before!, v)
        if (chain.some((q) => !usable[q])) hits++
        else if (String(chain) !== String(chainOf(embedding!, v))) others++
      }
    }
    expect(hits).toBe(112)
    expect(others).toBeLessThan(160)
  })

  it('takes in new variables and interactions', () => {
    const more = graphFromEdges(42, [...problem.ends, 40, 0, 40, 5, 0, 39])
    const chains = packChains([...Array.from({ length: 40 }, (_, v) => chainOf(first, v)), [], []])
    const grown: EmbeddingTask = { ...taskOf(more, machine), start: { chains, frozen: new Uint8Array(42) } }
    const result = run(grown, { method: 'repair', tries: 1 })
    expect(verifyEmbedding(more, machine, task.usable, result.embedding!)).toEqual([])
    const differing = Array.from({ length: 40 }, (_, v) => v).filter(
      (v) => String(chainOf(first, v)) !== String(chainOf(result.embedding!, v)),
    )
    expect(differing.length).toBeLessThan(20)
  })

  it('gives the closest state when a frozen chain no longer stands', () => {
    const usable = task.usable.slice()
    usable[chainOf(first, 7)[0]!] = 0
    const frozen = none(task)
    frozen[7] = 1
    const result = run({ ...task, usable, start: { chains: first, frozen } }, { method: 'repair', tries: 1 })
    expect(result.status).toBe('none found')
    expect(result.partial).not.toBeNull()
  })

  it('needs something to begin from', () => {
    expect(() => run(task, { method: 'repair' })).toThrow(RangeError)
    expect(() => run(task, { method: 'shorten' })).toThrow(RangeError)
  })
})

describe('shorten', () => {
  it('never makes it worse, and leaves frozen chains as they are', () => {
    // A cycle of four laid out with long detours on a grid.
    const cycle = cycleGraph(4)
    const grid = gridGraph(6, 6)
    const chains = packChains([
      [0, 1, 2, 3, 4, 5, 11, 17],
      [23, 29, 35, 34, 33],
      [32, 31, 30, 24],
      [18, 12, 6],
    ])
    const start: EmbeddingTask = { ...taskOf(cycle, grid), start: { chains, frozen: new Uint8Array(4) } }
    expect(verifyEmbedding(cycle, grid, start.usable, chains)).toEqual([])
    const result = run(start, { method: 'shorten', tries: 1 })
    expect(qualityOf(result.embedding!).total).toBeLessThan(12)
    const frozen = Uint8Array.from([0, 1, 0, 0])
    const held = run({ ...start, start: { chains, frozen } }, { method: 'shorten', tries: 1 })
    expect(chainOf(held.embedding!, 1)).toEqual(chainOf(chains, 1))
    expect(qualityOf(held.embedding!).total).toBeLessThan(20)
  })

  it('minds long chains first or the total first, as asked', () => {
    const begin = { ...task, start: { chains: first, frozen: none(task) } }
    const longest = run(begin, { method: 'shorten', tries: 1, objective: 'longest chain' })
    const total = run(begin, { method: 'shorten', tries: 1, objective: 'total qubits' })
    expect(qualityOf(longest.embedding!).longest).toBeLessThanOrEqual(qualityOf(first).longest)
    expect(qualityOf(total.embedding!).total).toBeLessThanOrEqual(qualityOf(first).total)
  })
})

describe('kernels', () => {
  it('make no difference to an embedding', () => {
    const plain = run(task, { method: 'search', seed: 9, tries: 2, kernel: 'plain' })
    const assembly = run(task, { method: 'search', seed: 9, tries: 2, kernel: 'assembly' })
    expect(assembly.embedding).toEqual(plain.embedding)
  })
})

describe('corners', () => {
  it('repairs an interaction between two chains that both lie beside damaged ones', () => {
    const path = (n: number) => graphFromEdges(n, Array.from({ length: n - 1 }, (_, i) => [i, i + 1]).flat())
    const start = { chains: packChains([[], [2], [5], []]), frozen: new Uint8Array(4) }
    const result = run({ ...taskOf(path(4), path(10)), start }, { method: 'repair', tries: 1 })
    expect(verifyEmbedding(path(4), path(10), new Uint8Array(10).fill(1), result.embedding!)).toEqual([])
  })

  it('gives a qubit that two chains of the start share to the frozen one', () => {
    const path = graphFromEdges(6, [0, 1, 1, 2, 2, 3, 3, 4, 4, 5])
    const pair = graphFromEdges(2, [0, 1])
    const start = { chains: packChains([[2, 3], [3]]), frozen: Uint8Array.from([0, 1]) }
    const result = run({ ...taskOf(pair, path), start }, { method: 'repair', tries: 1 })
    expect([...chainOf(result.embedding!, 1)]).toEqual([3])
  })

  it('makes room for variables without interactions by shortening', () => {
    const small = chimeraGraph(4, 4, 4)
    const core = regularGraph(16, 3, createRandom(5))
    const total = qualityOf(run(taskOf(core, small), { method: 'search', tries: 1 }).embedding!).total
    const wide = graphFromEdges(16 + small.order - total - 4, core.ends)
    expect(run(taskOf(wide, small), { method: 'search', tries: 1 }).status).toBe('found')
  })

  it('says what ended it, also before a try has begun', () => {
    const cancelled = findEmbedding(task, {}, { ...control, cancelled: () => true })
    expect(cancelled).toMatchObject({ status: 'cancelled', stoppedEarly: true })
  })

  it('stops as soon as the target is reached', () => {
    const start = { chains: first, frozen: none(task) }
    const all = run({ ...task, start }, { method: 'shorten', tries: 1, objective: 'total qubits' })
    const totalQubits = qualityOf(all.embedding!).total + 4
    let looks = 0
    const counting = { ...control, cancelled: () => (looks++, false) }
    const target = { longestChain: null, totalQubits }
    const options = { method: 'shorten', tries: 1, objective: 'total qubits' } as const
    findEmbedding({ ...task, start }, options, counting)
    const full = looks
    looks = 0
    const reached = findEmbedding({ ...task, start }, { ...options, target }, counting)
    expect(qualityOf(reached.embedding!).total).toBeLessThanOrEqual(totalQubits)
    expect(looks).toBeLessThan(full)
  })
})
