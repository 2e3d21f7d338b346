import { describe, expect, it } from 'vitest'
import { programme } from '../../../../shared/engine/programming/programme'
import {
  distinctSolutions,
  histogram,
  logicalEnergies,
  physicalEnergies,
  weightsInBins,
} from '../../../../shared/engine/readout/energies'
import { createRandom } from '../../../../shared/engine/random'
import { packRows } from '../../../../shared/engine/sampling/merge'
import { logicalEnergy, must, physicalEnergy, randomInstance, statesOf, wideRanges } from '../programming/instances'

const instance = randomInstance(2, { order: 12, sizes: [3, 2, 2, 1], density: 0.3, field: 1 })
const programmed = must(
  programme({
    ...instance,
    strengths: new Float64Array(4).fill(1),
    ranges: wideRanges,
    fieldSplit: 'even',
    interactionCouplers: 'all',
    chainCouplers: 'all',
  }).programmed,
)

describe('energies', () => {
  it('equal a term-by-term sum, logical with offset, physical without', () => {
    const logical = [...statesOf(4)]
    const states = packRows(4, logical.flat())
    logicalEnergies(instance.ising, states).forEach((e, r) =>
      expect(e).toBeCloseTo(logicalEnergy(instance.ising, logical[r]!), 12),
    )
    const physical = [...statesOf(8)]
    const samples = packRows(8, physical.flat())
    physicalEnergies(programmed, samples).forEach((e, r) =>
      expect(e).toBeCloseTo(physicalEnergy(programmed, physical[r]!), 12),
    )
    expect(() => logicalEnergies(instance.ising, samples)).toThrow(RangeError)
  })
})

describe('distinctSolutions', () => {
  it('sorts by energy, count and row, with counts and distances to the best', () => {
    const states = packRows(3, [1, 1, 1, -1, 1, 1, 1, 1, 1, -1, -1, -1, 1, -1, 1], [2, 3, 4, 1, 1])
    const solutions = distinctSolutions(states, Float64Array.of(-1, -5, -1, -1, -1))
    expect(solutions).toEqual([
      { row: 1, energy: -5, count: 3, distance: 0 },
      { row: 0, energy: -1, count: 6, distance: 1 },
      { row: 3, energy: -1, count: 1, distance: 2 },
      { row: 4, energy: -1, count: 1, distance: 2 },
    ])
    expect(distinctSolutions(packRows(3, []), new Float64Array(0))).toEqual([])
  })
})

describe('histogram', () => {
  it('has readable edges that hold all weight', () => {
    const random = createRandom(4)
    for (const scale of [1e-6, 0.03, 1, 77, 1e9]) {
      const values = Array.from({ length: 500 }, () => scale * (random.float() - 0.4))
      const counts = values.map(() => 1 + random.below(9))
      const { start, step, counts: weights } = histogram(values, counts, 20)
      const mantissa = Number(step.toExponential(12).split('e')[0])
      expect([1, 2, 5]).toContain(mantissa)
      expect(weights.length).toBeLessThanOrEqual(22)
      expect(weights.length).toBeGreaterThanOrEqual(8)
      weights.forEach((weight, k) => {
        const inside = values.reduce(
          (sum, v, j) => sum + (Math.floor(v / step) === Math.round(start / step) + k ? counts[j]! : 0),
          0,
        )
        expect(weight).toBe(inside)
      })
      expect(weights.reduce((a, b) => a + b)).toBe(counts.reduce((a, b) => a + b))
    }
  })

  it('takes equal values, one value and none', () => {
    expect(histogram([3, 3], [1, 4], 10)).toEqual({ start: 3, step: 1, counts: [5] })
    expect(histogram([], [], 10)).toEqual({ start: 0, step: 1, counts: [] })
    expect(histogram([1e20], [2], 4).counts.reduce((a, b) => a + b)).toBe(2)
    expect(histogram([-2, -1, 0, 1, 2], [1, 1, 1, 1, 1], 5)).toEqual({ start: -2, step: 1, counts: [1, 1, 1, 1, 1] })
  })

  it('counts other values into the same bins where the first edge is rounded', () => {
    const values = [-0.25, -0.05, 0.05]
    const { start, step, counts } = histogram(values, [1, 1, 1], 3)
    expect([start, step]).toEqual([-0.30000000000000004, 0.1])
    expect(counts).toEqual([1, 0, 1, 1])
    expect(weightsInBins([-0.25, 0.05], [2, 3], { start, step, bins: counts.length })).toEqual([2, 0, 0, 3])
  })

  it('throws for what it cannot bin', () => {
    expect(() => histogram([Infinity], [1], 3)).toThrow(RangeError)
    expect(() => histogram([1], [1, 2], 3)).toThrow(RangeError)
    expect(() => histogram([1], [1], 0)).toThrow(RangeError)
  })
})
