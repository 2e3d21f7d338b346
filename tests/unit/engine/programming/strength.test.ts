import { describe, expect, it } from 'vitest'
import { packChains } from '../../../../shared/engine/embedding/embedding'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import { programme } from '../../../../shared/engine/programming/programme'
import { chainStrengths, choiBounds, cutBounds } from '../../../../shared/engine/programming/strength'
import type { LayoutInput } from '../../../../shared/engine/programming/layout'
import { isingOf, must, pathWith, physicalEnergy, randomInstance, statesOf, wideRanges } from './instances'
import type { Instance } from './instances'

const shares = { fieldSplit: 'even', chainCouplers: 'all' } as const

/** Every split of one chain, straight from the definition, fields even; couplers counted on the machine itself. */
function bruteForceBound({ machine, embedding, ising }: Instance, variable: number): number {
  const ownerOf = new Map<number, number>()
  for (let i = 0; i < ising.n; i++)
    for (let p = embedding.offsets[i]!; p < embedding.offsets[i + 1]!; p++) ownerOf.set(embedding.qubits[p]!, i)
  const edges = Array.from(
    { length: machine.ends.length / 2 },
    (_, e) => [machine.ends[2 * e]!, machine.ends[2 * e + 1]!] as const,
  )
  const chain = [...ownerOf].filter(([, i]) => i === variable).map(([q]) => q)
  const pull = new Map(chain.map((q) => [q, 0]))
  ising.values.forEach((value, k) => {
    const pair = [ising.rows[k]!, ising.cols[k]!]
    if (!pair.includes(variable)) return
    const carriers = edges.filter(
      ([a, b]) =>
        pair.includes(ownerOf.get(a) ?? -1) && pair.includes(ownerOf.get(b) ?? -1) && ownerOf.get(a) !== ownerOf.get(b),
    )
    for (const [a, b] of carriers) {
      const q = ownerOf.get(a) === variable ? a : b
      pull.set(q, pull.get(q)! + Math.abs(value) / carriers.length)
    }
  })
  const field = ising.linear[variable]! / chain.length
  const inside = edges.filter(([a, b]) => pull.has(a) && pull.has(b))
  let bound = 0
  for (const state of statesOf(chain.length)) {
    const spin = new Map(chain.map((q, c) => [q, state[c]!]))
    const cut = inside.filter(([a, b]) => spin.get(a) !== spin.get(b)).length
    if (cut === 0) continue
    const side = (sign: number): number =>
      chain.filter((q) => spin.get(q) === sign).reduce((sum, q) => sum + pull.get(q)! - sign * field, 0)
    bound = Math.max(bound, Math.min(side(1), side(-1)) / cut)
  }
  return bound
}

/** Whether every state of least physical energy is unbroken, by enumeration. */
function groundStatesUnbroken(input: LayoutInput, strengths: Float64Array): boolean {
  const programmed = must(programme({ ...input, strengths, ranges: wideRanges }).programmed)
  let least = Infinity
  let unbroken = true
  for (const state of statesOf(programmed.h.length)) {
    const energy = physicalEnergy(programmed, state)
    if (energy > least + 1e-9) continue
    const whole = programmed.chainOf.every((i, p) => state[p] === state[programmed.chainOf.indexOf(i)])
    unbroken = energy < least - 1e-9 ? whole : unbroken && whole
    least = Math.min(least, energy)
  }
  return unbroken
}

describe('cut bounds', () => {
  it.each([0, 0.5, 3, 12])('equal brute force over all splits (fields up to %d)', (field) => {
    let trees = 0
    let cycles = 0
    for (let seed = 1; seed <= 30; seed++) {
      const density = seed % 2 ? 0.05 : 0.25
      const instance = randomInstance(seed, { order: 24, sizes: [7, 5, 4, 3, 1], density, field })
      const { bound, exact, splits } = cutBounds({ ...instance, ...shares })
      expect(splits.map(({ up, down, cut }) => Math.max(0, Math.min(up, down) / cut))).toEqual([...bound])
      expect([...exact]).toEqual([1, 1, 1, 1, 1])
      for (let i = 0; i < 5; i++) expect(bound[i]).toBeCloseTo(bruteForceBound(instance, i), 10)
      if (density < 0.1) trees++
      else cycles++
    }
    expect(Math.min(trees, cycles)).toBeGreaterThan(10)
  })

  it('keep every ground state unbroken just above the bound', () => {
    let needed = 0
    for (let seed = 1; seed <= 24; seed++) {
      const field = [0, 1, 6][seed % 3]!
      const instance = randomInstance(seed, { order: 13, sizes: [4, 3, 3, 2], density: 0.2, field })
      for (const fieldSplit of ['even', 'external coupling'] as const) {
        const input = { ...instance, fieldSplit, chainCouplers: seed % 2 ? 'all' : 'spanning tree' } as const
        const { bound } = cutBounds(input)
        expect(
          groundStatesUnbroken(
            input,
            bound.map((b) => b + 1e-6),
          ),
        ).toBe(true)
        if (
          !groundStatesUnbroken(
            input,
            bound.map((b) => b * 0.3),
          )
        )
          needed++
      }
    }
    expect(needed).toBeGreaterThan(5)
  })

  it('find the double cut that no single coupler shows when fields are strong', () => {
    // Eleven qubits in a path with field 1 each; the middle is pulled up by 10.5 through qubit 11, held up by its own field.
    const machine = pathWith(11, 12, [5, 11])
    const embedding = packChains([Array.from({ length: 11 }, (_, q) => q), [11]])
    const ising = isingOf([11, -200], [[0, 1, -10.5]])
    const input = { machine, embedding, ising, ...shares }
    // Best single cut: five qubits against six: min(5, 10.5 − 6) = 4.5. Both sides of the middle: min(9.5, 10) / 2 = 4.75.
    expect([...cutBounds(input).bound]).toEqual([4.75, 0])
    expect(groundStatesUnbroken(input, Float64Array.of(4.7, 0))).toBe(false)
    expect(groundStatesUnbroken(input, Float64Array.of(4.76, 0))).toBe(true)
    // Choi's bound, 10.5 − 11 < 0, asks for nothing here: it presupposes another split of the field.
    expect([...choiBounds(ising)]).toEqual([0, 0])
    expect(groundStatesUnbroken({ ...input, fieldSplit: 'external coupling' }, Float64Array.of(0.01, 0))).toBe(true)
  })

  it('are exact on long trees without strong fields, safe and marked elsewhere', () => {
    const machine = graphFromEdges(20, [...pathWith(14, 20, []).ends, 0, 14, 3, 15, 6, 16, 9, 17, 13, 18, 7, 19])
    const embedding = packChains([Array.from({ length: 14 }, (_, q) => q), [14], [15], [16], [17], [18], [19]])
    const pulls = [1, 2, 0.5, 3, 1.5, 2.5]
    for (const field of [0, 7]) {
      const linear = [field, 0, 0, 0, 0, 0, 0]
      const instance = {
        machine,
        embedding,
        ising: isingOf(
          linear,
          pulls.map((v, k) => [0, k + 1, v]),
        ),
      }
      const { bound, exact } = cutBounds({ ...instance, ...shares })
      const brute = bruteForceBound(instance, 0)
      expect(exact[0]).toBe(field === 0 ? 1 : 0)
      if (field === 0) expect(bound[0]).toBeCloseTo(brute, 12)
      else expect(bound[0]).toBeGreaterThanOrEqual(brute)
    }
    const ring = graphFromEdges(20, [...machine.ends, 0, 13])
    const instance = {
      machine: ring,
      embedding,
      ising: isingOf(
        [0, 0, 0, 0, 0, 0, 0],
        pulls.map((v, k) => [0, k + 1, v]),
      ),
    }
    const { bound, exact } = cutBounds({ ...instance, ...shares })
    expect(exact[0]).toBe(0)
    expect(bound[0]).toBeGreaterThanOrEqual(bruteForceBound(instance, 0))
  })
})

describe('chainStrengths', () => {
  // Triangle with chain (0, 2): |J| = 2, 1, 4; fields 1, 0, −0.5.
  const machine = graphFromEdges(4, [0, 1, 1, 2, 2, 3, 0, 3, 0, 2, 1, 3])
  const ising = isingOf(
    [1, 0, -0.5],
    [
      [0, 1, 2],
      [0, 2, -1],
      [1, 2, 4],
    ],
  )
  const input = { machine, embedding: packChains([[0, 2], [1], [3]]), ising, ...shares }

  it('follows each rule, by hand', () => {
    expect([...chainStrengths({ rule: 'fixed', value: 1.5 }, input).perChain]).toEqual([6, 6, 6])
    const rms = chainStrengths({ rule: 'rms', value: 2 }, input)
    expect(rms.perChain[0]).toBeCloseTo(2 * Math.sqrt(21 / 3) * Math.sqrt(2), 12)
    expect([...chainStrengths({ rule: 'choi', value: 1 }, input).perChain]).toEqual([2, 0, 0])
    // Each qubit: external coupling 1.5, field 0.5: min(1.5 − 0.5, 1.5 + 0.5) = 1.
    expect([...chainStrengths({ rule: 'cut', value: 1 }, input).perChain]).toEqual([1, 0, 0])
    expect(chainStrengths({ rule: 'cut' }, input).perChain[0]).toBeCloseTo(1.05, 12)
    const manual = chainStrengths({ rule: 'manual', value: 2, perChain: [null, undefined, 5] }, input)
    expect([...manual.perChain]).toEqual([2, 2, 5])
    expect(manual.summary).toMatchObject({ rule: 'manual', least: 2, mean: 2, greatest: 2, chains: 1 })
  })

  it('compares with the fields when there is no interaction', () => {
    const alone = { ...input, ising: isingOf([1, 0, -3], []) }
    expect([...chainStrengths({ rule: 'fixed', value: 2 }, alone).perChain]).toEqual([6, 6, 6])
    expect([...chainStrengths({ rule: 'rms', value: 2 }, alone).perChain]).toEqual([6, 6, 6])
  })

  it('holds a chain together that needs nothing', () => {
    const settled = {
      ...input,
      ising: isingOf(
        [50, 0, 0],
        [
          [0, 1, 2],
          [0, 2, -1],
          [1, 2, 4],
        ],
      ),
    }
    const { perChain, summary } = chainStrengths({ rule: 'cut' }, settled)
    expect(perChain[0]).toBeCloseTo(0.05 * 4, 12)
    expect(summary.raisedToLeast).toBe(1)
  })

  it('throws for values outside their range', () => {
    expect(() => chainStrengths({ rule: 'fixed', value: -1 }, input)).toThrow(RangeError)
    expect(() => chainStrengths({ rule: 'cut', value: 0.9 }, input)).toThrow(/margin/)
    expect(() => chainStrengths({ rule: 'manual', value: 1, perChain: [1] }, input)).toThrow(/1 chain strengths/)
    expect(() => chainStrengths({ rule: 'manual', value: Number.NaN }, input)).toThrow(/chain 0/)
  })

  it('choi bound keeps ground states unbroken when the field is split by external coupling', () => {
    for (let seed = 1; seed <= 12; seed++) {
      const instance = randomInstance(seed, { order: 12, sizes: [4, 3, 2, 2], density: 0.2, field: 2 })
      const byCoupling = { ...instance, fieldSplit: 'external coupling', chainCouplers: 'all' } as const
      const { perChain } = chainStrengths({ rule: 'choi' }, byCoupling)
      expect(groundStatesUnbroken(byCoupling, perChain)).toBe(true)
    }
  })
})
