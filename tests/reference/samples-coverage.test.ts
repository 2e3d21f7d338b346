import { Matrix } from 'ml-matrix'
import { describe, expect, it } from 'vitest'
import type { Problem } from '../../shared/engine/problem/problem'
import type { Programmed } from '../../shared/engine/programming/programme'
import { breakStatistics } from '../../shared/engine/readout/breaks'
import { logicalEnergies } from '../../shared/engine/readout/energies'
import { groupedBreaks } from '../../shared/engine/readout/grouped-breaks'
import { wilson } from '../../shared/engine/readout/intervals'
import { successWithin } from '../../shared/engine/readout/success'
import { effectiveTemperature } from '../../shared/engine/readout/temperature'
import { packRows } from '../../shared/engine/sampling/merge'
import { samplerModel } from '../../shared/engine/sampling/physical-model'

/** Planted values must be found again: a 95 % interval covers 93 to 97 % over 2,000 repetitions. */
const ROUNDS = 2000

/** Park and Miller's minimal generator (CACM 31:1192, 1988, multiplier 48271): shares nothing with the product's. */
function uniforms(seed: number): () => number {
  let state = seed
  return () => (state = (state * 48_271) % 2_147_483_647) / 2_147_483_647
}

function covered(round: () => boolean): number {
  let count = 0
  for (let k = 0; k < ROUNDS; k++) if (round()) count++
  return count / ROUNDS
}

function expectNominal(coverage: number): void {
  expect(coverage).toBeGreaterThanOrEqual(0.93)
  expect(coverage).toBeLessThanOrEqual(0.97)
}

/** Two chains of two qubits and one of three, held by nothing in particular: only who belongs to whom matters here. */
const programmed: Programmed = {
  qubits: Uint32Array.from({ length: 7 }, (_, q) => q),
  h: new Float64Array(7),
  ends: Uint32Array.of(0, 1, 2, 3, 4, 5, 5, 6),
  J: new Float64Array(4),
  isChainCoupler: new Uint8Array(4).fill(1),
  scale: 1,
  offset: 0,
  limitedBy: 'nothing',
  chainStrength: new Float64Array(3).fill(1),
  chainOf: Uint32Array.of(0, 0, 1, 1, 2, 2, 2),
}

describe('intervals of planted values', () => {
  it('cover break rates, chain by chain and grouped by length', () => {
    const [reads, planted] = [240, [0.06, 0.06, 0.35]]
    const uniform = uniforms(11)
    const rows = new Int8Array(7 * reads)
    const hits = [0, 0, 0]
    const grouped = covered(() => {
      rows.fill(1)
      for (let r = 0; r < reads; r++)
        planted.forEach((rate, chain) => {
          if (uniform() < rate) rows[7 * r + 2 * chain] = -1
        })
      const { perChain } = breakStatistics({ samples: packRows(7, rows), programmed })
      planted.forEach((rate, chain) => {
        const { low, high } = wilson(perChain.breaks[chain]!, reads)
        if (low <= rate && rate <= high) hits[chain]!++
      })
      const [pairs] = groupedBreaks([2, 2, 3], perChain.breaks, reads)
      return pairs!.low <= 0.06 && 0.06 <= pairs!.high
    })
    for (const hit of hits) expectNominal(hit / ROUNDS)
    expectNominal(grouped)
  })

  it.each([
    [0.02, 700],
    [0.2, 300],
  ])('cover a success probability of %d in %i reads, and R99 with it', (p, reads) => {
    const uniform = uniforms(97)
    const counts = new Uint32Array(reads).fill(1)
    const r99 = Math.log(0.01) / Math.log(1 - p)
    let ofReads = 0
    const ofP = covered(() => {
      const energies = Float64Array.from({ length: reads }, () => (uniform() < p ? -9.75 : -9.5 + uniform()))
      const found = successWithin({ energies, counts, reference: -10, gap: 0.25, tolerance: 1e-9 })
      if (found.r99Interval.low <= r99 && r99 <= found.r99Interval.high) ofReads++
      return found.low <= p && p <= found.high
    })
    expectNominal(ofP)
    expectNominal(ofReads / ROUNDS)
  })

  it.each([0.4, 1.1])('cover an inverse temperature of %d, sampled exactly by enumeration', (beta) => {
    const uniform = uniforms(1234)
    const [n, reads] = [8, 120]
    const ends = Uint32Array.of(0, 1, 1, 2, 2, 3, 3, 4, 4, 5, 5, 6, 6, 7, 0, 7, 0, 4, 2, 6)
    const list = {
      h: Float64Array.from({ length: n }, () => uniform() - 0.5),
      ends,
      J: Float64Array.from({ length: ends.length / 2 }, () => 2 * uniform() - 1),
    }
    const spin = (state: number, i: number): number => ((state >> i) & 1 ? 1 : -1)
    const weights = Array.from({ length: 2 ** n }, (_, state) => {
      let energy = 0
      list.h.forEach((field, i) => (energy += field * spin(state, i)))
      list.J.forEach((J, c) => (energy += J * spin(state, ends[2 * c]!) * spin(state, ends[2 * c + 1]!)))
      return Math.exp(-beta * energy)
    })
    const total = weights.reduce((a, b) => a + b)
    const upTo: number[] = []
    weights.reduce((sum, weight, state) => (upTo[state] = sum + weight / total), 0)
    const model = samplerModel(list)
    const coverage = covered(() => {
      const rows = Array.from({ length: reads }, () => {
        const drawn = uniform()
        const state = upTo.findIndex((bound) => drawn < bound)
        return Array.from({ length: n }, (_, i) => spin(state, i))
      })
      const { inverseTemperature, standardError } = effectiveTemperature(model, packRows(n, rows.flat()))!
      return Math.abs(inverseTemperature - beta) <= 1.959964 * standardError!
    })
    expectNominal(coverage)
  })
})

describe('decoded energies', () => {
  it('are xᵀQx of the matrix library', () => {
    const uniform = uniforms(5)
    const n = 12
    const pairs = Array.from({ length: n }, (_, i) => Array.from({ length: n - i - 1 }, (_, k) => [i, i + 1 + k]))
      .flat()
      .filter(() => uniform() < 0.6)
    const ising: Problem = {
      n,
      linear: Float64Array.from({ length: n }, () => 4 * uniform() - 2),
      rows: Uint32Array.from(pairs, ([i]) => i!),
      cols: Uint32Array.from(pairs, ([, j]) => j!),
      values: Float64Array.from(pairs, () => 4 * uniform() - 2),
      offset: 3.25,
    }
    // s = 2x − 1 by matrices: sᵀJs + hᵀs = 4xᵀJx + (2h − 2(J + Jᵀ)1)ᵀx + 1ᵀJ1 − hᵀ1.
    const J = Matrix.zeros(n, n)
    pairs.forEach(([i, j], k) => J.set(i!, j!, ising.values[k]!))
    const h = Matrix.columnVector(Array.from(ising.linear))
    const one = Matrix.ones(n, 1)
    const linear = Matrix.sub(Matrix.mul(h, 2), Matrix.mul(Matrix.add(J, J.transpose()).mmul(one), 2))
    const Q = Matrix.add(Matrix.mul(J, 4), Matrix.diag(linear.to1DArray()))
    const constant = one.transpose().mmul(J).mmul(one).get(0, 0) - h.transpose().mmul(one).get(0, 0) + ising.offset
    const states = Array.from({ length: 200 }, () => Array.from({ length: n }, () => (uniform() < 0.5 ? 1 : -1)))
    const X = new Matrix(states.map((row) => row.map((s) => (s + 1) / 2)))
    const independent = X.mmul(Q).mmul(X.transpose()).diagonal()
    const energies = logicalEnergies(ising, packRows(n, states.flat()))
    energies.forEach((energy, r) => expect(energy).toBeCloseTo(independent[r]! + constant, 10))
  })
})
