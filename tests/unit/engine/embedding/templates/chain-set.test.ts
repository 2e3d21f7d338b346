import { describe, expect, it } from 'vitest'
import { Watch } from '../../../../../shared/engine/embedding/progress'
import { ChainSet, FREE, UNUSABLE } from '../../../../../shared/engine/embedding/templates/chain-set'
import { Displacer } from '../../../../../shared/engine/embedding/templates/displace'
import { ExtraGrower } from '../../../../../shared/engine/embedding/templates/extra-chain'
import { Joiner } from '../../../../../shared/engine/embedding/templates/join'
import { thinChains } from '../../../../../shared/engine/embedding/templates/thin'
import { verifyEmbedding } from '../../../../../shared/engine/embedding/verify'
import { edgeBetween } from '../../../../../shared/engine/graph/build'
import type { Random } from '../../../../../shared/engine/random'
import { createRandom } from '../../../../../shared/engine/random'
import { chimeraGraph, completeGraph, randomGraph, usableExcept } from '../../../../fixtures/graphs'

const MACHINE = chimeraGraph(5, 5, 4)

/** Chains of one random free qubit each, on a machine with some qubits missing. */
function scattered(n: number, random: Random): { set: ChainSet; usable: Uint8Array } {
  const usable = usableExcept(MACHINE.order, 0.1, random)
  const set = new ChainSet(randomGraph(n, 0.7, random), MACHINE, usable)
  for (let i = 0; i < n; i++) {
    let q = random.below(MACHINE.order)
    while (set.owner[q] !== FREE) q = random.below(MACHINE.order)
    set.add(i, q)
  }
  return { set, usable }
}

function expectConsistent(set: ChainSet, usable: Uint8Array): void {
  const owner = Int32Array.from(usable, (works) => (works ? FREE : UNUSABLE))
  set.chains.forEach((chain, i) => chain.forEach((q) => (owner[q] = i)))
  expect(set.owner).toEqual(owner)
  const n = set.problem.order
  for (let i = 0; i < n; i++)
    for (let j = 0; j < i; j++) {
      let count = 0
      for (const q of set.chains[i]!) for (const r of set.chains[j]!) if (edgeBetween(MACHINE, q, r) >= 0) count++
      expect([set.contacts[i * n + j], set.contacts[j * n + i]]).toEqual([count, count])
    }
}

/** Rules broken besides unmet interactions. */
const broken = (set: ChainSet, usable: Uint8Array): string[] =>
  verifyEmbedding(set.problem, MACHINE, usable, set.chains)
    .filter(({ rule }) => rule !== 'missing coupler')
    .map(({ message }) => message)

describe('chains that are joined, thinned and displaced', () => {
  const watch = new Watch({ now: () => 0, cancelled: () => false, report: () => {} }, 'template', 1, Infinity)

  it('keep counting their contacts, stay connected and apart, and lose no contact', () => {
    for (let seed = 1; seed <= 12; seed++) {
      const random = createRandom(seed)
      const { set, usable } = scattered(9, random)
      const joiner = new Joiner(set)
      const left = joiner.joinAll(random)
      expect(set.unmet()).toHaveLength(left)
      expectConsistent(set, usable)
      thinChains(set)
      expect(set.unmet()).toHaveLength(left)
      expectConsistent(set, usable)
      const after = new Displacer(set, joiner).run(random, watch)
      expect(after).toBeLessThanOrEqual(left)
      expect(set.unmet()).toHaveLength(after)
      expectConsistent(set, usable)
      expect(broken(set, usable)).toEqual([])
      expect(verifyEmbedding(set.problem, MACHINE, usable, set.pack())).toHaveLength(after)
    }
  })

  it('leave no qubit that could go alone', () => {
    const random = createRandom(5)
    const { set } = scattered(7, random)
    new Joiner(set).joinAll(random)
    thinChains(set)
    for (const chain of set.chains)
      for (const q of chain) if (chain.length > 1) expect(set.isSpare(q) && set.isRemovable(q)).toBe(false)
  })

  it('come back as they were copied', () => {
    const random = createRandom(6)
    const { set, usable } = scattered(8, random)
    const kept = set.copy()
    new Joiner(set).joinAll(random)
    set.restore(kept)
    expect(set.chains.map((chain) => chain.length)).toEqual(kept.map(() => 1))
    expectConsistent(set, usable)
  })
})

describe('ExtraGrower', () => {
  it('meets every chain it can reach with one connected chain', () => {
    // K_8 in a chain of cells: seven single qubits around, the eighth variable grown through the rest.
    const usable = new Uint8Array(MACHINE.order).fill(1)
    const set = new ChainSet(completeGraph(8), MACHINE, usable)
    for (let i = 0; i < 7; i++) set.add(i, i * 24)
    new ExtraGrower(set).grow(7, createRandom(1))
    expect(Array.from({ length: 7 }, (_, i) => set.met(7, i))).toEqual(Array(7).fill(true))
    expect(broken(set, usable)).toEqual([])
  })
})

describe('Joiner.connect', () => {
  it('joins the parts of a chain, and gives up those that cannot be reached', () => {
    const usable = new Uint8Array(MACHINE.order).fill(1)
    const set = new ChainSet(completeGraph(2), MACHINE, usable)
    for (const q of [0, 90, 180]) set.add(0, q)
    new Joiner(set).connect(0)
    set.add(1, set.owner.indexOf(FREE))
    expect(set.chains[0]).toEqual(expect.arrayContaining([0, 90, 180]))
    expect(broken(set, usable)).toEqual([])
    const lonely = new ChainSet(
      completeGraph(1),
      MACHINE,
      Uint8Array.from({ length: MACHINE.order }, (_, q) => (q < 8 || q > 191 ? 1 : 0)),
    )
    for (const q of [0, 4, 199]) lonely.add(0, q)
    new Joiner(lonely).connect(0)
    expect([...lonely.chains[0]!].sort((a, b) => a - b)).toEqual([0, 4])
  })
})
