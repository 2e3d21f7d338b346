/**
 * Small random cases: what the engine finds is a minor by contraction in graphology and never has fewer qubits than the
 * exhaustive search (tests/fixtures/minors.ts); what it proves impossible, that search does not find either; and what it
 * does not find but exists is rare. Names of qubits and variables mean nothing.
 */
import { describe, expect, it } from 'vitest'
import { packChains } from '../../shared/engine/embedding/embedding'
import { provedInfeasible, THOROUGH } from '../../shared/engine/embedding/feasibility'
import { findEmbedding } from '../../shared/engine/embedding/search'
import type { EmbeddingTask } from '../../shared/engine/embedding/task'
import { verifyEmbedding } from '../../shared/engine/embedding/verify'
import type { PublishedFamily } from '../../shared/engine/machine/fabric'
import { createRandom } from '../../shared/engine/random'
import type { Random } from '../../shared/engine/random'
import { permutation, randomGraph, relabelled, taskOf, usableExcept } from '../fixtures/graphs'
import { familyTask, UNTIMED } from '../fixtures/methods'
import { chainLists, isMinorByContraction, leastQubits } from '../fixtures/minors'

/** Each case is given to one of these in turn. Only the last two have to find what exists. */
const TURNS = ['lines', 'template', 'search', 'auto'] as const
/** Largest share of the possible cases in which none may be found. */
const MISSED_SHARE = 0.05

const DEFECTS = { qubits: 0.08, couplers: 0.06 }

const onFamily =
  (family: PublishedFamily, variables = 6) =>
  (random: Random): EmbeddingTask =>
    familyTask(smallProblem(random, variables), family, DEFECTS, random)

function smallProblem(random: Random, variables = 6): EmbeddingTask['problem'] {
  return randomGraph(2 + random.below(variables - 1), 0.3 + 0.7 * random.float(), random)
}

type Make = (random: Random) => EmbeddingTask

/** Machines with the number of cases tried on each, 2,000 together. */
const MACHINES: readonly (readonly [string, number, Make])[] = [
  ['a 3 × 3 grid', 500, onFamily({ kind: 'square', width: 3, height: 3 })],
  ['a 3 × 3 king’s graph', 500, onFamily({ kind: 'king', width: 3, height: 3 })],
  ['Chimera C(2, 1, 2)', 300, onFamily({ kind: 'chimera', m: 2, n: 1, t: 2 })],
  ['Zephyr Z(1, 1)', 200, onFamily({ kind: 'zephyr', m: 1, t: 1 }, 5)],
  [
    'a random machine of 9 qubits',
    500,
    (random) => taskOf(smallProblem(random), randomGraph(9, 0.35, random), usableExcept(9, DEFECTS.qubits, random)),
  ],
]

describe('small random cases', () => {
  it.each(MACHINES)('on %s: %i cases', (_, cases, make) => {
    let possible = 0
    let missed = 0
    for (let seed = 1; seed <= cases; seed++) {
      const task = make(createRandom(seed, 90))
      const { problem, machine, usable } = task
      const method = TURNS[seed % TURNS.length]!
      const { status, embedding } = findEmbedding(task, { seed, method, tries: 1, timeLimitSeconds: 0.1 }, UNTIMED)
      const least = leastQubits(problem, machine, usable)
      const hasToFind = least !== null && (method === 'search' || method === 'auto')
      if (hasToFind) possible++
      expect(status).toBe(embedding ? 'found' : 'none found')
      if (embedding) {
        expect(isMinorByContraction(problem, machine, usable, chainLists(embedding))).toBe(true)
        expect(least).not.toBeNull()
        expect(embedding.qubits.length).toBeGreaterThanOrEqual(least!)
      } else if (hasToFind) missed++
      if (provedInfeasible(task)) expect(least).toBeNull()
      if (provedInfeasible(task, THOROUGH)) expect(least).toBeNull()
    }
    expect(possible).toBeGreaterThan(cases / 5)
    expect(missed / possible).toBeLessThanOrEqual(MISSED_SHARE)
  })
})

/** The task under new names of variables and qubits; nothing is said any more of where the qubits lie. */
function renamed(task: EmbeddingTask, variables: readonly number[], qubits: readonly number[]): EmbeddingTask {
  const usable = new Uint8Array(task.usable.length)
  qubits.forEach((name, q) => (usable[name] = task.usable[q]!))
  return taskOf(relabelled(task.problem, variables), relabelled(task.machine, qubits), usable)
}

describe('names mean nothing', () => {
  it.each(MACHINES)('renaming keeps the checker’s verdict and the bounds, on %s', (_, _cases, make) => {
    const verdicts = new Set<boolean>()
    for (let seed = 1; seed <= 25; seed++) {
      const random = createRandom(seed, 91)
      const task = make(random)
      const { problem, machine, usable } = task
      const variables = permutation(problem.order, random)
      const qubits = permutation(machine.order, random)
      const other = renamed(task, variables, qubits)
      const { embedding } = findEmbedding(task, { seed, tries: 1, timeLimitSeconds: 0.5 }, UNTIMED)
      const bare = taskOf(problem, machine, usable)
      expect(provedInfeasible(other)?.code).toBe(provedInfeasible(bare)?.code)
      if (!embedding) continue
      const chains = chainLists(embedding)
      if (seed % 2 === 0) chains[random.below(chains.length)]![0] = random.below(machine.order)
      const mapped: number[][] = []
      chains.forEach((chain, v) => (mapped[variables[v]!] = chain.map((q) => qubits[q]!)))
      const rulesOf = (on: EmbeddingTask, list: number[][]): string[] =>
        verifyEmbedding(on.problem, on.machine, on.usable, list)
          .map(({ rule }) => rule)
          .sort()
      expect(rulesOf(other, mapped)).toEqual(rulesOf(task, chains))
      expect(isMinorByContraction(other.problem, other.machine, other.usable, mapped)).toBe(
        rulesOf(other, mapped).length === 0,
      )
      verdicts.add(rulesOf(other, mapped).length === 0)
    }
    expect(verdicts).toEqual(new Set([true, false]))
  })

  it.each(MACHINES)('what is found under other names is valid under the old ones, on %s', (_, _cases, make) => {
    for (let seed = 1; seed <= 25; seed++) {
      const random = createRandom(seed, 92)
      const task = make(random)
      const variables = permutation(task.problem.order, random)
      const qubits = permutation(task.machine.order, random)
      const { embedding } = findEmbedding(
        renamed(task, variables, qubits),
        { seed, tries: 1, timeLimitSeconds: 0.5 },
        UNTIMED,
      )
      if (!embedding) continue
      const lists = chainLists(embedding)
      const back = variables.map((name) => lists[name]!.map((q) => qubits.indexOf(q)))
      expect(verifyEmbedding(task.problem, task.machine, task.usable, packChains(back))).toEqual([])
      expect(isMinorByContraction(task.problem, task.machine, task.usable, back)).toBe(true)
    }
  })
})
