import { describe, expect, it } from 'vitest'
import { qualityOf } from '../../shared/engine/embedding/objective'
import { fitTemplate } from '../../shared/engine/embedding/templates/fit-template'
import type { Graph } from '../../shared/engine/graph/graph'
import type { PublishedFamily } from '../../shared/engine/machine/fabric'
import { completeGraph } from '../fixtures/graphs'
import { attemptOn, bipartiteGraph, machineOf, taskOn } from '../unit/engine/embedding/templates/attempts'

/** Longest chain and total of the first valid embedding that the method offers. */
function first(problem: Graph, family: PublishedFamily, missing = 0, seed = 1) {
  const task = taskOn(problem, machineOf(family, missing, missing / 2, seed))
  const { attempt, offers } = attemptOn(task, seed)
  const stop = (): void => {
    attempt.watch.stopped = 'cancelled'
  }
  fitTemplate(task, {
    ...attempt,
    offer: (embedding) => {
      attempt.offer(embedding)
      stop()
    },
  })
  return offers.length > 0 ? qualityOf(offers[0]!) : null
}

const C16: PublishedFamily = { kind: 'chimera', m: 16, n: 16, t: 4 }
const P16: PublishedFamily = { kind: 'pegasus', m: 16, trimmed: true }
const Z15: PublishedFamily = { kind: 'zephyr', m: 15, t: 4 }

describe('complete graphs on whole machines', () => {
  // Choi, Minor-embedding in adiabatic quantum computation II, Quantum Inf. Process. 10 (2011); Boothby, King & Roy, Fast
  // clique minor generation in Chimera qubit connectivity graphs, Quantum Inf. Process. 15 (2016): K_{4m} on C(m,m,4) with
  // chains of m + 1 qubits.
  it.each([2, 5, 16])('places K_4m on C(m,m,4) with chains of m + 1: m = %i', (m) => {
    const quality = first(completeGraph(4 * m), { kind: 'chimera', m, n: m, t: 4 })!
    expect(quality.longest).toBe(m + 1)
    expect(quality.total).toBeLessThanOrEqual(4 * m * (m + 1))
  })

  // Klymko, Sullivan & Humble, Adiabatic quantum programming: minor embedding with hard faults, 2014: the treewidth of
  // C(m,m,4) is 4m, so that K_{4m+1} may be a minor and K_{4m+2} cannot.
  it('places K_65 on C(16,16,4), and never more than the treewidth allows', () => {
    expect(first(completeGraph(65), C16)).not.toBeNull()
    for (const m of [1, 2]) expect(first(completeGraph(4 * m + 2), { kind: 'chimera', m, n: m, t: 4 })).toBeNull()
  })

  // Boothby, Bunyk, Raymond & Roy, arXiv:2003.00133 (2020), from memory: constructions with short equal chains reach K_{12m−10} on P(m).
  it('places K_182 = K_{12m−10} on P(16), and K_50, K_130, K_180 on few qubits', () => {
    expect(first(completeGraph(182), P16)).not.toBeNull()
    // The triangle of n lines needs about (n + 23)/12 qubits a chain: two arms cross n + 1 lines, twelve a qubit, and
    // each of them stands out by 11/2 lines at either end on average.
    for (const n of [50, 130]) expect(first(completeGraph(n), P16)!.total).toBeLessThan((1.05 * n * (n + 23)) / 12)
    expect(first(completeGraph(180), P16)!.total).toBeLessThanOrEqual(3340)
  })

  // Boothby, King & Raymond, technical report on Zephyr (2021), from memory: constructions with equal
  // chains reach K_{16m−8} on Z(m, 4).
  it('places K_{16m−8} on Z(15,4), and K_240', () => {
    expect(first(completeGraph(232), Z15)!.longest).toBeLessThanOrEqual(17)
    expect(first(completeGraph(240), Z15)).not.toBeNull()
  })
})

describe('complete graphs on machines with 2 % of the qubits and 1 % of the couplers missing', () => {
  it.each([
    ['C(16,16,4)', 62, C16],
    ['P(16)', 170, P16],
    ['Z(15,4)', 225, Z15],
  ] as const)('places on %s K_%i', (_, n, family) => {
    expect([2, 3].some((seed) => first(completeGraph(n), family, 0.02, seed) !== null)).toBe(true)
  })
})

describe('other constructions', () => {
  // Vertical against horizontal lines: K_{4m,4m} on C(m,m,4) in chains of m (Boothby, King & Roy 2016, complete bipartite
  // graphs as the first step of their construction).
  it('places K_{64,64} on C(16,16,4) in chains of 16', () => {
    expect(first(bipartiteGraph(64, 64), C16)).toEqual({ longest: 16, total: 2048, changed: 0 })
  })

  // Knuth, The Art of Computer Programming 3, 5.3.4: n rounds of odd-even transposition compare all pairs once.
  it('places K_n on a king’s graph of n columns and n − 1 rows', () => {
    for (const n of [2, 5, 8, 13]) {
      expect(first(completeGraph(n), { kind: 'king', width: n, height: n - 1 })!.longest).toBeLessThan(Math.max(2, n))
      expect(first(completeGraph(n), { kind: 'king', width: n - 1, height: n })).not.toBeNull()
    }
  })
})
