import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { applyGauge, drawGauge } from '../../../../shared/engine/programming/gauges'
import { programme } from '../../../../shared/engine/programming/programme'
import type { ProgrammeInput } from '../../../../shared/engine/programming/programme'
import { logicalEnergy, must, physicalEnergy, randomInstance, statesOf } from './instances'

const RANGES = [
  { h: [-0.7, 0.9], J: [-1.5, 0.8], couplingSum: [-2.2, 3] },
  { h: [-4, 4], J: [-2, 1], couplingSum: null },
  { h: [-100, 100], J: [-100, 100], couplingSum: null },
] as const

const input = fc.record({
  seed: fc.integer({ min: 1, max: 10_000 }),
  field: fc.constantFrom(0, 0.5, 4),
  density: fc.constantFrom(0.08, 0.2, 0.35),
  strengths: fc.array(fc.constantFrom(0, 0.25, 1, 1.75, 6), { minLength: 5, maxLength: 5 }),
  fieldSplit: fc.constantFrom('even' as const, 'external coupling' as const),
  interactionCouplers: fc.constantFrom('all' as const, 'one' as const),
  chainCouplers: fc.constantFrom('all' as const, 'spanning tree' as const),
  ranges: fc.constantFrom(...RANGES),
  gauge: fc.constantFrom('none' as const, 'qubit' as const, 'chain' as const),
  /** Of the fitted scale; null: fit. */
  share: fc.constantFrom(null, 1, 0.61, 0.1),
})

type Given = typeof input extends fc.Arbitrary<infer T> ? T : never

const programmeInput = ({ seed, field, density, strengths, ...settings }: Given): ProgrammeInput => ({
  ...randomInstance(seed, { order: 18, sizes: [4, 1, 3, 2, 5], density, field }),
  strengths: Float64Array.from(strengths),
  ...settings,
})

/** At the fitted scale, or at a chosen one below it. */
function programmedOf(given: Given) {
  const asked = programmeInput(given)
  const fitted = must(programme(asked).programmed)
  return given.share === null ? fitted : must(programme({ ...asked, scale: fitted.scale * given.share }).programmed)
}

describe('programme', () => {
  it('keeps scale·E_logical = E_physical + offset on every unbroken state, however it is split, scaled and gauged', () => {
    fc.assert(
      fc.property(input, (given) => {
        const { ising } = programmeInput(given)
        const straight = programmedOf(given)
        const gauge = given.gauge === 'none' ? null : drawGauge(straight, given.seed, 3, given.gauge)
        const programmed = gauge ? applyGauge(straight, gauge) : straight
        for (const state of statesOf(ising.n)) {
          const physical = Array.from(programmed.chainOf, (i, p) => state[i]! * (gauge?.[p] ?? 1))
          const left = programmed.scale * logicalEnergy(ising, state)
          expect(physicalEnergy(programmed, physical) + programmed.offset).toBeCloseTo(left, 9)
        }
      }),
      { seed: 7, numRuns: 150 },
    )
  })

  it('gives the same bytes each time, and from copies of its input', () => {
    const bytes = (given: Given) => {
      const { qubits, h, ends, J, isChainCoupler, chainOf, scale, offset } = programmedOf(given)
      return [qubits, h, ends, J, isChainCoupler, chainOf, Float64Array.of(scale, offset)].map((array) =>
        Buffer.from(array.buffer, array.byteOffset, array.byteLength).toString('base64'),
      )
    }
    fc.assert(
      fc.property(input, (given) => {
        expect(bytes(structuredClone(given))).toEqual(bytes(given))
      }),
      { seed: 8, numRuns: 60 },
    )
  })

  it('programmes no value of −0, which would make equal values differ in their bytes', () => {
    fc.assert(
      fc.property(input, (given) => {
        const { h, J } = programmedOf(given)
        for (const value of [...h, ...J]) expect(Object.is(value, -0)).toBe(false)
      }),
      { seed: 9, numRuns: 60 },
    )
  })
})
