import { describe, expect, it } from 'vitest'
import { applyGauge, drawGauge, gaugesOutsideRanges, undoGauge } from '../../../../shared/engine/programming/gauges'
import { programme } from '../../../../shared/engine/programming/programme'
import { packRows } from '../../../../shared/engine/sampling/merge'
import { spinOf } from '../../../../shared/engine/sampling/samples'
import { must, physicalEnergy, randomInstance, statesOf, wideRanges } from './instances'

const instance = randomInstance(5, { order: 12, sizes: [3, 2, 4, 1], density: 0.25, field: 1 })
const programmed = must(
  programme({
    ...instance,
    strengths: new Float64Array(4).fill(2),
    ranges: wideRanges,
    fieldSplit: 'even',
    interactionCouplers: 'all',
    chainCouplers: 'all',
  }).programmed,
)
const width = programmed.h.length

describe('gauges', () => {
  it.each(['qubit', 'chain'] as const)('leave every energy as it was (%s)', (kind) => {
    for (const number of [0, 1, 2]) {
      const gauge = drawGauge(programmed, 7, number, kind)
      const turned = applyGauge(programmed, gauge)
      for (const state of statesOf(width)) {
        const read = state.map((s, p) => s * gauge[p]!)
        expect(Math.abs(physicalEnergy(turned, read) - physicalEnergy(programmed, state))).toBeLessThan(1e-12)
      }
    }
  })

  it('are undone on samples', () => {
    const gauge = drawGauge(programmed, 7, 1)
    const states = [...statesOf(width)].slice(0, 50)
    const read = packRows(
      width,
      states.flatMap((state) => state.map((s, p) => s * gauge[p]!)),
    )
    const back = undoGauge(read, gauge)
    states.forEach((state, r) => expect(state.map((_, p) => spinOf(back, r, p))).toEqual(state))
    expect(undoGauge(back, gauge)).toEqual(read)
  })

  it('differ by number and seed, repeat for the same, and keep chains together when asked', () => {
    const drawn = (seed: number, number: number): string => drawGauge(programmed, seed, number).join()
    expect(drawn(1, 0)).toBe(drawn(1, 0))
    expect(new Set([drawn(1, 0), drawn(1, 1), drawn(2, 0)]).size).toBe(3)
    const turned = applyGauge(programmed, drawGauge(programmed, 3, 0, 'chain'))
    programmed.J.forEach((J, c) => {
      if (programmed.isChainCoupler[c]) expect(turned.J[c]).toBe(J)
    })
  })

  it('must have one sign a qubit', () => {
    expect(() => applyGauge(programmed, new Int8Array(1))).toThrow(RangeError)
    expect(() => undoGauge(packRows(2, [1, 1]), new Int8Array(1))).toThrow(RangeError)
  })
})

describe('gauges on asymmetric ranges', () => {
  const mirrored = { h: [-100, 100], J: [-100, 100], couplingSum: null } as const

  it('are counted where they leave a range, as turning by hand does', () => {
    // The range just holds the field of greatest size, and not its opposite.
    const [least, greatest] = [Math.min(...programmed.h), Math.max(...programmed.h)]
    const h = greatest > -least ? ([least, 100] as const) : ([-100, greatest] as const)
    const ranges = { ...mirrored, h }
    let expected = 0
    for (let number = 0; number < 20; number++) {
      const gauge = drawGauge(programmed, 3, number, 'chain')
      if (programmed.h.some((field, p) => field * gauge[p]! < h[0] || field * gauge[p]! > h[1])) expected++
    }
    expect(expected).toBeGreaterThan(0)
    expect(expected).toBeLessThan(20)
    expect(gaugesOutsideRanges(programmed, ranges, 3, 20)).toBe(expected)
  })

  it('leave no mirrored range, and none wide enough', () => {
    expect(gaugesOutsideRanges(programmed, mirrored, 3, 20)).toBe(0)
    expect(gaugesOutsideRanges(programmed, { ...mirrored, couplingSum: [-1000, 999] }, 3, 20)).toBe(0)
  })
})
