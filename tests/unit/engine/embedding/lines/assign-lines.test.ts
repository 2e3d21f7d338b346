import { describe, expect, it } from 'vitest'
import { assignLines } from '../../../../../shared/engine/embedding/lines/assign-lines'
import type { Embedding } from '../../../../../shared/engine/embedding/embedding'
import type { PartialEmbedding } from '../../../../../shared/engine/embedding/method'
import { Watch } from '../../../../../shared/engine/embedding/progress'
import type { EmbeddingTask } from '../../../../../shared/engine/embedding/task'
import { verifyEmbedding } from '../../../../../shared/engine/embedding/verify'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import { createRandom } from '../../../../../shared/engine/random'
import { completeGraph, kingGraph, randomGraph, regularGraph, taskOf } from '../../../../fixtures/graphs'
import { SMALL_FAMILIES, taskOn } from './machines'

interface Outcome {
  readonly offers: Embedding[]
  readonly partial: PartialEmbedding | null
  readonly looks: number
}

/** Runs one try; it is cancelled at the given look at the flag. Every offer is checked. */
function run(task: EmbeddingTask, seed: number, cancelAt = Infinity): Outcome {
  let looks = 0
  const control = { now: () => 0, cancelled: () => ++looks > cancelAt, report: () => undefined }
  const offers: Embedding[] = []
  const partial = assignLines(task, {
    random: createRandom(seed),
    seconds: 0.1,
    objective: 'total qubits',
    kernel: 'plain',
    watch: new Watch(control, 'lines', 1, 1),
    offer: (embedding) => {
      expect(verifyEmbedding(task.problem, task.machine, task.usable, embedding)).toEqual([])
      offers.push(embedding)
    },
  })
  return { offers, partial, looks }
}

/** A partial state must be what it says: chains without overlap, that lack just what is listed. */
function checkPartial({ problem, machine, usable }: EmbeddingTask, partial: PartialEmbedding): void {
  const violations = verifyEmbedding(problem, machine, usable, partial.chains)
  const count = (rule: string): number => violations.filter((violation) => violation.rule === rule).length
  expect(partial).toMatchObject({ overlap: 0, overlappedQubits: [] })
  expect(count('missing coupler')).toBe(partial.unmet.length)
  expect(count('empty chain')).toBe(partial.unplaced)
  expect(violations).toHaveLength(partial.unmet.length + partial.unplaced)
  expect(partial.unmet.length + partial.unplaced).toBeGreaterThan(0)
}

describe('assignLines', () => {
  it('offers valid embeddings only, with missing qubits and couplers', () => {
    const random = createRandom(51)
    let found = 0
    for (let round = 0; round < 30; round++) {
      const problem = randomGraph(2 + random.below(12), 0.1 + 0.7 * random.float(), random)
      const task = taskOn(SMALL_FAMILIES[round % 5]!, problem, round % 3 ? 0.04 : 0, random)
      const { offers, partial } = run(task, round)
      if (offers.length > 0) found++
      else if (partial) checkPartial(task, partial)
    }
    expect(found).toBeGreaterThan(18)
  })

  it('embeds a regular graph of degree 6', () => {
    const random = createRandom(52)
    const task = taskOn({ kind: 'pegasus', m: 5, trimmed: true }, regularGraph(40, 6, random), 0.02, random)
    expect(run(task, 1).offers.length).toBeGreaterThan(0)
  })

  it('gives variables without interactions a qubit each', () => {
    const random = createRandom(53)
    const problem = graphFromEdges(9, [1, 2, 2, 3, 1, 3, 3, 7])
    const { offers } = run(taskOn(SMALL_FAMILIES[0]!, problem, 0.02, random), 1)
    expect(offers.length).toBeGreaterThan(0)
  })

  it('shows the closest state when there is no room', () => {
    const random = createRandom(54)
    const task = taskOn({ kind: 'chimera', m: 2, n: 2, t: 4 }, completeGraph(14), 0.02, random)
    const { offers, partial } = run(task, 1)
    expect(offers).toEqual([])
    checkPartial(task, partial!)
  })

  it('makes the same offers for the same seed, and others for another', () => {
    const random = createRandom(55)
    const task = taskOn(SMALL_FAMILIES[1]!, regularGraph(14, 4, random), 0.02, random)
    expect(run(task, 7)).toEqual(run(task, 7))
    expect(run(task, 7).offers).not.toEqual(run(task, 8).offers)
  })

  it('can be cancelled at any moment, and what it offered until then stands', () => {
    const random = createRandom(56)
    const task = taskOn(SMALL_FAMILIES[1]!, regularGraph(14, 4, random), 0.02, random)
    const { offers, looks } = run(task, 3)
    for (let cancelAt = 0; cancelAt < looks; cancelAt += Math.ceil(looks / 15)) {
      const cut = run(task, 3, cancelAt)
      expect(cut.looks).toBeLessThanOrEqual(cancelAt + 1)
      expect(cut.offers.length).toBeLessThanOrEqual(offers.length + 1)
      if (cut.partial) checkPartial(task, cut.partial)
    }
  })

  it('has nothing to show where qubits lie on no lines, or nobody said where they lie', () => {
    const king = kingGraph(4, 4)
    const points = Float32Array.from({ length: 4 * king.order }, (_, i) => Math.floor(i / 4) * 2 + (i % 2))
    for (const segments of [null, points]) {
      const { offers, partial } = run({ ...taskOf(completeGraph(4), king), segments }, 1)
      expect({ offers, partial }).toEqual({ offers: [], partial: null })
    }
  })
})
