import { describe, expect, it } from 'vitest'
import { anneal, annealReads } from '../../../../shared/engine/sampling/anneal'
import { annealSchedule } from '../../../../shared/engine/sampling/annealing-schedule'
import { joinSamples } from '../../../../shared/engine/sampling/merge'
import { samplerModel } from '../../../../shared/engine/sampling/physical-model'
import { spinOf } from '../../../../shared/engine/sampling/samples'
import { physicalEnergy, statesOf } from '../programming/instances'
import { randomModel } from './models'

const quiet = { cancelled: () => false, report: () => undefined }

describe('anneal', () => {
  it('gives the same rows however the reads are split', () => {
    const model = samplerModel(randomModel(37, 1))
    const options = { sweeps: 20, seed: 99 }
    const whole = anneal(model, { ...options, reads: 23 }, quiet)
    const parts = [
      annealReads(model, options, 0, 5),
      annealReads(model, options, 5, 17),
      annealReads(model, options, 22, 1),
    ]
    expect(joinSamples(parts)).toEqual(whole)
    expect(whole.rows).toBe(23)
    expect(anneal(model, { ...options, seed: 100, reads: 23 }, quiet).bytes).not.toEqual(whole.bytes)
  })

  it('finds the ground state of small systems', () => {
    for (const seed of [1, 2, 3]) {
      const list = randomModel(12, seed)
      const energies = [...statesOf(12)].map((state) => physicalEnergy(list, state))
      const samples = anneal(samplerModel(list), { reads: 20, sweeps: 300, seed }, quiet)
      const found = Array.from({ length: 20 }, (_, r) =>
        physicalEnergy(
          list,
          Array.from({ length: 12 }, (_unused, c) => spinOf(samples, r, c)),
        ),
      )
      expect(Math.min(...found)).toBeCloseTo(Math.min(...energies), 10)
    }
  })

  it('reports after each read and returns what is complete when cancelled', () => {
    const model = samplerModel(randomModel(10, 1))
    const reports: number[] = []
    const control = {
      cancelled: () => reports.length >= 3,
      report: (progress: { readsDone: number }) => void reports.push(progress.readsDone),
    }
    const samples = anneal(model, { reads: 10, sweeps: 5, seed: 1 }, control)
    expect(reports).toEqual([1, 2, 3])
    expect(samples).toEqual(annealReads(model, { sweeps: 5, seed: 1 }, 0, 3))
  })

  it('gives up a long read between sweeps', () => {
    const model = samplerModel(randomModel(5, 1))
    let asked = 0
    const samples = anneal(model, { reads: 1, sweeps: 1e6, seed: 1 }, { ...quiet, cancelled: () => ++asked > 10 })
    expect(samples.rows).toBe(0)
  })

  it('cools geometrically from start to final temperature', () => {
    const model = samplerModel({ h: Float64Array.of(1, 0), ends: Uint32Array.of(0, 1), J: Float64Array.of(-3) })
    const cooled = annealSchedule(model, { sweeps: 3, seed: 1, startTemperature: 4, temperature: 0.25 })
    expect([...cooled]).toEqual([1 / 4, 1, 4])
    expect(annealSchedule(model, { sweeps: 2, seed: 1 })[0]).toBe(1 / 4)
    expect([...annealSchedule(model, { sweeps: 2, seed: 1, startTemperature: 2, temperature: 2 })]).toEqual([0.5, 0.5])
    expect([...annealSchedule(model, { sweeps: 1, seed: 1, startTemperature: 4, temperature: 0.5 })]).toEqual([2])
  })

  it('takes a model without couplings or fields', () => {
    const model = samplerModel({ h: new Float64Array(3), ends: new Uint32Array(0), J: new Float64Array(0) })
    expect(anneal(model, { reads: 4, sweeps: 2, seed: 1 }, quiet).rows).toBe(4)
  })

  it.each([
    { reads: -1, sweeps: 1, seed: 1 },
    { reads: 1, sweeps: 0, seed: 1 },
    { reads: 1, sweeps: 1_000_001, seed: 1 },
    { reads: 1, sweeps: 1, seed: 1, temperature: 0 },
    { reads: 1, sweeps: 1, seed: 1, startTemperature: Infinity },
  ])('throws for options outside their range (%#)', (options) => {
    expect(() => anneal(samplerModel(randomModel(3, 1)), options, quiet)).toThrow(RangeError)
  })
})

describe('a run at constant temperature', () => {
  // The colder, the longer it takes to forget the random start: leaving the second-lowest valley costs about 4.
  it.each([
    { temperature: 0.6, sweeps: 800 },
    { temperature: 1, sweeps: 100 },
    { temperature: 2.5, sweeps: 100 },
  ])('draws states by Boltzmann weight (T = $temperature)', ({ temperature, sweeps }) => {
    const list = randomModel(5, 6)
    const weights = [...statesOf(5)].map((state) => Math.exp(-physicalEnergy(list, state) / temperature))
    const total = weights.reduce((a, b) => a + b)
    const reads = 8000
    const samples = annealReads(
      samplerModel(list),
      { sweeps, seed: 5, startTemperature: temperature, temperature },
      0,
      reads,
    )
    const seen = new Array<number>(32).fill(0)
    for (let r = 0; r < reads; r++) seen[samples.bytes[r]!]!++
    let chiSquared = 0
    let freedom = -1
    let rareSeen = 0
    let rareExpected = 0
    weights.forEach((weight, state) => {
      const expected = (reads * weight) / total
      if (expected < 5) {
        rareSeen += seen[state]!
        rareExpected += expected
        return
      }
      chiSquared += (seen[state]! - expected) ** 2 / expected
      freedom++
    })
    if (rareExpected > 0) {
      chiSquared += (rareSeen - rareExpected) ** 2 / Math.max(rareExpected, 1)
      freedom++
    }
    // Mean f and standard deviation √(2f): four deviations above the mean.
    expect(freedom).toBeGreaterThan(8)
    expect(chiSquared).toBeLessThan(freedom + 4 * Math.sqrt(2 * freedom))
  })
})
