import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { embeddingDamage } from '../../../../shared/engine/embedding/damage'
import { packChains } from '../../../../shared/engine/embedding/embedding'
import { verifyEmbedding } from '../../../../shared/engine/embedding/verify'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import type { Graph } from '../../../../shared/engine/graph/graph'
import type { WorkingGraph } from '../../../../shared/engine/machine/fabric'
import { createRandom } from '../../../../shared/engine/random'
import { cycleGraph, gridGraph } from '../../../fixtures/graphs'

type Pair = [number, number]
const pairsOf = ({ ends }: Graph): Pair[] =>
  Array.from({ length: ends.length / 2 }, (_, k): Pair => [ends[2 * k]!, ends[2 * k + 1]!])
const key = ([a, b]: Pair): string => (a < b ? `${a} ${b}` : `${b} ${a}`)

/** The machine without some qubits and couplers. */
function without(graph: Graph, qubits: readonly number[], couplers: readonly Pair[]): WorkingGraph {
  const gone = new Set(couplers.map(key))
  const left = pairsOf(graph).filter((pair) => !gone.has(key(pair)) && !pair.some((q) => qubits.includes(q)))
  const usable = Uint8Array.from({ length: graph.order }, (_, q) => (qubits.includes(q) ? 0 : 1))
  return { graph: graphFromEdges(graph.order, left.flat()), usable }
}

// A triangle on a 3 × 2 grid, 0 1 2 / 3 4 5: chains 0–3, 1, 4.
const triangle = cycleGraph(3)
const grid = gridGraph(3, 2)
const CHAINS = packChains([[0, 3], [1], [4]])
const whole = without(grid, [], [])
const damageBy = (qubits: number[], couplers: Pair[]) =>
  embeddingDamage(triangle, CHAINS, whole, without(grid, qubits, couplers))

describe('embeddingDamage', () => {
  it('is null where nothing of the embedding is lost', () => {
    expect(damageBy([], [])).toBeNull()
    expect(damageBy([2, 5], [[1, 2]])).toBeNull()
  })

  it('lays a lost qubit to its own chain, and not to its partners', () => {
    expect(damageBy([3], [])).toEqual({ chains: [0], qubits: [3], couplers: [] })
    expect(damageBy([4, 1], [])).toEqual({ chains: [1, 2], qubits: [1, 4], couplers: [] })
  })

  it('names lost couplers inside chains and between them', () => {
    expect(damageBy([], [[3, 0]])).toEqual({ chains: [0], qubits: [], couplers: [[0, 3]] })
    expect(damageBy([], [[1, 4]])).toEqual({ chains: [1, 2], qubits: [], couplers: [[1, 4]] })
  })

  it('damages no chain by a coupler that others stand in for, but names it', () => {
    const square = packChains([[0, 1, 3, 4]])
    const one = graphFromEdges(1, [])
    expect(embeddingDamage(one, square, whole, without(grid, [], [[0, 1]]))).toEqual({
      chains: [],
      qubits: [],
      couplers: [[0, 1]],
    })
  })

  it('does not name couplers between chains that do not interact, nor those that were missing before', () => {
    const path = graphFromEdges(3, [0, 1, 0, 2])
    expect(embeddingDamage(path, CHAINS, whole, without(grid, [], [[1, 4]]))).toBeNull()
    const made = without(grid, [], [[1, 4]])
    expect(embeddingDamage(path, CHAINS, made, made)).toBeNull()
  })
})

/** Connected disjoint chains on a grid, and as interactions some of the pairs of chains that touch. */
function drawn(seed: number) {
  const random = createRandom(seed)
  const [width, height] = [2 + random.below(5), 2 + random.below(5)]
  const machine = gridGraph(width, height)
  const owner = new Array<number>(machine.order).fill(-1)
  const chains: number[][] = []
  for (let tries = 0; tries < machine.order; tries++) {
    const chain = [random.below(machine.order)]
    if (owner[chain[0]!] !== -1) continue
    for (let i = 0; i < chain.length && chain.length < 5; i++)
      for (const [a, b] of pairsOf(machine)) {
        const next = a === chain[i] ? b : b === chain[i] ? a : -1
        if (next >= 0 && owner[next] === -1 && !chain.includes(next) && random.float() < 0.4) chain.push(next)
      }
    for (const q of chain) owner[q] = chains.length
    chains.push(chain)
  }
  const touching = pairsOf(machine).filter(([a, b]) => owner[a]! >= 0 && owner[b]! >= 0 && owner[a] !== owner[b])
  const meeting = new Map(
    touching.map(([a, b]): [string, Pair] => [key([owner[a]!, owner[b]!]), [owner[a]!, owner[b]!]]),
  )
  const problem = graphFromEdges(chains.length, [...meeting.values()].filter(() => random.float() < 0.7).flat())
  const lostQubits = Array.from({ length: machine.order }, (_, q) => q).filter(() => random.float() < 0.08)
  const lostCouplers = pairsOf(machine).filter(() => random.float() < 0.1)
  return { machine, owner, chains, problem, lostQubits, lostCouplers }
}

it('agrees with the checker and with a recount pair by pair', () => {
  fc.assert(
    fc.property(fc.nat(), (seed) => {
      const { machine, owner, chains, problem, lostQubits, lostCouplers } = drawn(seed)
      const made = without(machine, [], [])
      const now = without(machine, lostQubits, lostCouplers)
      const damage = embeddingDamage(problem, packChains(chains), made, now)
      const interacting = new Set(pairsOf(problem).map(key))
      const violations = verifyEmbedding(problem, now.graph, now.usable, chains)
      const couplers = pairsOf(machine).filter(([a, b]) => {
        const [i, j] = [owner[a]!, owner[b]!]
        const used = i >= 0 && j >= 0 && (i === j || interacting.has(key([i, j])))
        return used && lostCouplers.some((lost) => key(lost) === key([a, b])) && now.usable[a] && now.usable[b]
      })
      const qubits = lostQubits.filter((q) => owner[q]! >= 0)
      const torn = new Set(
        violations.filter(({ rule }) => rule !== 'missing coupler').flatMap(({ variables }) => variables),
      )
      const unmet = violations.filter(
        ({ rule, variables }) => rule === 'missing coupler' && !variables.some((v) => torn.has(v)),
      )
      const damaged = [...new Set([...torn, ...unmet.flatMap(({ variables }) => variables)])].sort((a, b) => a - b)
      const expected = { chains: damaged, qubits, couplers }
      expect(damage ?? { chains: [], qubits: [], couplers: [] }).toEqual(expected)
      expect(damage === null).toBe(damaged.length + qubits.length + couplers.length === 0)
      if (violations.length > 0) expect(damaged.length).toBeGreaterThan(0)
    }),
    { numRuns: 400, seed: 5 },
  )
})
