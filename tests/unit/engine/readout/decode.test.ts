import { describe, expect, it } from 'vitest'
import { programme } from '../../../../shared/engine/programming/programme'
import { decode } from '../../../../shared/engine/readout/decode'
import { createRandom } from '../../../../shared/engine/random'
import { packRows } from '../../../../shared/engine/sampling/merge'
import { spinOf } from '../../../../shared/engine/sampling/samples'
import type { Samples } from '../../../../shared/engine/sampling/samples'
import { logicalEnergy, must, randomInstance, wideRanges } from '../programming/instances'

const instance = randomInstance(12, { order: 40, sizes: [6, 5, 4, 4, 3, 2, 1, 1, 2], density: 0.1, field: 1 })
const n = instance.ising.n
const programmed = must(
  programme({
    ...instance,
    strengths: new Float64Array(n).fill(1),
    ranges: wideRanges,
    fieldSplit: 'even',
    interactionCouplers: 'all',
    chainCouplers: 'all',
  }).programmed,
)
const random = createRandom(3)
const rows = Array.from({ length: 150 }, () => {
  const state = Array.from({ length: n }, () => (random.float() < 0.5 ? 1 : -1))
  return Array.from(programmed.chainOf, (i) => (random.float() < 0.08 ? -state[i]! : state[i]!))
})
const counts = rows.map(() => 1 + random.below(4))
const samples = packRows(programmed.h.length, rows.flat(), counts)
const common = { samples, programmed, seed: 5, ising: instance.ising }
const unpacked = (states: Samples, r: number): number[] => Array.from({ length: n }, (_, i) => spinOf(states, r, i))
const chainSum = (row: readonly number[], i: number): number =>
  row.reduce((sum, s, p) => sum + (programmed.chainOf[p] === i ? s : 0), 0)

describe('decode', () => {
  it('takes the sign of most qubits and counts the coins', () => {
    const { states, kept, ties } = decode({ ...common, method: 'majority' })
    let expectedTies = 0
    rows.forEach((row, r) => {
      const state = unpacked(states, r)
      for (let i = 0; i < n; i++) {
        const sum = chainSum(row, i)
        if (sum === 0) expectedTies += counts[r]!
        else expect(state[i]).toBe(Math.sign(sum))
      }
    })
    expect(ties).toBe(expectedTies)
    expect(ties).toBeGreaterThan(20)
    expect([...kept]).toEqual(rows.map((_, r) => r))
    expect([...states.counts]).toEqual(counts)
  })

  it('throws fair coins that depend on the seed and the row alone', () => {
    const flat = packRows(
      programmed.h.length,
      Array.from({ length: 400 }, () => rows[0]!.map((_, p) => (p % 2 ? 1 : -1))).flat(),
    )
    const first = decode({ ...common, samples: flat, method: 'majority' })
    expect(decode({ ...common, samples: flat, method: 'majority' })).toEqual(first)
    expect(decode({ ...common, samples: flat, method: 'majority', seed: 6 }).states.bytes).not.toEqual(
      first.states.bytes,
    )
    const tied = Array.from({ length: n }, (_, i) => i).filter(
      (i) =>
        chainSum(
          rows[0]!.map((_, p) => (p % 2 ? 1 : -1)),
          i,
        ) === 0,
    )
    expect(tied.length).toBeGreaterThan(0)
    for (const i of tied) {
      const ups = Array.from({ length: 400 }, (_, r) => spinOf(first.states, r, i)).filter((s) => s === 1).length
      expect(Math.abs(ups - 200)).toBeLessThan(40)
    }
  })

  it('discards rows with any broken chain', () => {
    const { states, kept, ties } = decode({ ...common, method: 'discard' })
    const whole = rows
      .map((_, r) => r)
      .filter((r) =>
        Array.from({ length: n }, (_, i) => i).every(
          (i) => Math.abs(chainSum(rows[r]!, i)) === programmed.chainOf.filter((j) => j === i).length,
        ),
      )
    expect([...kept]).toEqual(whole)
    expect(whole.length).toBeGreaterThan(3)
    expect(ties).toBe(0)
    whole.forEach((r, row) => {
      unpacked(states, row).forEach((s, i) => expect(s).toBe(Math.sign(chainSum(rows[r]!, i))))
      expect(states.counts[row]).toBe(counts[r])
    })
  })

  it('descends to local minima of the logical problem, never uphill', () => {
    const majority = decode({ ...common, method: 'majority' })
    const descent = decode({ ...common, method: 'descent' })
    let lowered = 0
    for (let r = 0; r < rows.length; r++) {
      const before = logicalEnergy(instance.ising, unpacked(majority.states, r))
      const state = unpacked(descent.states, r)
      const after = logicalEnergy(instance.ising, state)
      expect(after).toBeLessThanOrEqual(before + 1e-12)
      if (after < before) lowered++
      for (let i = 0; i < n; i++) {
        const flipped = state.map((s, j) => (i === j ? -s : s))
        expect(logicalEnergy(instance.ising, flipped)).toBeGreaterThanOrEqual(after - 1e-9)
      }
    }
    expect(lowered).toBeGreaterThan(20)
    expect(descent.ties).toBe(majority.ties)
  })

  it('throws where sizes differ', () => {
    expect(() => decode({ ...common, samples: packRows(2, [1, 1]), method: 'majority' })).toThrow(RangeError)
    const other = randomInstance(1, { order: 5, sizes: [1, 1], density: 0.5, field: 1 }).ising
    expect(() => decode({ ...common, ising: other, method: 'majority' })).toThrow(RangeError)
  })
})
