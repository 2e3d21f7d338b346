/**
 * Guards the quality of embeddings: medians over seeds on small instances may not get worse than the stored ones by more
 * than 5 %. The clock stands still, so the figures depend on the engine only. To store the figures of today:
 *
 *     STORE_EMBEDDING_QUALITY=1 npx vitest run --project reference tests/reference/embedding-quality.test.ts
 */
import { readFileSync, writeFileSync } from 'node:fs'
import { afterAll, describe, expect, it } from 'vitest'
import { qualityOf } from '../../shared/engine/embedding/objective'
import { findEmbedding } from '../../shared/engine/embedding/search'
import type { Graph } from '../../shared/engine/graph/graph'
import type { PublishedFamily } from '../../shared/engine/machine/fabric'
import { createRandom } from '../../shared/engine/random'
import { completeGraph, gridGraph, permutation, randomGraph, regularGraph, relabelled } from '../fixtures/graphs'
import { familyTask, UNTIMED } from '../fixtures/methods'

interface Stored {
  readonly found: number
  readonly qubits: number
  readonly longest: number
}

const FILE = new URL('../fixtures/embedding-quality.json', import.meta.url)
const STORING = process.env.STORE_EMBEDDING_QUALITY === '1'
const SEEDS = [1, 2, 3]
/** Worst allowed figure as a multiple of the stored one. */
const ALLOWED = 1.05

const C6: PublishedFamily = { kind: 'chimera', m: 6, n: 6, t: 4 }
const P4: PublishedFamily = { kind: 'pegasus', m: 4, trimmed: true }
const Z3: PublishedFamily = { kind: 'zephyr', m: 3, t: 4 }
const KING: PublishedFamily = { kind: 'king', width: 16, height: 16 }
const INTACT = { qubits: 0, couplers: 0 }
const WORN = { qubits: 0.03, couplers: 0.02 }

type Make = (seed: number) => Graph
const random = (seed: number) => createRandom(seed, 70)
const shuffled = (graph: Graph, seed: number): Graph => relabelled(graph, permutation(graph.order, random(seed)))

const INSTANCES: readonly (readonly [string, Make, PublishedFamily, typeof INTACT])[] = [
  ['3-regular 40 on C6', (seed) => regularGraph(40, 3, random(seed)), C6, INTACT],
  ['3-regular 60 on P4', (seed) => regularGraph(60, 3, random(seed)), P4, INTACT],
  ['3-regular 40 on P4 with defects', (seed) => regularGraph(40, 3, random(seed)), P4, WORN],
  ['6-regular 24 on P4', (seed) => regularGraph(24, 6, random(seed)), P4, INTACT],
  ['G(20, 0.3) on P4', (seed) => randomGraph(20, 0.3, random(seed)), P4, INTACT],
  ['G(24, 0.25) on Z3 with defects', (seed) => randomGraph(24, 0.25, random(seed)), Z3, WORN],
  ['grid 8² on C6', (seed) => shuffled(gridGraph(8, 8), seed), C6, INTACT],
  ['grid 8² on the 16² king’s graph', (seed) => shuffled(gridGraph(8, 8), seed), KING, INTACT],
  ['K_12 on C6', () => completeGraph(12), C6, INTACT],
  ['K_20 on P4', () => completeGraph(20), P4, INTACT],
  ['K_18 on Z3 with defects', () => completeGraph(18), Z3, WORN],
]

const median = (values: readonly number[]): number => [...values].sort((a, b) => a - b)[values.length >> 1]!

/** Seeds on which an embedding was found, and the medians of those. */
function measure([, make, family, shares]: (typeof INSTANCES)[number]): Stored {
  const found = SEEDS.flatMap((seed) => {
    const task = familyTask(make(seed), family, shares, createRandom(seed, 71))
    const { embedding } = findEmbedding(task, { seed, tries: 1, timeLimitSeconds: 2 }, UNTIMED)
    return embedding ? [qualityOf(embedding)] : []
  })
  return {
    found: found.length,
    qubits: median(found.map(({ total }) => total)),
    longest: median(found.map(({ longest }) => longest)),
  }
}

describe('quality of embeddings against the stored figures', () => {
  const stored: Record<string, Stored> = STORING ? {} : JSON.parse(readFileSync(FILE, 'utf8'))
  const measured: Record<string, Stored> = {}

  it.each(INSTANCES)('%s', (...instance) => {
    const [name] = instance
    const now = measure(instance)
    measured[name] = now
    expect(now.found).toBeGreaterThan(0)
    if (STORING) return
    expect(now.found).toBeGreaterThanOrEqual(stored[name]!.found)
    expect(now.qubits).toBeLessThanOrEqual(ALLOWED * stored[name]!.qubits)
    expect(now.longest).toBeLessThanOrEqual(ALLOWED * stored[name]!.longest)
  })

  it('has a stored figure for every instance and no other', () => {
    const names = INSTANCES.map(([name]) => name)
    expect(Object.keys(STORING ? measured : stored)).toEqual(names)
  })

  afterAll(() => {
    if (STORING) writeFileSync(FILE, `${JSON.stringify(measured, null, 2)}\n`)
  })
})
