import { describe, expect, it } from 'vitest'
import { energyNoise } from '../../../../shared/engine/programming/precision'
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

describe('energyNoise', () => {
  it('predicts the spread of energies over drawn control errors', () => {
    const error = { sigmaH: 0.05, sigmaJ: 0.03 }
    const noise = energyNoise(programmed, error)
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
    expect(Math.sqrt(squares / draws) / programmed.scale / noise.absolute).toBeCloseTo(1, 1.5)
    expect(Math.sqrt(differences / draws) / programmed.scale / noise.ofOrder).toBeCloseTo(1, 1.5)
    expect(noise.ofOrder).toBeLessThan(noise.absolute)
  })

  it('throws for a negative σ', () => {
    expect(() => energyNoise(programmed, { sigmaH: -1, sigmaJ: 0 })).toThrow(RangeError)
  })
})
