import { describe, expect, it } from 'vitest'
import { annealIn } from '../../../../shared/engine/sampling/anneal-in'
import type { Arithmetic } from '../../../../shared/engine/sampling/arithmetic'
import { fittingArithmetic, MARGIN, roundingIn, roundingsOf } from '../../../../shared/engine/sampling/arithmetic'
import { anneal } from '../../../../shared/engine/sampling/anneal'
import { laneModel } from '../../../../shared/engine/sampling/lanes/lane-model'
import { joinSamples } from '../../../../shared/engine/sampling/merge'
import { samplerModel } from '../../../../shared/engine/sampling/physical-model'
import { physicalEnergy, statesOf } from '../programming/instances'
import { energiesOfRows } from './lattices'
import { randomModel } from './models'

const quiet = { cancelled: () => false, report: () => undefined }
const FAST = ['16-bit', '32-bit'] as const

describe.each(FAST)('annealIn, %s', (arithmetic) => {
  const model = samplerModel(randomModel(37, 1))
  const options = { arithmetic, sweeps: 20, seed: 99 }

  it('gives the same rows however the reads are split, with WebAssembly or without', () => {
    const whole = annealIn(model, { ...options, reads: 53 }, quiet)
    const cuts = [0, 5, 16, 22, 48, 53]
    const parts = cuts
      .slice(1)
      .map((end, k) => annealIn(model, { ...options, firstRead: cuts[k]!, reads: end - cuts[k]! }, quiet))
    expect(joinSamples(parts)).toEqual(whole)
    expect(annealIn(model, { ...options, reads: 53, choice: 'plain' }, quiet)).toEqual(whole)
    expect(annealIn(model, { ...options, reads: 53, seed: 100 }, quiet).bytes).not.toEqual(whole.bytes)
  })

  it('finds the ground state of small systems', () => {
    for (const seed of [1, 2, 3]) {
      const list = randomModel(12, seed)
      const least = Math.min(...[...statesOf(12)].map((state) => physicalEnergy(list, state)))
      const samples = annealIn(samplerModel(list), { arithmetic, reads: 32, sweeps: 300, seed }, quiet)
      expect(Math.min(...energiesOfRows(list, samples))).toBeCloseTo(least, 10)
    }
  })

  it('reports after each group and keeps what is complete when cancelled', () => {
    const reports: number[] = []
    const control = {
      cancelled: () => reports.length >= 2,
      report: (progress: { readsDone: number }) => void reports.push(progress.readsDone),
    }
    const samples = annealIn(model, { ...options, firstRead: 10, reads: 60 }, control)
    expect(reports).toEqual([6, 22])
    expect(samples).toEqual(annealIn(model, { ...options, firstRead: 10, reads: 22 }, quiet))
  })

  it('takes no reads, no couplings and no fields', () => {
    expect(annealIn(model, { ...options, reads: 0 }, quiet).rows).toBe(0)
    const nothing = { h: new Float64Array(3), ends: new Uint32Array(0), J: new Float64Array(0) }
    expect(annealIn(samplerModel(nothing), { ...options, reads: 4 }, quiet).rows).toBe(4)
  })

  it.each([{ reads: -1 }, { reads: 1.5 }, { sweeps: 0 }, { temperature: 0 }])('throws for %o', (wrong) => {
    expect(() => annealIn(model, { ...options, reads: 1, ...wrong }, quiet)).toThrow(RangeError)
  })
})

describe('64-bit arithmetic', () => {
  it('is the plain loop', () => {
    const model = samplerModel(randomModel(20, 3))
    const options = { reads: 7, sweeps: 11, seed: 5, firstRead: 3 }
    expect(annealIn(model, { ...options, arithmetic: '64-bit' }, quiet)).toEqual(anneal(model, options, quiet))
  })
})

describe('rounding', () => {
  it.each(FAST)('is the most that any value of the model in steps is off (%s)', (kind) => {
    const model = samplerModel(randomModel(60, 8, 0.2))
    const inSteps = laneModel(model, kind, 1)
    const rounding = roundingIn(roundingsOf(model), kind)
    let worst = 0
    for (let k = 0; k < model.n; k++) {
      const i = inSteps.order[k]!
      let field = inSteps.fieldsDown[k]!
      for (let p = inSteps.offsets[k]!; p < inSteps.offsets[k + 1]!; p++) {
        field += inSteps.weights[p]!
        const at = model.targets.subarray(model.offsets[i]!, model.offsets[i + 1]!)
        const exact = model.weights[model.offsets[i]! + at.indexOf(inSteps.order[inSteps.targets[p]!]!)]!
        worst = Math.max(worst, Math.abs(inSteps.weights[p]! / inSteps.scale - exact))
      }
      worst = Math.max(worst, Math.abs(field / inSteps.scale - model.h[i]!))
    }
    expect(worst).toBeLessThanOrEqual(rounding * (1 + 1e-6))
    expect(worst).toBeGreaterThan(0.9 * rounding)
  })

  it('of 16 bits is half a 32,000th of the largest local field, and none in double precision', () => {
    const model = samplerModel({ h: Float64Array.of(0.4, -1), ends: Uint32Array.of(0, 1), J: Float64Array.of(-3) })
    const roundings = roundingsOf(model)
    expect(roundings.largestField).toBe(4)
    expect(roundings.bits16).toBeCloseTo(4 / 64_000, 12)
    expect(roundingIn(roundings, '64-bit')).toBe(0)
  })
})

describe('fittingArithmetic', () => {
  const bits16 = 0.001
  const fits: [Arithmetic, Parameters<typeof fittingArithmetic>][] = [
    ['16-bit', [{ bits16 }, { sigmaH: 0.02, sigmaJ: 0.015 }, 0.1]],
    ['32-bit', [{ bits16 }, null, 0.1]],
    ['32-bit', [{ bits16 }, { sigmaH: 0.02, sigmaJ: 0 }, 0.1]],
    ['32-bit', [{ bits16 }, { sigmaH: 0.02, sigmaJ: 0.009 }, 0.1]],
    ['32-bit', [{ bits16 }, { sigmaH: 0.02, sigmaJ: 0.015 }, 0.09]],
    ['32-bit', [{ bits16: null }, { sigmaH: 0.02, sigmaJ: 0.015 }, 0.1]],
  ]
  it.each(fits)('is %s for %j', (expected, given) => expect(fittingArithmetic(...given)).toBe(expected))

  it('keeps the margins it states', () => {
    const error = { sigmaH: bits16 / MARGIN.ofControlError, sigmaJ: 1 }
    expect(fittingArithmetic({ bits16 }, error, bits16 / MARGIN.ofTemperature)).toBe('16-bit')
  })
})
