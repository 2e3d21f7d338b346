import { describe, expect, it } from 'vitest'
import { scaleOutlook } from '../../../../shared/engine/readout/scale-outlook'

/** Energies of a small system and its Boltzmann weights as counts. */
const levels = [-7, -5, -5, -4, -1, 0, 2, 6]
const countsAt = (beta: number): Uint32Array => {
  const weights = levels.map((E) => Math.exp(-beta * E))
  const total = weights.reduce((a, b) => a + b)
  return Uint32Array.from(weights, (w) => Math.round((1e8 * w) / total))
}
const meanAt = (beta: number): number => {
  const weights = levels.map((E) => Math.exp(-beta * E))
  return levels.reduce((sum, E, k) => sum + E * weights[k]!, 0) / weights.reduce((a, b) => a + b)
}

describe('scaleOutlook', () => {
  const [beta, scale] = [0.8, 0.25]
  const energies = Float64Array.from(levels, (E) => E * scale)
  const given = { inverseTemperature: beta, energies, counts: countsAt(beta * scale), scale, greatest: scale * 1.05 }

  it('is what the exact mean energy does when the scale rises a little', () => {
    const exact = meanAt(beta * scale) - meanAt(beta * scale * 1.05)
    const { fallAtGreatest, fallByTenth } = scaleOutlook(given)!
    expect(fallAtGreatest / exact).toBeGreaterThan(0.97)
    expect(fallAtGreatest / exact).toBeLessThan(1.03)
    expect(fallByTenth / fallAtGreatest).toBeCloseTo(Math.log(1.1) / Math.log(1.05), 9)
  })

  it('expects nothing where the scale is the greatest already', () => {
    expect(scaleOutlook({ ...given, greatest: scale })!.fallAtGreatest).toBe(0)
    expect(scaleOutlook({ ...given, greatest: scale / 2 })!.fallAtGreatest).toBe(0)
  })

  it('says nothing of frozen samples or of a single read', () => {
    expect(scaleOutlook({ ...given, inverseTemperature: Infinity })).toBeNull()
    expect(scaleOutlook({ ...given, inverseTemperature: -1 })).toBeNull()
    expect(scaleOutlook({ ...given, energies: Float64Array.of(1), counts: Uint32Array.of(1) })).toBeNull()
  })
})
