import { describe, expect, it } from 'vitest'
import {
  countDrowned,
  drownedCoefficients,
  sharesOf,
  smallestCoefficient,
} from '../../../../shared/engine/programming/coefficients'
import { programme } from '../../../../shared/engine/programming/programme'
import { isingOf, must, randomInstance, wideRanges } from './instances'

const ising = isingOf(
  [0.1, 0, -2, 8],
  [
    [0, 1, 0.4],
    [0, 3, -6],
    [2, 3, 0.05],
  ],
)

describe('coefficients beside control error', () => {
  it('are listed by how deep they drown, with value, scaled size and size over σ', () => {
    // Halved: fields 0.05, 1, 4 against 2 × 0.6; couplings 0.2, 3, 0.025 against 2 × 0.1.
    const drowned = drownedCoefficients(ising, 0.5, { sigmaH: 0.6, sigmaJ: 0.11 })
    expect(drowned.map(({ kind, at, value }) => [kind, at, value])).toEqual([
      ['field', 0, 0.1],
      ['coupling', 2, 0.05],
      ['field', 2, -2],
      ['coupling', 0, 0.4],
    ])
    expect(drowned[1]!.size).toBe(0.025)
    expect(drowned.map(({ perSigma }) => Number(perSigma.toFixed(4)))).toEqual([0.0833, 0.2273, 1.6667, 1.8182])
  })

  it('are counted as they are listed; a coefficient of exactly 2σ does not drown, and zeros are none', () => {
    expect(countDrowned(ising, 0.5, { sigmaH: 0.5, sigmaJ: 0.1 })).toEqual({ under: 2, of: 6 })
    expect(countDrowned(ising, 0.5, { sigmaH: 0.50001, sigmaJ: 0.10001 })).toEqual({ under: 4, of: 6 })
  })

  it('have the smallest beside its own σ, not the smallest of all', () => {
    expect(smallestCoefficient(ising, 1, { sigmaH: 0.1, sigmaJ: 0.001 })).toMatchObject({ kind: 'field', at: 0 })
    expect(smallestCoefficient(ising, 1, { sigmaH: 0.001, sigmaJ: 0.1 })).toMatchObject({
      kind: 'coupling',
      at: 2,
      perSigma: 0.5,
    })
  })

  it('of a kind without control error are left out', () => {
    expect(countDrowned(ising, 1, { sigmaH: 0, sigmaJ: 1 })).toEqual({ under: 2, of: 3 })
    expect(smallestCoefficient(ising, 1, { sigmaH: 0, sigmaJ: 1 })!.kind).toBe('coupling')
    expect(smallestCoefficient(ising, 1, { sigmaH: 0, sigmaJ: 0 })).toBeNull()
    expect(() => drownedCoefficients(ising, 1, { sigmaH: -1, sigmaJ: 0 })).toThrow(RangeError)
  })
})

describe('sharesOf', () => {
  it.each([1, 2, 3, 4])('counts qubits with a field and couplers of each interaction (seed %i)', (seed) => {
    const instance = randomInstance(seed, { order: 20, sizes: [5, 4, 3, 1], density: 0.25, field: seed % 2 })
    for (const interactionCouplers of ['all', 'one'] as const) {
      const input = {
        ...instance,
        strengths: new Float64Array(4).fill(1),
        ranges: wideRanges,
        fieldSplit: 'even' as const,
        chainCouplers: 'all' as const,
        interactionCouplers,
      }
      const programmed = must(programme(input).programmed)
      const { ofField, ofInteraction } = sharesOf(programmed, instance.ising)
      instance.ising.linear.forEach((field, i) => {
        const qubits = instance.embedding.offsets[i + 1]! - instance.embedding.offsets[i]!
        expect(ofField[i]).toBe(field === 0 ? 0 : qubits)
      })
      const between = programmed.isChainCoupler.filter((inside) => !inside).length
      expect(ofInteraction.reduce((a, b) => a + b, 0)).toBe(between)
      if (interactionCouplers === 'one') expect([...ofInteraction].every((count) => count === 1)).toBe(true)
    }
  })
})
