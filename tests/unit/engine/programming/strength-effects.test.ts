import { describe, expect, it } from 'vitest'
import { cutBounds } from '../../../../shared/engine/programming/cut-bounds'
import { layOut } from '../../../../shared/engine/programming/layout'
import { strengthEffects } from '../../../../shared/engine/programming/strength-effects'
import { programme } from '../../../../shared/engine/programming/programme'
import { must, randomInstance } from './instances'

const ranges = { h: [-2, 2], J: [-1, 0.5], couplingSum: null } as const
const error = { sigmaH: 0.05, sigmaJ: 0.04 }
const usual = { fieldSplit: 'even', interactionCouplers: 'all', chainCouplers: 'all' } as const

describe('strengthEffects', () => {
  it.each([1, 2, 3, 4])('says of each factor what programming with it does (seed %i)', (seed) => {
    const instance = randomInstance(seed, { order: 24, sizes: [6, 5, 4, 3, 1], density: 0.2, field: 1 })
    const input = { ...instance, ...usual }
    const strengths = Float64Array.of(1, 0.5, 1.5, 0.25, 3)
    const bounds = cutBounds(input)
    const effects = strengthEffects(layOut(input), instance.ising, { strengths, ranges }, bounds, error)
    expect(effects.map(({ factor }) => factor)).toEqual([0.5, 0.75, 1, 1.5, 2])
    for (const { factor, scale, under, of, noise, chainsBelowBound } of effects) {
      const again = must(programme({ ...input, strengths: strengths.map((k) => factor * k), ranges }).programmed)
      expect(scale).toBe(again.scale)
      const sizes = [...instance.ising.linear.map((h) => h / 0.05), ...instance.ising.values.map((J) => J / 0.04)]
      const ratios = sizes.map((ratio) => scale * Math.abs(ratio)).filter((ratio) => ratio > 0)
      expect(of).toBe(ratios.length)
      expect(under).toBe(ratios.filter((ratio) => ratio < 2).length)
      const between = again.isChainCoupler.filter((inside) => !inside).length
      expect(noise).toBeCloseTo(Math.sqrt(19 * 0.0025 + between * 0.0016) / scale, 10)
      const below = [0, 1, 2, 3].filter((i) => factor * strengths[i]! < bounds.bound[i]!)
      expect(chainsBelowBound).toBe(below.length)
    }
    for (let k = 1; k < effects.length; k++) expect(effects[k]!.scale).toBeLessThanOrEqual(effects[k - 1]!.scale)
  })

  it('says where a chosen scale leaves the ranges', () => {
    const instance = randomInstance(1, { order: 24, sizes: [6, 5], density: 0.2, field: 0 })
    const input = { ...instance, ...usual }
    const given = { strengths: Float64Array.of(1, 1), ranges: { ...ranges, J: [-1, 4] as const }, scale: 0.8 }
    const effects = strengthEffects(layOut(input), instance.ising, given, cutBounds(input), error)
    expect(effects.map(({ scale }) => scale)).toEqual([0.8, 0.8, 0.8, 0, 0])
    expect(effects.at(-1)!.noise).toBe(Infinity)
    expect(() => strengthEffects(layOut(input), instance.ising, given, cutBounds(input), error, [0])).toThrow(/factor/)
  })
})
