import { describe, expect, it } from 'vitest'
import { precisionReport } from '../../../../shared/engine/programming/precision'
import { programme } from '../../../../shared/engine/programming/programme'
import { createRandom } from '../../../../shared/engine/random'
import { must, physicalEnergy, randomInstance, wideRanges } from './instances'

const instance = randomInstance(3, { order: 16, sizes: [4, 3, 2, 1], density: 0.25, field: 1 })
const programmed = must(
  programme({
    ...instance,
    strengths: new Float64Array(4).fill(2),
    ranges: wideRanges,
    scale: 0.5,
    fieldSplit: 'even',
    interactionCouplers: 'all',
    chainCouplers: 'all',
  }).programmed,
)

describe('precisionReport', () => {
  it('names the smallest programmed values, chain couplers left out', () => {
    const report = precisionReport(programmed, instance.ising, { sigmaH: 0.02, sigmaJ: 0.01 })
    const fields = Array.from(programmed.h, Math.abs).filter((h) => h > 0)
    const external = Array.from(programmed.J, Math.abs).filter((_, c) => !programmed.isChainCoupler[c])
    expect(report.smallestField).toBe(Math.min(...fields))
    expect(report.smallestCoupling).toBe(Math.min(...external))
    expect(report.smallestFieldPerSigma).toBeCloseTo(Math.min(...fields) / 0.02, 12)
    expect(report.smallestCouplingPerSigma).toBeCloseTo(Math.min(...external) / 0.01, 12)
  })

  it('counts the logical coefficients under 2σ', () => {
    const sizes = Array.from(instance.ising.values, (J) => 0.5 * Math.abs(J)).sort((a, b) => a - b)
    const sigmaJ = (sizes[1]! + sizes[2]!) / 4
    const below = sizes.filter((size) => size < 2 * sigmaJ).length
    const report = precisionReport(programmed, instance.ising, { sigmaH: 0, sigmaJ })
    expect(below).toBeGreaterThan(0)
    expect(report.shareUnderTwoSigma).toBeCloseTo(below / (sizes.length + 4), 12)
    expect(report.smallestFieldPerSigma).toBe(Infinity)
  })

  it('predicts the spread of energies over drawn control errors', () => {
    const error = { sigmaH: 0.05, sigmaJ: 0.03 }
    const report = precisionReport(programmed, instance.ising, error)
    const random = createRandom(11)
    const state = Array.from(programmed.chainOf, (i) => (i % 2 ? 1 : -1))
    const flipped = Array.from(programmed.chainOf, () => 1)
    const draws = 20000
    let squares = 0
    let differences = 0
    for (let k = 0; k < draws; k++) {
      const errors = {
        h: programmed.h.map(() => error.sigmaH * random.normal()),
        ends: programmed.ends,
        J: programmed.J.map(() => error.sigmaJ * random.normal()),
      }
      squares += physicalEnergy(errors, state) ** 2
      const unchained = { ...errors, J: errors.J.map((J, c) => (programmed.isChainCoupler[c] ? 0 : J)) }
      differences += physicalEnergy(unchained, flipped) ** 2
    }
    // The relative standard error of a standard deviation is 1 / √(2·draws) = 0.5 %.
    expect(Math.sqrt(squares / draws) / programmed.scale / report.energyNoise).toBeCloseTo(1, 1.5)
    expect(Math.sqrt(differences / draws) / programmed.scale / report.orderingNoise).toBeCloseTo(1, 1.5)
    expect(report.orderingNoise).toBeLessThan(report.energyNoise)
  })

  it('throws for a negative σ', () => {
    expect(() => precisionReport(programmed, instance.ising, { sigmaH: -1, sigmaJ: 0 })).toThrow(RangeError)
  })
})
