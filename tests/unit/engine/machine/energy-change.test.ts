import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { energiesAt } from '../../../../shared/engine/machine/energies-at'
import { largestChange } from '../../../../shared/engine/machine/energy-change'
import { energyUnit, GIGAHERTZ_PER_KELVIN, thermalGigahertz } from '../../../../shared/engine/machine/energy-units'

const table = (s: number[], A: number[], B: number[] = s) => ({ s, A, B })

describe('largestChange', () => {
  it('finds nothing between samplings of the same curve', () => {
    const coarse = table([0, 1], [9, 0])
    const fine = table([0, 0.1, 0.3, 0.7, 1], [9, 8.1, 6.3, 2.7, 0])
    expect(largestChange(coarse, fine, 'A')).toBeNull()
    expect(largestChange(coarse, coarse, 'B')).toBeNull()
  })

  it('finds it at a row that only one of them has', () => {
    const bent = table([0, 0.5, 1], [9, 2, 0])
    expect(largestChange(table([0, 1], [9, 0]), bent, 'A')).toEqual({ s: 0.5, from: 4.5, to: 2 })
    expect(largestChange(bent, table([0, 1], [9, 0]), 'A')).toEqual({ s: 0.5, from: 2, to: 4.5 })
  })

  it('is never less than the difference on a fine grid', () => {
    const curve = fc
      .array(fc.tuple(fc.integer({ min: 1, max: 99 }), fc.integer({ min: 0, max: 1000 })), { maxLength: 12 })
      .map((rows) => {
        const mids = [...new Map(rows).entries()].sort(([a], [b]) => a - b)
        const s = [0, ...mids.map(([at]) => at / 100), 1]
        const values = [1000, ...mids.map(([, value]) => value), 0].sort((a, b) => b - a)
        return table(s, values)
      })
    fc.assert(
      fc.property(curve, curve, (before, now) => {
        const most = largestChange(before, now, 'A')
        const size = most ? Math.abs(most.to - most.from) : 0
        for (let k = 0; k <= 200; k++) {
          const gap = Math.abs(energiesAt(before, k / 200).A - energiesAt(now, k / 200).A)
          expect(gap).toBeLessThanOrEqual(size + 1e-8)
        }
      }),
    )
  })
})

describe('units of energy', () => {
  // CODATA 2018: k_B/h = 2.083 661 912 × 10¹⁰ Hz/K, e/h = 2.417 989 242 × 10¹⁴ Hz/V, 1 J/h = 1.509 190 179 × 10³³ Hz.
  it('agrees with the published factors', () => {
    expect(GIGAHERTZ_PER_KELVIN).toBeCloseTo(20.83661912, 8)
    expect(energyUnit('eV')!.gigahertz / 2.417989242e5).toBeCloseTo(1, 9)
    expect(energyUnit('J')!.gigahertz / 1.509190179e24).toBeCloseTo(1, 9)
    expect(thermalGigahertz(13.1)).toBeCloseTo(0.27296, 5)
  })

  it('takes hertz in one case and the rest as written', () => {
    expect(energyUnit('ghz')!.gigahertz).toBe(1)
    expect(energyUnit('MHZ')!.gigahertz).toBe(1e-3)
    expect(energyUnit('mHz')).toBeUndefined()
    expect(energyUnit('MeV')).toBeUndefined()
    expect(energyUnit('μeV')).toEqual(energyUnit('µeV'))
  })
})
