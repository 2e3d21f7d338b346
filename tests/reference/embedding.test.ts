import { describe, expect, it } from 'vitest'
import type { Embedding } from '../../shared/engine/embedding/embedding'
import { DEFAULTS, findEmbedding } from '../../shared/engine/embedding/search'
import type { EmbeddingTask } from '../../shared/engine/embedding/task'
import { runTry } from '../../shared/engine/embedding/tries'
import { verifyEmbedding } from '../../shared/engine/embedding/verify'
import type { Graph } from '../../shared/engine/graph/graph'
import { keepEdges } from '../../shared/engine/graph/subgraph'
import { buildFabric } from '../../shared/engine/machine/build-fabric'
import type { PublishedFamily } from '../../shared/engine/machine/fabric'
import { createRandom } from '../../shared/engine/random'
import type { Random } from '../../shared/engine/random'
import {
  chimeraGraph,
  completeGraph,
  gridGraph,
  kingGraph,
  randomGraph,
  regularGraph,
  taskOf,
  usableExcept,
} from '../fixtures/graphs'
import { familyTask, METHODS, UNTIMED } from '../fixtures/methods'
import { chainLists, isMinorByContraction } from '../fixtures/minors'

type Mutation = (chains: number[][], machine: Graph, random: Random) => void
const pick = (list: number[], random: Random): number => list[random.below(list.length)]!

const MUTATIONS: Record<string, Mutation> = {
  'drop a qubit': (chains, _, random) => {
    const chain = chains[random.below(chains.length)]!
    chain.splice(random.below(chain.length), 1)
  },
  'share a qubit': (chains, _, random) => {
    const chain = chains[random.below(chains.length)]!
    const q = pick(chains[random.below(chains.length)]!, random)
    if (!chain.includes(q)) chain.push(q)
  },
  'add any qubit': (chains, machine, random) => {
    const chain = chains[random.below(chains.length)]!
    const q = random.below(machine.order)
    if (!chain.includes(q)) chain.push(q)
  },
  'move a qubit': (chains, machine, random) => {
    const chain = chains[random.below(chains.length)]!
    const q = random.below(machine.order)
    if (!chain.includes(q)) chain[random.below(chain.length)] = q
  },
  'exchange two chains': (chains, _, random) => {
    const [i, j] = [random.below(chains.length), random.below(chains.length)]
    ;[chains[i], chains[j]] = [chains[j]!, chains[i]!]
  },
  'cut a chain short': (chains, _, random) => {
    const chain = chains[random.below(chains.length)]!
    chain.length = Math.ceil(chain.length / 2)
  },
}

const INSTANCES = (['king', 'chimera'] as const).flatMap((family) =>
  [1, 2, 3].map((seed) => {
    const random = createRandom(seed, 50)
    const machine = family === 'king' ? kingGraph(12, 12) : chimeraGraph(6, 6, 4)
    const usable = usableExcept(machine.order, 0.04, random)
    const problem =
      seed === 1
        ? randomGraph(10, 0.5, random)
        : seed === 2
          ? regularGraph(20, 3, random)
          : randomGraph(18, 0.2, random)
    return { name: `${family} ${seed}`, problem, machine, usable, seed }
  }),
)

describe.each(INSTANCES)(
  'embedding on $name against contraction in graphology',
  ({ problem, machine, usable, seed }) => {
    const { embedding } = findEmbedding(
      taskOf(problem, machine, usable),
      { seed, tries: 3, timeLimitSeconds: 1 },
      UNTIMED,
    )
    const found = chainLists(embedding!)

    it('is a minor', () => {
      expect(isMinorByContraction(problem, machine, usable, found)).toBe(true)
      expect(verifyEmbedding(problem, machine, usable, embedding!)).toEqual([])
    })

    it.each(Object.keys(MUTATIONS))('has the same verdict of the checker after: %s', (name) => {
      const random = createRandom(seed, 60)
      const verdicts = new Set<boolean>()
      for (let round = 0; round < 15; round++) {
        const chains = found.map((chain) => [...chain])
        MUTATIONS[name]!(chains, machine, random)
        const valid = isMinorByContraction(problem, machine, usable, chains)
        verdicts.add(valid)
        expect(verifyEmbedding(problem, machine, usable, chains).length === 0).toBe(valid)
      }
      expect(verdicts.has(false)).toBe(true)
    })
  },
)

const C6: PublishedFamily = { kind: 'chimera', m: 6, n: 6, t: 4 }
const P4: PublishedFamily = { kind: 'pegasus', m: 4, trimmed: true }
const Z3: PublishedFamily = { kind: 'zephyr', m: 3, t: 4 }
const WORN = { qubits: 0.02, couplers: 0.01 }

const WORN_MACHINES: readonly (readonly [string, (random: Random) => Graph, PublishedFamily])[] = [
  ['K_10 on C6', () => completeGraph(10), C6],
  ['K_16 on P4', () => completeGraph(16), P4],
  ['K_16 on Z3', () => completeGraph(16), Z3],
  ['G(20, 0.3) on P4', (random) => randomGraph(20, 0.3, random), P4],
  ['6-regular 20 on Z3', (random) => regularGraph(20, 6, random), Z3],
  ['3-regular 30 on C6', (random) => regularGraph(30, 3, random), C6],
]

describe.each(WORN_MACHINES)('%s with missing qubits and couplers', (_, make, family) => {
  const SEEDS = [1, 2]
  const taskOfSeed = (seed: number): EmbeddingTask => {
    const random = createRandom(seed, 51)
    return familyTask(make(random), family, WORN, random)
  }
  const isMinor = ({ problem, machine, usable }: EmbeddingTask, embedding: Embedding): boolean =>
    isMinorByContraction(problem, machine, usable, chainLists(embedding))

  it.each(METHODS)('what %s finds is a minor by contraction', (method) => {
    const tasks = SEEDS.map(taskOfSeed)
    const found = tasks.map(
      (task, k) => findEmbedding(task, { seed: SEEDS[k]!, method, tries: 1, timeLimitSeconds: 1 }, UNTIMED).embedding,
    )
    found.forEach((embedding, k) => embedding && expect(isMinor(tasks[k]!, embedding)).toBe(true))
    // Only the general method has to find something everywhere.
    if (method === 'search') expect(found).not.toContain(null)
  })

  it('what is shortened or repaired is a minor by contraction, and frozen chains stay', () => {
    for (const seed of SEEDS) {
      const task = taskOfSeed(seed)
      const chains = findEmbedding(task, { seed, tries: 1, timeLimitSeconds: 1 }, UNTIMED).embedding!
      const frozen = Uint8Array.from({ length: task.problem.order }, (_, v) => (v === 0 ? 1 : 0))
      const before = chainLists(chains)
      const shortened = findEmbedding(
        { ...task, start: { chains, frozen } },
        { method: 'shorten', seed, timeLimitSeconds: 1 },
        UNTIMED,
      )
      expect(isMinor(task, shortened.embedding!)).toBe(true)
      expect(shortened.embedding!.qubits.length).toBeLessThanOrEqual(chains.qubits.length)
      expect(chainLists(shortened.embedding!)[0]).toEqual(before[0])

      const broken = before[1]![0]!
      const usable = task.usable.map((works, q) => (q === broken ? 0 : works))
      const works = Uint8Array.from({ length: task.machine.ends.length / 2 }, (_, k) =>
        task.machine.ends[2 * k] === broken || task.machine.ends[2 * k + 1] === broken ? 0 : 1,
      )
      const worse = { ...task, usable, machine: keepEdges(task.machine, works), start: { chains, frozen } }
      const repaired = findEmbedding(worse, { method: 'repair', seed, timeLimitSeconds: 1 }, UNTIMED)
      expect(isMinor(worse, repaired.embedding!)).toBe(true)
      expect(chainLists(repaired.embedding!)[0]).toEqual(before[0])
    }
  })
})

describe('published constructions bound what has to be found', () => {
  // Choi, Quantum Inf. Process. 10, 343 (2011): Chimera C(4, 4, 4) holds K_16 (chains of 5); half of that size must be
  // within reach of a heuristic. Boothby et al., arXiv:2003.00133: Pegasus P(6) holds K_62 by construction.
  it.each([
    ['K_8 in Chimera C(4, 4, 4)', completeGraph(8), chimeraGraph(4, 4, 4)],
    ['K_30 in Pegasus P(6)', completeGraph(30), buildFabric({ kind: 'pegasus', m: 6, trimmed: true }).graph],
  ])('%s', (_, problem, machine) => {
    const usable = new Uint8Array(machine.order).fill(1)
    const { embedding } = findEmbedding(
      taskOf(problem, machine, usable),
      { seed: 1, tries: 3, timeLimitSeconds: 1 },
      UNTIMED,
    )
    expect(isMinorByContraction(problem, machine, usable, chainLists(embedding!))).toBe(true)
  })

  it('finds no minor that theory forbids', () => {
    // A grid is planar and so has no K_5 minor (Wagner, Math. Ann. 114, 1937). One row of Chimera cells with t = 2 has
    // treewidth 2 (a path of bags of three: two horizontal qubits and one more), so it has no K_4 minor.
    for (const [problem, machine] of [
      [completeGraph(5), gridGraph(7, 7)],
      [completeGraph(4), chimeraGraph(1, 6, 2)],
    ] as const) {
      const task = taskOf(problem, machine)
      expect(findEmbedding(task, { tries: 3, timeLimitSeconds: 1 }, UNTIMED).status).toBe('none found')
      for (const method of METHODS)
        expect(
          runTry(task, { tryNumber: 1, method, share: 1 }, { ...DEFAULTS, timeLimitSeconds: 1 }, UNTIMED).embedding,
        ).toBeNull()
    }
  })
})
